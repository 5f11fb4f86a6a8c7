export type MailOutcome = 'retry' | 'refused' | 'unknown';

interface SmtpError {
  code?: unknown;
  command?: unknown;
  responseCode?: unknown;
}

/**
 * What a failed send means.
 * A 5xx answer is final. An answer 4xx, or a fault before the message was handed over, may be tried again. A connection
 * that broke after DATA leaves open whether the server took the message: sending again could deliver it twice.
 */
export function classifyMailError(error: unknown): MailOutcome {
  const { command, responseCode } = (typeof error === 'object' && error !== null ? error : {}) as SmtpError;
  if (typeof responseCode === 'number') return responseCode >= 500 ? 'refused' : 'retry';
  return command === 'DATA' ? 'unknown' : 'retry';
}
