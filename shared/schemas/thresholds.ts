import { z } from 'zod';

export interface ThresholdInfo {
  label: string;
  unit: string;
  defaultValue: number | boolean;
  minimum?: number;
  maximum?: number;
  step?: number;
  help: string;
}

/** One entry a threshold: the form, the API's limits and the help text all come from here. */
export const thresholdInfo = {
  guardStart: {
    label: 'Guard band starts at',
    unit: 'of folding frequency',
    defaultValue: 0.8,
    minimum: 0.5,
    maximum: 0.98,
    step: 0.01,
    help: 'The guard band is the stretch from here to the folding frequency; a filtered capture holds little energy there.',
  },
  maxGuardShareDb: {
    label: 'Largest guard-band share',
    unit: 'dB',
    defaultValue: -40,
    minimum: -120,
    maximum: 0,
    step: 1,
    help: 'Power in the guard band over total power; above this the band edge is reported as unprotected.',
  },
  minSkirtDb: {
    label: 'Least skirt depth',
    unit: 'dB',
    defaultValue: 20,
    minimum: 0,
    maximum: 120,
    step: 1,
    help: 'By how much the density must fall from the band of interest to the band edge.',
  },
  requiredProtectionDb: {
    label: 'Required protection',
    unit: 'dB',
    defaultValue: 40,
    minimum: 6,
    maximum: 120,
    step: 1,
    help: 'By how much the signal must stand above the largest alias contamination for a frequency to count as clear.',
  },
  toneStandsOutDb: {
    label: 'A tone stands out by',
    unit: 'dB',
    defaultValue: 10,
    minimum: 3,
    maximum: 60,
    step: 1,
    help: 'Height over the local floor from which a peak is treated as a tone.',
  },
  confidence: {
    label: 'Confidence asked for',
    unit: '',
    defaultValue: 0.95,
    minimum: 0.5,
    maximum: 0.9999,
    step: 0.01,
    help: 'A finding is used for a verdict only when its confidence reaches this value.',
  },
  rateFactor: {
    label: 'Rate over highest frequency of interest',
    unit: '×',
    defaultValue: 2.56,
    minimum: 2.01,
    maximum: 100,
    step: 0.01,
    help: 'Without a stated highest frequency the band of interest reaches to the sampling rate over this factor.',
  },
  maxClippedShare: {
    label: 'Largest clipped share',
    unit: 'of samples',
    defaultValue: 1e-4,
    minimum: 0,
    maximum: 1,
    step: 1e-5,
    help: 'Share of samples at the converter limits above which the capture cannot be cleared, unless the clipped stretches can be left out.',
  },
  maxMissingShare: {
    label: 'Largest missing share',
    unit: 'of samples',
    defaultValue: 1e-3,
    minimum: 0,
    maximum: 1,
    step: 1e-4,
    help: 'Share of missing samples (dropouts, gaps, not-a-number) above which the capture cannot be cleared, unless the damaged stretches can be left out.',
  },
  maxJitterShare: {
    label: 'Largest jitter share',
    unit: 'of sampling interval',
    defaultValue: 0.01,
    minimum: 0,
    maximum: 1,
    step: 0.001,
    help: 'Spread of the time stamps over the sampling interval above which the stamps are treated as irregular.',
  },
  minDurationS: {
    label: 'Shortest capture',
    unit: 's',
    defaultValue: 0,
    minimum: 0,
    maximum: 86_400,
    step: 0.1,
    help: 'A shorter capture is not judged. At 0 only the number of samples counts: at least 256.',
  },
  independentReview: {
    label: 'Independent review',
    unit: '',
    defaultValue: false,
    help: 'When on, whoever uploaded a capture may not decide on it.',
  },
} as const satisfies Record<string, ThresholdInfo>;

const bounded = (info: { minimum: number; maximum: number; defaultValue: number }) =>
  z.number().min(info.minimum).max(info.maximum).default(info.defaultValue);

