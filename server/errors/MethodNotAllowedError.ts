import { AppError, type AppErrorOptions } from './AppError.js';

/** The path exists, the method does not. */
export class MethodNotAllowedError extends AppError {
  readonly status = 405;

  constructor(
    code = 'METHOD_NOT_ALLOWED',
    message = 'This address does not take this method.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
