import { AppError, type AppErrorOptions } from './AppError.js';

/** Nobody is signed in, or not any more. */
export class UnauthenticatedError extends AppError {
  readonly status = 401;

  constructor(code = 'UNAUTHENTICATED', message = 'Sign in to do this.', options: AppErrorOptions = {}) {
    super(code, message, options);
  }
}
