import { z } from 'zod';

export const idSchema = z.uuid();
export const nameSchema = z.string().trim().min(1).max(120);
export const emailSchema = z
  .email()
  .max(254)
  .transform((value) => value.toLowerCase());

/** The one error body of the API. */
export const errorBodySchema = z.strictObject({
  error: z.strictObject({
    code: z.string(),
    message: z.string(),
    details: z.array(z.strictObject({ path: z.string(), message: z.string() })).optional(),
    requestId: z.string(),
  }),
});
export type ErrorBody = z.infer<typeof errorBodySchema>;

/** Query of every list: an opaque cursor and a page size. */
export const pageQuerySchema = z.strictObject({
  cursor: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(200).default(50),
});

export const pageOf = <T extends z.ZodType>(item: T) =>
  z.strictObject({ items: z.array(item), nextCursor: z.string().nullable() });
export interface Page<T> {
  items: T[];
  nextCursor: string | null;
}
