import { AppError, type AppErrorOptions } from './AppError.js';

/** More bytes, files or channels than allowed; the message tells the limit. */
export class TooLargeError extends AppError {
  readonly status = 413;

  constructor(code = 'TOO_LARGE', message = 'The request is too large.', options: AppErrorOptions = {}) {
    super(code, message, options);
  }
}
