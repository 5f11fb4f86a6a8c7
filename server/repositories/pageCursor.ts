import { z } from 'zod';
import { InvalidInputError } from '../errors/index.js';

/** Sort keys travel as PostgreSQL's own text, which gives back the exact value; times would lose their microseconds. */
const keySchemas = {
  time: z.string().regex(/^\d{4,6}-\d\d-\d\d \d\d:\d\d:\d\d(\.\d{1,6})?[+-]\d\d(:\d\d)?$/),
  number: z.string().regex(/^-?(\d{1,20}(\.\d{1,20})?(e[+-]?\d{1,3})?|Infinity)$/),
  text: z.string().max(1024),
};
export type CursorKey = keyof typeof keySchemas;

/** The last row of a page: where the next one begins. */
export interface PagePosition {
  key: string;
  id: string;
}

/** Opaque text that carries a position, and the order it belongs to. */
export const pageCursor = {
  encode(order: string, { key, id }: PagePosition): string {
    return Buffer.from(JSON.stringify([order, key, id])).toString('base64url');
  },

  /** @throws InvalidInputError for a cursor that is not ours, or of a list in another order */
  decode(cursor: string | undefined, order: string, kind: CursorKey): PagePosition | null {
    if (cursor === undefined) return null;
    const schema = z.tuple([z.literal(order), keySchemas[kind], z.uuid()]);
    let content: unknown;
    try {
      content = JSON.parse(Buffer.from(cursor, 'base64url').toString());
    } catch {
      content = null;
    }
    const parsed = schema.safeParse(content);
    if (parsed.success) return { key: parsed.data[1], id: parsed.data[2] };
    throw new InvalidInputError(undefined, undefined, {
      details: [{ path: 'query.cursor', message: 'This cursor does not belong to this list. Begin without one.' }],
    });
  },
};

/** One page from rows read with one row beyond it: the extra row tells that there is a next page. */
export function cutPage<Row extends PagePosition>(rows: Row[], limit: number, order: string) {
  const items = rows.slice(0, limit);
  const last = items.at(-1);
  return { items, nextCursor: rows.length > limit && last ? pageCursor.encode(order, last) : null };
}
