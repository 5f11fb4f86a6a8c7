import { AppError, type AppErrorOptions } from './AppError.js';

/** The body is of a kind that the route does not read. */
export class UnsupportedMediaTypeError extends AppError {
  readonly status = 415;

  constructor(
    code = 'UNSUPPORTED_MEDIA_TYPE',
    message = 'Send the body as application/json.',
    options: AppErrorOptions = {},
  ) {
    super(code, message, options);
  }
}
