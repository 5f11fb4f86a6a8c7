import { z } from 'zod';

export const screeningQueueName = 'screening';

/** Payload is ids only: the row in PostgreSQL is the truth, the job a hint. */
export const screenCapturePayloadSchema = z.strictObject({ captureId: z.uuid(), attempt: z.int().min(1) });
export type ScreenCapturePayload = z.infer<typeof screenCapturePayloadSchema>;

/** BullMQ refuses job ids with a colon or of digits only. */
export const screenCaptureJobId = ({ captureId, attempt }: ScreenCapturePayload): string =>
  `cap-${captureId}-a${attempt}`;
