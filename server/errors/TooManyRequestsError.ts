import { AppError, type AppErrorOptions } from './AppError.js';

/** Slow down; `Retry-After` says how long. */
export class TooManyRequestsError extends AppError {
  readonly status = 429;

  constructor(
    code = 'TOO_MANY_REQUESTS',
    message = 'Too many tries. Wait a while and try again.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
