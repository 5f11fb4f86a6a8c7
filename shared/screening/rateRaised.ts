import type { Finding } from '../schemas/screening.js';
import { formatHz } from './formatNumber.js';
import type { OldRate } from './oldRate.js';

const seen: Record<OldRate['by'], string> = {
  held: 'values are repeated between every old sample and the next',
  straight: 'the values between every old sample and the next lie on a straight line',
  mirror: 'the spectrum is mirrored about the old folding frequency and its multiples',
  cliff: 'the density breaks off more steeply than any filter before a converter',
};
const methods: Record<OldRate['by'], { method: string; source?: string }> = {
  held: { method: 'first differences by place modulo the factor', source: 'Crochiere & Rabiner 1983' },
  straight: { method: 'second differences by place modulo the factor', source: 'Crochiere & Rabiner 1983' },
  mirror: { method: 'correlation of the log density with its mirror' },
  cliff: { method: 'fall of the smoothed density within a twelfth of the frequency' },
};
const confidences: Record<OldRate['by'], number> = { held: 0.999, straight: 0.999, mirror: 0.97, cliff: 0.95 };

/** The rate was raised (or the capture filtered) after sampling: what folded before can no longer be seen at the edge. */
export function rateRaised(old: OldRate, sampleRateHz: number): Finding {
  const { trueBandwidthHz, foldingFrequencyHz, factor, by } = old;
  const what =
    factor === null
      ? 'The rate was raised or the capture was filtered after sampling'
      : `The rate was raised ${factor}-fold from ${formatHz(sampleRateHz / factor)} after sampling`;
  const rest =
    foldingFrequencyHz === null
      ? "the edge of the first recording can't be seen"
      : `what stands above ${formatHz(foldingFrequencyHz)} are images`;
  return {
    kind: 'rateRaised',
    severity: 'limit',
    confidence: confidences[by],
    frequencyHz: trueBandwidthHz,
    toHz: sampleRateHz / 2,
    text: `${what}: ${seen[by]}. The true bandwidth is ${formatHz(trueBandwidthHz)}, and ${rest}.`,
    evidence: {
      trueBandwidthHz,
      ...(foldingFrequencyHz === null ? {} : { oldFoldingFrequencyHz: foldingFrequencyHz }),
      ...(factor === null ? {} : { factor }),
    },
    ...methods[by],
  };
}
