import { z } from 'zod';
import { idSchema } from './common.js';

export const decisionKinds = ['accept', 'acceptTo', 'retake', 'exclude'] as const;
export const decisionKindSchema = z.enum(decisionKinds);
export type DecisionKind = z.infer<typeof decisionKindSchema>;

/** `version` is the capture's decision version that the reviewer saw; a newer one on the server answers 409. */
export const putDecisionSchema = z
  .strictObject({
    decision: decisionKindSchema,
    limitHz: z.number().positive().max(1e9).optional(),
    reason: z.string().trim().min(3, 'Give a reason of at least 3 characters.').max(1000),
    version: z.int().min(0).optional(),
  })
  .refine((value) => (value.decision === 'acceptTo') === (value.limitHz !== undefined), {
    path: ['limitHz'],
    message: 'A frequency limit goes with acceptTo, and only with it.',
  });
export type PutDecision = z.infer<typeof putDecisionSchema>;

export const decisionSchema = z.strictObject({
  id: idSchema,
  decision: decisionKindSchema,
  limitHz: z.number().nullable(),
  reason: z.string(),
  decidedBy: z.strictObject({ id: idSchema, name: z.string() }),
  decidedAt: z.iso.datetime(),
  version: z.int().min(1),
});
export type DecisionDto = z.infer<typeof decisionSchema>;
