import { AppError, type AppErrorOptions, type ErrorCause } from './AppError.js';

/** The store is full: an operator must make room. */
export class InsufficientStorageError extends AppError {
  readonly status = 507;
  override readonly kind: ErrorCause = 'operational';

  constructor(
    code = 'STORAGE_FULL',
    message = 'The store has no room left. Ask an administrator to make room, then upload again.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
