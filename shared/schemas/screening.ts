import { z } from 'zod';

export const verdicts = ['folded', 'unproven', 'limited', 'clear'] as const;
export const verdictSchema = z.enum(verdicts);
export type Verdict = z.infer<typeof verdictSchema>;

export const toneExplanations = [
  'knownSource',
  'harmonic',
  'foldedSource',
  'foldedHarmonic',
  'foldedOrder',
  'movedBetweenRates',
  'image',
  'supply',
  'unexplained',
] as const;

/** A spectral line of one channel; levels in dB re 1 (full scale or unit, rms² power), frequencies in Hz. */
export const toneSchema = z.strictObject({
  frequencyHz: z.number(),
  uncertaintyHz: z.number(),
  levelDb: z.number(),
  standsOutDb: z.number(),
  explanation: z.enum(toneExplanations),
  /** Where the tone really belongs, when it is shown to be folded or is a recovered true frequency. */
  trueFrequencyHz: z.number().optional(),
  /** Every plausible true frequency, smallest zone first. */
  candidatesHz: z.array(z.number()).optional(),
  confidence: z.number().min(0).max(1),
  /** Probability that a match this close comes about by chance. */
  chanceProbability: z.number().min(0).max(1).optional(),
  /** "3 × 24.8 Hz", "supply 50 Hz × 5" …: which prediction explains it. */
  explainedBy: z.string().optional(),
});
export type Tone = z.infer<typeof toneSchema>;

export const findingKinds = [
  'foldedTone',
  'edgeFollowsSource',
  'bandEdgeUnprotected',
  'contaminationBound',
  'clearTo',
  'noRollOff',
  'noiseFloorLimits',
  'overSampled',
  'rateRaised',
  'clipping',
  'clippingHarmonics',
  'dropout',
  'offset',
  'coarseSteps',
  'notFinite',
  'timeStampGap',
  'timeStampRepeated',
  'timeStampJitter',
  'irregularStamps',
  'rateDisagrees',
  'rateUnknown',
  'tooShort',
  'silent',
  'truncatedFile',
  'sourceAtFold',
  'companionMissing',
  'foldedOrder',
  'reflectedSweep',
  'ambiguousFold',
  'foldedShare',
  'outerTriangle',
  'methodsDisagree',
  'foldedInOtherChannel',
] as const;
export const findingKindSchema = z.enum(findingKinds);
export type FindingKind = z.infer<typeof findingKindSchema>;

/** `fold`: shows folded energy; `limit`: limits what can be trusted; `unproven`: stops a statement; `note`: worth knowing. */
export const findingSeverities = ['fold', 'unproven', 'limit', 'note'] as const;
export type FindingSeverity = (typeof findingSeverities)[number];

/** One observation with its place, strength, confidence, and evidence in numbers and in one plain sentence. */
export const findingSchema = z.strictObject({
  kind: findingKindSchema,
  severity: z.enum(findingSeverities),
  confidence: z.number().min(0).max(1),
  frequencyHz: z.number().optional(),
  trueFrequencyHz: z.number().optional(),
  fromHz: z.number().optional(),
  toHz: z.number().optional(),
  fromS: z.number().optional(),
  toS: z.number().optional(),
  strengthDb: z.number().optional(),
  text: z.string(),
  /** Named numbers behind the sentence, each name ending in its unit. */
  evidence: z.record(z.string(), z.union([z.number(), z.string(), z.boolean()])).default({}),
  method: z.string(),
  source: z.string().optional(),
});
export type Finding = z.infer<typeof findingSchema>;

export const bandEdgeSummarySchema = z.strictObject({
  skirtDb: z.number().nullable(),
  edgeAboveFloorDb: z.number().nullable(),
  guardShareDb: z.number().nullable(),
});

/** What the judge says of one channel. */
export const channelJudgementSchema = z.strictObject({
  verdict: verdictSchema,
  foldScore: z.number().min(0).max(1).nullable(),
  /** Natural-log likelihood ratio behind the fold score, and the prior share of folded captures used. */
  foldLogLikelihoodRatio: z.number().nullable(),
  foldPrior: z.number().min(0).max(1),
  clearToHz: z.number().nullable(),
  protectionDb: z.number(),
  /** Upper bound on the one-sided density folded back at any frequency, dB re 1 (or unit²)/Hz. */
  contaminationBoundDb: z.number().nullable(),
  bandOfInterestHz: z.tuple([z.number(), z.number()]),
  guardStartHz: z.number().nullable(),
  bandEdge: bandEdgeSummarySchema,
  tones: z.array(toneSchema),
  findings: z.array(findingSchema),
});
export type ChannelJudgement = z.infer<typeof channelJudgementSchema>;

/** One line of the screen command, and one entry of a capture's `channels` in the API. */
export const channelScreenSchema = z.strictObject({
  schema: z.literal('overfold.screen/1'),
  file: z.string(),
  channel: z.int().min(0),
  channelName: z.string().optional(),
  unit: z.string().optional(),
  sampleRateHz: z.number().nullable(),
  samples: z.int().min(0),
  durationS: z.number().nullable(),
  ...channelJudgementSchema.shape,
  engine: z.strictObject({ version: z.string(), elapsedMs: z.number(), kernel: z.string().optional() }),
});
export type ChannelScreen = z.infer<typeof channelScreenSchema>;

export const screenErrorSchema = z.strictObject({
  schema: z.literal('overfold.screen/1'),
  file: z.string(),
  error: z.strictObject({ code: z.string(), message: z.string() }),
});
export type ScreenError = z.infer<typeof screenErrorSchema>;
