import { describe, expect, it } from 'vitest';
import type { Tone } from '../../../shared/schemas/screening.js';
import { type FoldEvidence, joinEvidence } from '../../../shared/screening/FoldEvidence.js';

const tone = (frequencyHz: number, explanation: Tone['explanation'], confidence: number): Tone => ({
  frequencyHz,
  uncertaintyHz: 0.01,
  levelDb: -30,
  standsOutDb: 20,
  explanation,
  confidence,
});
const evidence = (tones: Tone[], logRatio = 0, shownConfidence = 0): FoldEvidence => ({
  tones,
  findings: [],
  logRatio,
  shownConfidence,
});

describe('joinEvidence', () => {
  it('lists a tone once, with the explanation that says most', () => {
    const joined = joinEvidence(
      [
        evidence([tone(100, 'unexplained', 0), tone(200, 'harmonic', 0.9)]),
        evidence([tone(100.02, 'foldedOrder', 0.99), tone(200.02, 'unexplained', 0), tone(300, 'harmonic', 0.8)]),
      ],
      0.1,
    );
    expect(joined.tones.map(({ explanation }) => explanation)).toEqual(['foldedOrder', 'harmonic', 'harmonic']);
  });

  it('adds likelihood ratios and keeps the surest of what is shown', () => {
    const joined = joinEvidence([evidence([], 1, 0.9), evidence([], -0.5, 0.99)], 1);
    expect(joined.logRatio).toBeCloseTo(0.5, 12);
    expect(joined.shownConfidence).toBe(0.99);
    expect(joinEvidence([], 1).shownConfidence).toBe(0);
  });
});
