import type { Request } from 'express';
import { z } from 'zod';
import { InvalidInputError, UnsupportedMediaTypeError, type ErrorDetail } from '../errors/index.js';
import type { Route } from '../routes/Route.js';

const nothing = z.strictObject({});
const noBody = z.union([z.undefined(), nothing]);

export interface ValidatedParts {
  params: unknown;
  query: unknown;
  body: unknown;
}

/** Zod's issues with the place they belong to: `body.name`, `query.limit`. */
export function describeIssues(issues: readonly z.core.$ZodIssue[], prefix: string): ErrorDetail[] {
  return issues.flatMap((issue): ErrorDetail[] => {
    const path = [prefix, ...issue.path.map(String)].join('.');
    if (issue.code === 'unrecognized_keys') {
      return issue.keys.map((key) => ({
        path: `${path}.${key}`,
        message: 'This name is not known here. Leave it out.',
      }));
    }
    return [{ path, message: issue.message }];
  });
}

const loneSurrogate = /[\ud800-\udfff]/u;
/** NUL, or half of a pair: PostgreSQL stores neither. */
const isUnstorable = (text: string): boolean => text.includes('\0') || loneSurrogate.test(text);

function describeUnstorable(value: unknown, path: string): ErrorDetail[] {
  if (typeof value === 'string') {
    return isUnstorable(value) ? [{ path, message: 'This holds a character that cannot be stored.' }] : [];
  }
  if (typeof value !== 'object' || value === null) return [];
  return Object.entries(value).flatMap(([key, inner]) => [
    ...(isUnstorable(key) ? [{ path, message: 'A name here holds a character that cannot be stored.' }] : []),
    ...describeUnstorable(inner, `${path}.${key}`),
  ]);
}

function parsePart(schema: z.ZodType | undefined, value: unknown, prefix: string, details: ErrorDetail[]): unknown {
  const parsed = (schema ?? nothing).safeParse(value);
  details.push(...(parsed.success ? describeUnstorable(value, prefix) : describeIssues(parsed.error.issues, prefix)));
  return parsed.data;
}

function describeRepeatedKeys(query: Request['query']): ErrorDetail[] {
  return Object.entries(query)
    .filter(([, value]) => Array.isArray(value))
    .map(([key]) => ({ path: `query.${key}`, message: 'Give this only once.' }));
}

/** Parses the parts of the address. @throws InvalidInputError with every problem, not only the first */
export function validateAddress(route: Pick<Route, 'params' | 'query'>, req: Request): Omit<ValidatedParts, 'body'> {
  const details: ErrorDetail[] = [];
  const params = parsePart(route.params, { ...req.params }, 'params', details);
  const repeated = describeRepeatedKeys(req.query);
  details.push(...repeated);
  const query = repeated.length > 0 ? undefined : parsePart(route.query, { ...req.query }, 'query', details);
  if (details.length > 0) throw new InvalidInputError(undefined, undefined, { details });
  return { params, query };
}

/** @throws InvalidInputError, or UnsupportedMediaTypeError for a body that is not JSON */
export function validateBody(route: Pick<Route, 'body' | 'bodyType'>, req: Request): unknown {
  if (route.bodyType === 'multipart') return undefined;
  const body: unknown = req.body;
  const hasContent = req.headers['transfer-encoding'] !== undefined || Number(req.headers['content-length'] ?? 0) > 0;
  if (hasContent && req.is('application/json') === false) throw new UnsupportedMediaTypeError();
  const details: ErrorDetail[] = [];
  const parsed = parsePart(route.body ?? noBody, body, 'body', details);
  if (details.length > 0) throw new InvalidInputError(undefined, undefined, { details });
  return route.body ? parsed : undefined;
}
