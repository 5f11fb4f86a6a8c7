import { AppError, type AppErrorOptions } from './AppError.js';

/** It was here once: a used or expired link. */
export class GoneError extends AppError {
  readonly status = 410;

  constructor(code = 'GONE', message = 'This is not available any more.', options: AppErrorOptions = {}) {
    super(code, message, options);
  }
}
