import type { Response } from 'supertest';
import { errorBodySchema } from '../../shared/schemas/common.js';

/** Status and code of an error answer, after checking that its body has the one shape that all errors have. */
export function errorOf(response: Response): { status: number; code: string } {
  const { error } = errorBodySchema.parse(response.body);
  if (error.requestId !== response.headers['x-request-id']) throw new Error('The body names another request.');
  return { status: response.status, code: error.code };
}
