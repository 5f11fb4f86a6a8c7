import { AppError, type AppErrorOptions } from './AppError.js';

/** Missing and foreign ids answer alike, so that nobody learns what exists. */
export class NotFoundError extends AppError {
  readonly status = 404;

  constructor(
    code = 'NOT_FOUND',
    message = 'There is no such thing, or you have no access to it.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
