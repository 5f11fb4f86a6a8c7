import { z } from 'zod';

export const filterTypes = ['unknown', 'none', 'butterworth', 'chebyshev1', 'elliptic', 'firDecimator'] as const;

/** How the anti-alias filter in front of the converter is built, as far as the team knows. */
export const antiAliasFilterSchema = z.strictObject({
  type: z.enum(filterTypes),
  order: z.int().min(1).max(20).optional(),
  cornerHz: z.number().positive().max(1e9).optional(),
  rippleDb: z.number().positive().max(6).optional(),
  stopbandDb: z.number().positive().max(200).optional(),
});

/** A source the team knows about: supply, tooth mesh, blade passing … at a fixed frequency. */
export const knownSourceSchema = z.strictObject({
  name: z.string().trim().max(80).optional(),
  frequencyHz: z.number().positive().max(1e9),
});

/**
 * How a capture was recorded. Set for a batch, overridden per file; every field may be missing.
 * Frequencies in Hz; `scale` is units per full scale (WAV) or per written number (CSV).
 */
export const acquisitionSheetSchema = z.strictObject({
  sampleRateHz: z.number().positive().max(1e9).optional(),
  lowestFrequencyHz: z.number().nonnegative().max(1e9).optional(),
  highestFrequencyHz: z.number().positive().max(1e9).optional(),
  sensorBandHz: z.number().positive().max(1e9).optional(),
  sensorResonanceHz: z.number().positive().max(1e9).optional(),
  noiseFloorDb: z.number().min(-300).max(100).optional(),
  filter: antiAliasFilterSchema.optional(),
  sources: z.array(knownSourceSchema).max(64).optional(),
  nominalSpeedHz: z.number().positive().max(1e6).optional(),
  supplyHz: z.number().positive().max(1e4).optional(),
  unit: z.string().trim().max(24).optional(),
  scale: z
    .number()
    .refine((value) => value !== 0, 'must not be 0')
    .optional(),
  logger: z.string().trim().max(80).optional(),
  position: z.string().trim().max(80).optional(),
  companion: z.string().trim().max(255).optional(),
  pair: z.string().trim().max(80).optional(),
  notes: z.string().trim().max(2000).optional(),
});

export type AntiAliasFilter = z.infer<typeof antiAliasFilterSchema>;
export type KnownSource = z.infer<typeof knownSourceSchema>;
export type AcquisitionSheet = z.infer<typeof acquisitionSheetSchema>;
