import { z } from 'zod';

/** GET /api/health */
export const healthSchema = z.strictObject({
  status: z.enum(['ok', 'degraded']),
  parts: z.record(z.string(), z.strictObject({ ok: z.boolean(), message: z.string().optional() })),
});
export type Health = z.infer<typeof healthSchema>;

/** GET /api/v1/settings: what the client must know before sign-in; limits are told before an upload. */
export const publicSettingsSchema = z.strictObject({
  isDemo: z.boolean(),
  demoAccounts: z.array(
    z.strictObject({ role: z.string(), name: z.string(), email: z.string(), password: z.string() }),
  ),
  version: z.string(),
  limits: z.strictObject({
    maxFileBytes: z.int(),
    maxFilesPerBatch: z.int(),
    maxFilesPerRequest: z.int(),
    maxChannels: z.int(),
  }),
});
export type PublicSettings = z.infer<typeof publicSettingsSchema>;

/** GET /start: what waits for the signed-in user. */
export const startPageSchema = z.strictObject({
  awaitingReview: z.int(),
  retakesAsked: z.int(),
  failedCaptures: z.int(),
  queue: z.strictObject({ waiting: z.int(), screening: z.int() }),
});
export type StartPage = z.infer<typeof startPageSchema>;

/** Messages kept by the local SMTP fake; demo installations only. */
export const demoMailSchema = z.strictObject({
  id: z.string(),
  from: z.string(),
  to: z.string(),
  subject: z.string(),
  sentAt: z.iso.datetime(),
});
export const demoMailDetailSchema = demoMailSchema.extend({ text: z.string(), html: z.string() });
export type DemoMail = z.infer<typeof demoMailSchema>;
export type DemoMailDetail = z.infer<typeof demoMailDetailSchema>;

export const mailStates = ['pending', 'sending', 'sent', 'failed', 'unknown'] as const;
export const mailStateSchema = z.enum(mailStates);

/** GET /mail: what the outbox holds, without its texts (they carry one-time links). */
export const mailMessageSchema = z.strictObject({
  id: z.uuid(),
  kind: z.string(),
  recipient: z.string(),
  subject: z.string(),
  state: mailStateSchema,
  attempts: z.int(),
  lastError: z.string().nullable(),
  createdAt: z.iso.datetime(),
  sentAt: z.iso.datetime().nullable(),
});
export type MailMessageDto = z.infer<typeof mailMessageSchema>;
export const mailListSchema = z.strictObject({ items: z.array(mailMessageSchema) });
export const mailListQuerySchema = z.strictObject({ state: mailStateSchema.optional() });
export const demoMailListSchema = z.strictObject({ items: z.array(demoMailSchema) });
