import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import { judgeCompanion } from '../../../shared/screening/judgeCompanion.js';
import type {
  CompanionMeasurement,
  FoldedBand,
  ToneMove,
  TonePlace,
} from '../../../shared/screening/MeasurementRecord.js';
import { aliasHz, candidatesHz } from '../../../shared/screening/foldArithmetic.js';
import { buildRecord, buildTone } from '../../support/buildRecord.js';

const alignment = {
  lagS: 0,
  lagErrorS: 1e-6,
  clockRatio: 1,
  significance: 30,
  chanceProbability: 1e-12,
  agreement: 0.9,
  isInverted: false,
  overlapS: 10,
};

/** A tone's places at 2000 Hz and 2500 Hz; something of its level stands where `stands` says. */
function moveOf(frequencyHz: number, stands: (trueHz: number) => boolean): ToneMove {
  const places = candidatesHz(frequencyHz, 2000, 5000).map((trueHz): TonePlace => ({
    trueHz,
    expectedHz: aliasHz(trueHz, 2500),
    ratioDb: stands(trueHz) ? -3 : -60,
    besideDb: -60,
    hereDb: null,
    coherence: stands(trueHz) ? 0.99 : 0.05,
  }));
  return { frequencyHz, soundsS: 5, isAligned: true, places };
}

const bandsOf = (coherence: number, powerDb: number): FoldedBand[] =>
  Array.from({ length: 10 }, (_, band) => ({
    fromHz: 100 * band,
    toHz: 100 * band + 100,
    powerDb: -10,
    zones: [
      { zone: 1, coherence: 0.9, independent: 400, inputs: 4, powerDb: -10.5, chanceDb: -40 },
      { zone: 2, coherence, independent: 400, inputs: 4, powerDb, chanceDb: -65 },
    ],
  }));

const companionOf = (moves: ToneMove[], folded: FoldedBand[] | null = null): CompanionMeasurement => ({
  name: 'fast.wav',
  sampleRateHz: 2500,
  durationS: 10,
  tones: [],
  alignment,
  moves,
  folded,
});

const inBand = [120, 333, 401];
const staying = inBand.map((hz) => moveOf(hz, (trueHz) => trueHz === hz));
const judge = (companion: CompanionMeasurement, tones = inBand.map((hz) => buildTone(hz))) =>
  judgeCompanion(buildRecord({ tones, companion }), defaultThresholds);

describe('judgeCompanion', () => {
  it('says nothing without a companion, with an older record, or at the same rate', () => {
    const nothing = { tones: [], findings: [], logRatio: 0, shownConfidence: 0 };
    expect(judgeCompanion(buildRecord(), defaultThresholds)).toEqual(nothing);
    expect(judge({ name: 'a', sampleRateHz: 2500, durationS: 1, tones: [] })).toEqual(nothing);
    expect(judge({ ...companionOf(staying), sampleRateHz: 2000 })).toEqual(nothing);
  });

  it('shows the folded share with the band that holds most of it, and calls the capture folded', () => {
    const companion = companionOf(staying, bandsOf(0.3, -18));
    const { findings, shownConfidence, logRatio } = judge(companion);
    const share = findings.find(({ kind }) => kind === 'foldedShare');
    // Nine tenths of the band count: 9 · 10^(−1.8).
    expect(share?.evidence['foldedShareDb']).toBeCloseTo(10 * Math.log10(9) - 18, 6);
    expect(share?.severity).toBe('fold');
    expect(shownConfidence).toBeGreaterThan(0.99);
    expect(logRatio).toBeGreaterThan(3);
    const tones = inBand.map((hz) => buildTone(hz));
    expect(judgeChannel(buildRecord({ tones, companion }), defaultThresholds, {}).verdict).toBe('folded');
  });

  it('notes a share under −40 dB without calling the capture folded', () => {
    const { findings, shownConfidence } = judge(companionOf(staying, bandsOf(0.3, -58)));
    expect(findings).toMatchObject([{ kind: 'foldedShare', severity: 'note' }]);
    expect(shownConfidence).toBe(0);
  });

  it('speaks for a clean capture when the companion accounts for everything at its own place', () => {
    const { findings, logRatio } = judge(companionOf(staying, bandsOf(0.001, -70)));
    expect(findings).toMatchObject([{ kind: 'foldedShare', severity: 'note', evidence: { showsNothing: true } }]);
    expect(logRatio).toBeLessThan(-3);
    expect(judge(companionOf(staying)).logRatio).toBeLessThan(0);
  });

  it('does not speak for it when a tone has moved or is missing from the companion', () => {
    const tones = [...inBand, 700].map((hz) => buildTone(hz));
    const missing = moveOf(700, () => false);
    expect(judge(companionOf([...staying, missing], bandsOf(0.001, -70)), tones).logRatio).toBe(0);
  });

  it('lists what both rates fold alike: 4548 Hz stands on 452 Hz at 5000 Hz and at 4096 Hz', () => {
    const places = [452, 4548].map((trueHz): TonePlace => ({
      trueHz,
      expectedHz: aliasHz(trueHz, 4096),
      ratioDb: -3,
      besideDb: -60,
      hereDb: null,
      coherence: 0.99,
    }));
    expect(places.map(({ expectedHz }) => expectedHz)).toEqual([452, 452]);
    const companion = {
      ...companionOf([{ frequencyHz: 452, soundsS: 5, isAligned: true, places }]),
      sampleRateHz: 4096,
    };
    const record = buildRecord({ sampleRateHz: 5000, tones: [buildTone(452)], companion });
    const { findings } = judgeCompanion(record, defaultThresholds);
    expect(findings).toMatchObject([{ kind: 'ambiguousFold', frequencyHz: 452 }]);
    expect(findings[0]?.text).toContain('4548 Hz');
    const { tones } = judgeChannel(record, defaultThresholds, {});
    expect(tones[0]?.candidatesHz).toEqual([452, 4548]);
    expect(tones[0]?.explanation).not.toBe('movedBetweenRates');
  });

  it('says that a companion of another event is of no use', () => {
    const moves = [120, 333, 401, 640, 717].map((hz) => ({
      ...moveOf(hz, (trueHz) => hz === 640 && trueHz > 2000),
      isAligned: false,
    }));
    const other = { ...companionOf(moves), alignment: { ...alignment, chanceProbability: 0.4, agreement: 0.03 } };
    const tones = moves.map(({ frequencyHz }) => buildTone(frequencyHz));
    const { findings, logRatio } = judge(other, tones);
    expect(findings).toMatchObject([{ kind: 'companionMissing', severity: 'note' }]);
    expect(logRatio).toBe(0);
    const judged = judgeChannel(buildRecord({ tones, companion: other }), defaultThresholds, {});
    expect(judged.tones.every(({ explanation }) => explanation !== 'movedBetweenRates')).toBe(true);
  });
});
