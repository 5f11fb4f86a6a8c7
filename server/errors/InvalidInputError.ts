import { AppError, type AppErrorOptions } from './AppError.js';

/** The request itself is wrong; `details` names each value by its path. */
export class InvalidInputError extends AppError {
  readonly status = 400;

  constructor(
    code = 'INVALID_INPUT',
    message = 'Some values are missing or wrong. See the details.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
