import { QueryFailedError } from 'typeorm';

/** PostgreSQL's `unique_violation`, recognised by its code. @param constraint checked too when given */
export function isUniqueViolation(error: unknown, constraint?: string): boolean {
  if (!(error instanceof QueryFailedError)) return false;
  const driverError: { code?: unknown; constraint?: unknown } = error.driverError;
  return driverError.code === '23505' && (constraint === undefined || driverError.constraint === constraint);
}
