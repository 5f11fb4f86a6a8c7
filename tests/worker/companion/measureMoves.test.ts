import { describe, expect, it } from 'vitest';
import { companionGainDb } from '../../../shared/screening/companionGain.js';
import { judgeMove } from '../../../shared/screening/judgeMove.js';
import type { CompanionMeasurement } from '../../../shared/screening/MeasurementRecord.js';
import { measureMoves } from '../../../worker/companion/measureMoves.js';
import { buildTone } from '../../support/buildRecord.js';
import { sampled, struck } from '../../support/struckPair.js';

const inBand = [
  { frequencyHz: 318.2, amplitude: 1, decayS: 0.9 },
  { frequencyHz: 741.7, amplitude: 0.6, decayS: 0.5, phase: 1 },
  { frequencyHz: 1507.1, amplitude: 0.5, decayS: 2, phase: 2 },
];
const event = struck([...inBand, { frequencyHz: 5755.76, amplitude: 0.2, decayS: 0.5 }], 0);
// 5755.76 Hz lands on 755.76 Hz at 5000 Hz and on 1659.76 Hz at 4096 Hz.
const here = [...inBand.map(({ frequencyHz }) => buildTone(frequencyHz)), buildTone(755.76, { levelDb: -44 })];
const companion: CompanionMeasurement = {
  name: 'b.wav',
  sampleRateHz: 4096,
  durationS: 4,
  tones: [...inBand.map(({ frequencyHz }) => buildTone(frequencyHz)), buildTone(1659.76, { levelDb: -44 })],
};

function judge(
  lagS: number | null,
  own: Float64Array,
  other: Float64Array,
): { outcome: string; trueHz: number | undefined }[] {
  const moves = measureMoves(
    { samples: own, rateHz: 5000 },
    { samples: other, rateHz: 4096 },
    lagS === null ? null : { lagS, clockRatio: 1 },
    here,
    10_000,
  );
  const gainDb = companionGainDb(moves) ?? Number.NaN;
  return here.map((tone) => {
    const move = moves.find(({ frequencyHz }) => frequencyHz === tone.frequencyHz);
    if (move === undefined) throw new Error('The tone was not looked for.');
    const { outcome, place } = judgeMove(move, tone, companion, gainDb);
    return { outcome, trueHz: place?.trueHz };
  });
}

describe('measureMoves', () => {
  it('shows a decaying tone at the place of its true frequency only, whatever the lag and the gain', () => {
    const own = sampled(event, 5000, 4, { noise: 0.02, seed: 1 });
    const other = sampled(event, 4096, 4.5, { startS: -0.37, gain: 0.03, noise: 0.0006, seed: 2 });
    const found = judge(0.37, own, other);
    expect(found.map(({ outcome }) => outcome)).toEqual(['stays', 'stays', 'stays', 'moved']);
    expect(found[3]?.trueHz).toBeCloseTo(5755.76, 6);
  });

  it('does so by power when the event was repeated', () => {
    const again = struck(
      [...inBand, { frequencyHz: 5755.76, amplitude: 0.2, decayS: 0.5 }].map((tone, index) => ({
        ...tone,
        phase: index,
      })),
      0.6,
    );
    const own = sampled(event, 5000, 4, { noise: 0.02, seed: 1 });
    const other = sampled(again, 4096, 5, { gain: 0.03, noise: 0.0006, seed: 2 });
    const found = judge(null, own, other);
    expect(found.map(({ outcome }) => outcome)).toEqual(['stays', 'stays', 'stays', 'moved']);
    expect(found[3]?.trueHz).toBeCloseTo(5755.76, 6);
  });

  it('tells a folded tone from one that stands beside its place in both captures', () => {
    // 1659.76 Hz is where 5755.76 Hz lands at 4096 Hz; 1659.1 Hz is a true tone, twice as strong.
    const beside = struck(
      [
        ...inBand,
        { frequencyHz: 1659.1, amplitude: 0.4, decayS: 0.8 },
        { frequencyHz: 5755.76, amplitude: 0.2, decayS: 0.9 },
      ],
      0,
    );
    const own = sampled(beside, 5000, 4, { noise: 0.005, seed: 1 });
    const other = sampled(beside, 4096, 4, { noise: 0.005, seed: 2 });
    const found = judge(0, own, other);
    expect(found[3]?.outcome).toBe('moved');
    expect(found[3]?.trueHz).toBeCloseTo(5755.76, 6);
  });

  it('keeps a tone of one capture alone, as converters make them, from being called moved', () => {
    const clean = struck(inBand, 0);
    const own = sampled(clean, 5000, 4, { noise: 0.02, seed: 1 }).map(
      (value, n) => value + 0.1 * Math.sin((2 * Math.PI * 755.76 * n) / 5000),
    );
    const other = sampled(clean, 4096, 4, { noise: 0.02, seed: 2 });
    expect(judge(0, own, other).map(({ outcome }) => outcome)).toEqual(['stays', 'stays', 'stays', 'absent']);
  });

  it('solves |f − n₁·fs₁| = fa₁ and |f − n₂·fs₂| = fa₂ beyond the first zones: 2·5000 + 1717.3 = 3·4096 − 570.7 (Xia 1999)', () => {
    const far = struck([...inBand, { frequencyHz: 11_717.3, amplitude: 0.3, decayS: 0.7 }], 0);
    const own = sampled(far, 5000, 4, { noise: 0.01, seed: 1 });
    const other = sampled(far, 4096, 4, { noise: 0.01, seed: 2 });
    const tones = [...inBand.map(({ frequencyHz }) => buildTone(frequencyHz)), buildTone(1717.3)];
    const clock = { lagS: 0, clockRatio: 1 };
    const moves = measureMoves({ samples: own, rateHz: 5000 }, { samples: other, rateHz: 4096 }, clock, tones, 12_500);
    const move = moves.find(({ frequencyHz }) => frequencyHz === 1717.3);
    if (move === undefined) throw new Error('The tone was not looked for.');
    const { outcome, place } = judgeMove(move, buildTone(1717.3), companion, companionGainDb(moves) ?? Number.NaN);
    expect(outcome).toBe('moved');
    expect(place?.trueHz).toBeCloseTo(11_717.3, 6);
    expect(place?.expectedHz).toBeCloseTo(570.7, 6);
  });

  it('finds nothing to compare where the captures do not overlap', () => {
    const own = sampled(event, 5000, 1);
    const other = sampled(event, 4096, 1);
    expect(
      measureMoves(
        { samples: own, rateHz: 5000 },
        { samples: other, rateHz: 4096 },
        { lagS: 3, clockRatio: 1 },
        here,
        9000,
      ),
    ).toEqual([]);
  });
});
