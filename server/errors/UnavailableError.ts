import { AppError, type AppErrorOptions, type ErrorCause } from './AppError.js';

/** A part we need (database, queue, storage) does not answer now; trying again later makes sense. */
export class UnavailableError extends AppError {
  readonly status = 503;
  override readonly kind: ErrorCause = 'operational';

  constructor(
    code = 'UNAVAILABLE',
    message = 'The service is not available right now. Try again in a moment.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, { ...options, headers: { 'Retry-After': '5', ...options.headers } });
  }
}
