import { z } from 'zod';
import { acquisitionSheetSchema } from './acquisitionSheet.js';
import { idSchema, pageOf, pageQuerySchema } from './common.js';
import { csvLayoutSchema } from './csvLayout.js';
import { decisionSchema } from './decision.js';
import { channelScreenSchema, findingKindSchema, verdictSchema } from './screening.js';

export const captureStates = ['received', 'queued', 'screening', 'screened', 'failed'] as const;
export const captureStateSchema = z.enum(captureStates);
export type CaptureState = z.infer<typeof captureStateSchema>;

export const captureFormats = ['wav', 'csv'] as const;
export type CaptureFormat = (typeof captureFormats)[number];

export const failureSchema = z.strictObject({ code: z.string(), message: z.string(), line: z.int().optional() });
export type FailureDto = z.infer<typeof failureSchema>;

/** A capture as a row of a list. */
export const captureRowSchema = z.strictObject({
  id: idSchema,
  batchId: idSchema,
  batchName: z.string(),
  projectId: idSchema,
  projectName: z.string(),
  fileName: z.string(),
  format: z.enum(captureFormats),
  sizeBytes: z.int(),
  sha256: z.string(),
  state: captureStateSchema,
  progress: z.number(),
  verdict: verdictSchema.nullable(),
  foldScore: z.number().nullable(),
  clearToHz: z.number().nullable(),
  sampleRateHz: z.number().nullable(),
  durationS: z.number().nullable(),
  channelCount: z.int().nullable(),
  logger: z.string().nullable(),
  position: z.string().nullable(),
  /** The sentence of the gravest finding. */
  headline: z.string().nullable(),
  failure: failureSchema.nullable(),
  decision: decisionSchema.nullable(),
  /** The same bytes were uploaded to this project before, under that capture. */
  duplicateOfId: idSchema.nullable(),
  uploadedBy: z.strictObject({ id: idSchema, name: z.string() }).nullable(),
  createdAt: z.iso.datetime(),
  screenedAt: z.iso.datetime().nullable(),
});
export type CaptureRow = z.infer<typeof captureRowSchema>;
export const capturePageSchema = pageOf(captureRowSchema);

export const historyEntrySchema = z.strictObject({
  at: z.iso.datetime(),
  actorName: z.string().nullable(),
  action: z.string(),
  text: z.string(),
});
export type HistoryEntry = z.infer<typeof historyEntrySchema>;

/** The capture of the same event at another rate that a capture was to be compared with; always of the same project. */
export const companionSchema = z.strictObject({
  id: idSchema,
  fileName: z.string(),
  sampleRateHz: z.number().nullable(),
  /** False: the results were made without it; the note says why. */
  isCompared: z.boolean(),
});
export type CompanionDto = z.infer<typeof companionSchema>;

/** GET /captures/:captureId */
export const captureSchema = z.strictObject({
  ...captureRowSchema.shape,
  failure: failureSchema.nullable().optional(),
  channels: z.array(channelScreenSchema),
  /** The batch's sheet with the file's own values on top: what the judge used. */
  acquisition: acquisitionSheetSchema,
  /** Only the values set for this file. */
  acquisitionOverride: acquisitionSheetSchema,
  csvLayout: csvLayoutSchema.nullable(),
  /** Null unless the capture is screened. */
  companion: companionSchema.nullable(),
  /** Why no companion was compared although the sheet asks for one, and what to do. */
  companionNote: z.string().nullable(),
  thresholdsVersion: z.int().nullable(),
  guardStart: z.number().nullable(),
  engineVersion: z.string().nullable(),
  decisions: z.array(decisionSchema),
  decisionVersion: z.int(),
  history: z.array(historyEntrySchema),
  /** What the asking user may do now. */
  permissions: z.strictObject({ decide: z.boolean(), edit: z.boolean(), decideRefusal: z.string().nullable() }),
});
export type CaptureDto = z.infer<typeof captureSchema>;

export const captureListQuerySchema = pageQuerySchema.extend({
  verdict: verdictSchema.optional(),
  state: captureStateSchema.optional(),
});
export type CaptureListQuery = z.input<typeof captureListQuerySchema>;

/** GET /review: captures that wait for a decision, or that were decided, over all the user's projects. */
export const reviewQuerySchema = pageQuerySchema.extend({
  projectId: idSchema.optional(),
  batchId: idSchema.optional(),
  verdict: verdictSchema.optional(),
  findingKind: findingKindSchema.optional(),
  decided: z.enum(['no', 'yes', 'all']).default('no'),
  clearToBelowHz: z.coerce.number().positive().optional(),
  search: z.string().trim().max(120).optional(),
  sort: z.enum(['newest', 'oldest', 'foldScore', 'clearTo', 'fileName']).default('foldScore'),
});
export type ReviewQuery = z.input<typeof reviewQuerySchema>;

/** JSON of the multipart field `acquisition`: file name -> sheet; and of `csvLayout`: file name -> layout. */
export const acquisitionByFileSchema = z.record(z.string().max(1024), acquisitionSheetSchema);
export const csvLayoutByFileSchema = z.record(z.string().max(1024), csvLayoutSchema);

export const uploadedCaptureSchema = z.strictObject({
  id: idSchema,
  fileName: z.string(),
  state: captureStateSchema,
  sha256: z.string(),
  sizeBytes: z.int(),
  format: z.enum(captureFormats),
  duplicateOfId: idSchema.nullable(),
});
export const uploadResponseSchema = z.strictObject({
  captures: z.array(uploadedCaptureSchema),
  refused: z.array(z.strictObject({ fileName: z.string(), code: z.string(), message: z.string() })),
});
export type UploadResponse = z.infer<typeof uploadResponseSchema>;

/** PUT /captures/:captureId/acquisition: new sheet (and layout); re-judged, and screened again only where needed. */
export const putAcquisitionSchema = z.strictObject({
  acquisition: acquisitionSheetSchema,
  csvLayout: csvLayoutSchema.nullable().optional(),
});
export type PutAcquisition = z.infer<typeof putAcquisitionSchema>;

/** GET /captures/:captureId/spectrum */
export const spectrumQuerySchema = z.strictObject({
  channel: z.coerce.number().int().min(0).max(63).default(0),
  kind: z.enum(['survey', 'fine']).default('survey'),
  fromHz: z.coerce.number().nonnegative().optional(),
  toHz: z.coerce.number().positive().optional(),
  points: z.coerce.number().int().min(16).max(8192).default(2048),
});
/** Densities in dB re (unit or full scale)²/Hz. Where bins are pooled, `densityDb` holds the largest of each pool. */
export const spectrumSchema = z.strictObject({
  channel: z.int(),
  kind: z.enum(['survey', 'fine']),
  unit: z.string(),
  sampleRateHz: z.number(),
  foldingFrequencyHz: z.number(),
  resolutionHz: z.number(),
  segments: z.int(),
  frequencyHz: z.array(z.number()),
  densityDb: z.array(z.number()),
  medianDb: z.array(z.number()).nullable(),
});
export type SpectrumDto = z.infer<typeof spectrumSchema>;
