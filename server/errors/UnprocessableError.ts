import { AppError, type AppErrorOptions } from './AppError.js';

/** Each value is well formed, but they make no sense together. */
export class UnprocessableError extends AppError {
  readonly status = 422;

  constructor(code = 'UNPROCESSABLE', message = 'The values do not go together.', options: AppErrorOptions = {}) {
    super(code, message, options);
  }
}
