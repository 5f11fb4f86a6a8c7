export interface ErrorDetail {
  path: string;
  message: string;
}

/** Whose move it is: the caller's, nobody's (a part is down for now), or ours. Decides how loudly it is logged. */
export type ErrorCause = 'user' | 'operational' | 'bug';

export interface AppErrorOptions {
  details?: ErrorDetail[];
  /** Sent as headers with the answer, for example `Retry-After` or `Allow`. */
  headers?: Record<string, string>;
  cause?: unknown;
}

/** An error that may be shown: `code` is stable for programs, `message` is for people and holds nothing secret. */
export abstract class AppError extends Error {
  abstract readonly status: number;
  readonly kind: ErrorCause = 'user';
  readonly details: ErrorDetail[] | undefined;
  readonly headers: Record<string, string>;

  constructor(
    readonly code: string,
    message: string,
    options: AppErrorOptions = {},
  ) {
    super(message, { cause: options.cause });
    this.name = new.target.name;
    this.details = options.details;
    this.headers = options.headers ?? {};
  }
}
