import type { z } from 'zod';
import { screenCapturePayloadSchema, type ScreenCapturePayload } from '../shared/jobs/screenCapture.js';
import { screenCapture } from './processors/screenCapture.js';
import type { WorkerContext } from './WorkerContext.js';

interface JobPayloads {
  screenCapture: ScreenCapturePayload;
}
export type JobName = keyof JobPayloads;

type Processor<Payload> = (payload: Payload, context: WorkerContext, signal: AbortSignal) => Promise<void>;

/** Every job name with the schema its payload must meet and the processor that does it; a missing one fails the build. */
export const registry: {
  [Name in JobName]: { payloadSchema: z.ZodType<JobPayloads[Name]>; process: Processor<JobPayloads[Name]> };
} = {
  screenCapture: { payloadSchema: screenCapturePayloadSchema, process: screenCapture },
};

export const isJobName = (name: string): name is JobName => Object.hasOwn(registry, name);
