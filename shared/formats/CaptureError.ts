/**
 * The capture's file can't be screened as it is: wrong kind, damaged, contradictory. Never worth a retry; the message
 * says what is wrong and what to do about it.
 */
export class CaptureError extends Error {
  readonly code: string;
  /** Counted from 1, in text files. */
  readonly line: number | undefined;
  /** Counted from 1, in cells. */
  readonly column: number | undefined;

  constructor(code: string, message: string, place: { line?: number; column?: number } = {}) {
    super(message);
    this.name = 'CaptureError';
    this.code = code;
    this.line = place.line;
    this.column = place.column;
  }
}
