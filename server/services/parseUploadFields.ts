import type { z } from 'zod';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import { acquisitionByFileSchema, csvLayoutByFileSchema } from '../../shared/schemas/capture.js';
import { idSchema } from '../../shared/schemas/common.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import { InvalidInputError, type ErrorDetail } from '../errors/index.js';

export interface UploadFields {
  acquisition: Record<string, AcquisitionSheet>;
  csvLayout: Record<string, CsvLayout>;
  /** The failed capture that the one file takes the place of. */
  replaces: string | null;
}

function readJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return undefined;
  }
}

/**
 * The text fields that come with the files.
 * @throws InvalidInputError with every problem and its path
 */
export function parseUploadFields(fields: ReadonlyMap<string, string>): UploadFields {
  const details: ErrorDetail[] = [];
  const note = (path: string, message: string): number => details.push({ path: `body.${path}`, message });

  function parse<T>(name: string, schema: z.ZodType<T>, missing: T, decode: (text: string) => unknown): T {
    const text = fields.get(name);
    if (text === undefined || text.trim() === '') return missing;
    const parsed = schema.safeParse(decode(text));
    if (parsed.success) return parsed.data;
    for (const issue of parsed.error.issues) note([name, ...issue.path.map(String)].join('.'), issue.message);
    return missing;
  }

  for (const name of fields.keys()) {
    if (!['acquisition', 'csvLayout', 'replaces'].includes(name))
      note(name, 'This field is not known here. Leave it out.');
  }
  const parsed = {
    acquisition: parse('acquisition', acquisitionByFileSchema, {}, readJson),
    csvLayout: parse('csvLayout', csvLayoutByFileSchema, {}, readJson),
    replaces: parse('replaces', idSchema.nullable(), null, (text) => text.trim()),
  };
  if (details.length > 0) throw new InvalidInputError(undefined, undefined, { details });
  return parsed;
}
