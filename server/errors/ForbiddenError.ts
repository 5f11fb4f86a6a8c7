import { AppError, type AppErrorOptions } from './AppError.js';

/** The thing may be known to the user, but the act is not theirs. */
export class ForbiddenError extends AppError {
  readonly status = 403;

  constructor(
    code = 'FORBIDDEN',
    message = 'Your role does not allow this. Ask an administrator.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
