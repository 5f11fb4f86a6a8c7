import { z } from 'zod';
import { acquisitionSheetSchema } from './acquisitionSheet.js';
import { idSchema, nameSchema, pageOf, pageQuerySchema } from './common.js';

export const batchStates = ['receiving', 'screening', 'review', 'released', 'withdrawn'] as const;
export const batchStateSchema = z.enum(batchStates);
export type BatchState = z.infer<typeof batchStateSchema>;

/** Captures by verdict; `pending` are those not yet screened or failed. They add up to the number of captures. */
export const verdictCountsSchema = z.strictObject({
  clear: z.int(),
  limited: z.int(),
  folded: z.int(),
  unproven: z.int(),
  failed: z.int(),
  pending: z.int(),
});
export type VerdictCounts = z.infer<typeof verdictCountsSchema>;

export const batchSchema = z.strictObject({
  id: idSchema,
  projectId: idSchema,
  projectName: z.string(),
  name: z.string(),
  state: batchStateSchema,
  acquisition: acquisitionSheetSchema,
  counts: verdictCountsSchema,
  decidedCount: z.int(),
  /** 0..1, over all captures of the batch, running ones in part. */
  progress: z.number(),
  createdBy: z.strictObject({ id: idSchema, name: z.string() }).nullable(),
  createdAt: z.iso.datetime(),
  completedAt: z.iso.datetime().nullable(),
  screenedAt: z.iso.datetime().nullable(),
});
export type BatchDto = z.infer<typeof batchSchema>;

export const createBatchSchema = z.strictObject({ name: nameSchema, acquisition: acquisitionSheetSchema.default({}) });
export type CreateBatch = z.input<typeof createBatchSchema>;
export const updateBatchSchema = z.strictObject({ name: nameSchema.optional() });

/** GET /batches and GET /projects/:projectId/batches, newest first. */
export const batchListQuerySchema = pageQuerySchema.extend({ state: batchStateSchema.optional() });
export const batchPageSchema = pageOf(batchSchema);
