import { AppError, type AppErrorOptions, type ErrorCause } from './AppError.js';

/** A bug of ours. Only the request id goes out; what happened is in the log. */
export class InternalError extends AppError {
  readonly status = 500;
  override readonly kind: ErrorCause = 'bug';

  constructor(options: AppErrorOptions = {}) {
    super(
      'INTERNAL',
      'Something went wrong on our side. Try again; if it stays, give the request id to an administrator.',
      options,
    );
  }
}