export const thresholdsSchema = z.strictObject({
  guardStart: bounded(thresholdInfo.guardStart),
  maxGuardShareDb: bounded(thresholdInfo.maxGuardShareDb),
  minSkirtDb: bounded(thresholdInfo.minSkirtDb),
  requiredProtectionDb: bounded(thresholdInfo.requiredProtectionDb),
  toneStandsOutDb: bounded(thresholdInfo.toneStandsOutDb),
  confidence: bounded(thresholdInfo.confidence),
  rateFactor: bounded(thresholdInfo.rateFactor),
  maxClippedShare: bounded(thresholdInfo.maxClippedShare),
  maxMissingShare: bounded(thresholdInfo.maxMissingShare),
  maxJitterShare: bounded(thresholdInfo.maxJitterShare),
  minDurationS: bounded(thresholdInfo.minDurationS),
  independentReview: z.boolean().default(thresholdInfo.independentReview.defaultValue),
});

export type Thresholds = z.infer<typeof thresholdsSchema>;
export type ThresholdName = keyof Thresholds;

export const defaultThresholds: Thresholds = thresholdsSchema.parse({});

/** Answer of GET /projects/:projectId/thresholds. */
export const thresholdsVersionSchema = z.strictObject({
  version: z.int().min(1),
  values: thresholdsSchema,
  authorName: z.string().nullable(),
  reason: z.string(),
  createdAt: z.iso.datetime(),
});
export type ThresholdsVersionDto = z.infer<typeof thresholdsVersionSchema>;

export const thresholdsResponseSchema = z.strictObject({
  current: thresholdsVersionSchema,
  history: z.array(thresholdsVersionSchema),
});
export type ThresholdsResponse = z.infer<typeof thresholdsResponseSchema>;

export const putThresholdsSchema = z.strictObject({
  values: thresholdsSchema,
  reason: z.string().trim().min(3).max(500),
});
export type PutThresholds = z.infer<typeof putThresholdsSchema>;

const { shape } = thresholdsSchema;
/** Some of the values: those left out keep what is in force. */
export const partialThresholdsSchema = z.strictObject({
  guardStart: shape.guardStart.unwrap().optional(),
  maxGuardShareDb: shape.maxGuardShareDb.unwrap().optional(),
  minSkirtDb: shape.minSkirtDb.unwrap().optional(),
  requiredProtectionDb: shape.requiredProtectionDb.unwrap().optional(),
  toneStandsOutDb: shape.toneStandsOutDb.unwrap().optional(),
  confidence: shape.confidence.unwrap().optional(),
  rateFactor: shape.rateFactor.unwrap().optional(),
  maxClippedShare: shape.maxClippedShare.unwrap().optional(),
  maxMissingShare: shape.maxMissingShare.unwrap().optional(),
  maxJitterShare: shape.maxJitterShare.unwrap().optional(),
  minDurationS: shape.minDurationS.unwrap().optional(),
  independentReview: shape.independentReview.unwrap().optional(),
});
export type PartialThresholds = z.infer<typeof partialThresholdsSchema>;

/**
 * Body of PUT /projects/:projectId/thresholds: `{values, reason}`, or, for scripts, the bare values.
 * One object rather than a choice of two, so that a wrong value is named by its own path.
 */
export const changeThresholdsSchema = partialThresholdsSchema
  .extend({
    values: partialThresholdsSchema.optional(),
    reason: putThresholdsSchema.shape.reason.optional(),
  })
  .superRefine(({ values, reason, ...bare }, context) => {
    const bareNames = Object.entries(bare).filter(([, value]) => value !== undefined);
    if (!values && bareNames.length === 0) {
      context.addIssue({ code: 'custom', path: ['values'], message: 'Give at least one value.' });
    }
    if (values && reason === undefined) {
      context.addIssue({ code: 'custom', path: ['reason'], message: 'Say why the thresholds change.' });
    }
    if (values) {
      for (const [name] of bareNames) {
        context.addIssue({ code: 'custom', path: [name], message: 'Put this into "values", beside the others.' });
      }
    }
  });
export type ChangeThresholds = z.infer<typeof changeThresholdsSchema>;
