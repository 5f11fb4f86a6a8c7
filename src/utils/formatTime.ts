const formatter = new Intl.DateTimeFormat(undefined, { dateStyle: 'medium', timeStyle: 'short' });

/** Date and time as the reader's own system writes them. */
export function formatTime(isoTime: string | null | undefined): string {
  return isoTime ? formatter.format(new Date(isoTime)) : '–';
}
