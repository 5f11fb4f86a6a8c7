/** An answer of the API that is no success, or none at all (`status` 0). The message can be shown as it is. */
export class ApiError extends Error {
  readonly status: number;
  readonly code: string;
  readonly details: { path: string; message: string }[];
  readonly requestId: string;

  constructor(
    status: number,
    body: { code: string; message: string; details?: { path: string; message: string }[]; requestId: string },
  ) {
    super(body.message);
    this.name = 'ApiError';
    this.status = status;
    this.code = body.code;
    this.details = body.details ?? [];
    this.requestId = body.requestId;
  }
}
