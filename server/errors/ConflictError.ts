import { AppError, type AppErrorOptions } from './AppError.js';

/** The request is well formed but does not fit the present state. */
export class ConflictError extends AppError {
  readonly status = 409;

  constructor(
    code = 'CONFLICT',
    message = 'This does not fit the present state. Load it again.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
