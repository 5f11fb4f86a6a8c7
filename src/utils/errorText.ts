import { ApiError } from '@/api/ApiError';

/** What to tell a person about a failure, with the fields it names. */
export function errorText(error: unknown): string {
  if (!(error instanceof ApiError)) return 'Something went wrong on this page. Reload it and try again.';
  const details = error.details.map(({ path, message }) => (path ? `${path}: ${message}` : message));
  return [error.message, ...details].join(' ');
}
