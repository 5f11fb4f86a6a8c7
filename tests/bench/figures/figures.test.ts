import { describe, expect, it } from 'vitest';
import type { Tone } from '../../../shared/schemas/screening.js';
import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import type { LabelledCapture } from '../sets/LabelledCapture.js';
import { benchFigures } from './benchFigures.js';
import { clearToFigures } from './clearToFigures.js';
import { isClearable } from './isClearable.js';
import { raisedRateFigures } from './raisedRateFigures.js';
import { shareFigure } from './shareFigure.js';
import { countTones } from './toneFigures.js';

let made = 0;

function screened(
  given: Partial<Omit<ScreenedCapture, 'truth'>> & { truth?: Partial<LabelledCapture> },
): ScreenedCapture {
  return {
    failure: null,
    verdict: 'unproven',
    headline: null,
    foldScore: 0.5,
    logRatio: 0,
    prior: 0.5,
    clearToHz: null,
    protectionDb: 40,
    durationS: 10,
    tones: [],
    findings: [],
    simple: { edgeAgainstMidDb: -30, edgeAgainstTotalDb: -50 },
    elapsedMs: 10,
    ...given,
    truth: {
      set: 's',
      path: '/p',
      file: `f${made++}`,
      part: 'synthetic',
      family: 'noise',
      operation: 'sampled',
      filter: '',
      label: 'clean',
      source: '',
      sampleRateHz: 1000,
      isIrregular: false,
      bandFoldDb: [],
      tones: [],
      hasAllTones: true,
      isRateRaised: false,
      trueBandwidthHz: null,
      defects: [],
      lookalike: '',
      pairId: '',
      evidence: '',
      trueClearToHz: null,
      ...given.truth,
    },
  };
}

const tone = (
  frequencyHz: number,
  explanation: Tone['explanation'],
  trueFrequencyHz?: number,
): ScreenedCapture['tones'][number] => ({
  frequencyHz,
  explanation,
  ...(trueFrequencyHz === undefined ? {} : { trueFrequencyHz }),
  confidence: 0.99,
});

describe('countTones', () => {
  const truth: Partial<LabelledCapture> = {
    label: 'folded',
    tones: [
      { trueHz: 620, foldedHz: 380, isVisible: true },
      { trueHz: 700, foldedHz: 300, isVisible: true },
      { trueHz: 800, foldedHz: 200, isVisible: false },
      { trueHz: 900, foldedHz: null, isVisible: false },
    ],
  };

  it('counts visible ones found, their true frequency, and those that are none', () => {
    const count = countTones(
      screened({
        truth,
        tones: [
          tone(380.1, 'foldedHarmonic', 620),
          tone(300, 'movedBetweenRates', 1300),
          tone(200, 'foldedOrder', 800),
          tone(123, 'foldedSource', 877),
          tone(50, 'harmonic'),
        ],
      }),
    );
    expect(count).toEqual({ visible: 2, found: 2, trueRight: 1, reported: 4, wrong: 1, unjudged: 0 });
  });

  it('does not judge a stray one where the list is cut off, unless the capture is clean', () => {
    const tones = [tone(123, 'foldedSource', 877)];
    expect(countTones(screened({ truth: { ...truth, hasAllTones: false }, tones })).unjudged).toBe(1);
    expect(countTones(screened({ truth: { hasAllTones: false }, tones })).wrong).toBe(1);
  });

  it('leaves out uneven captures', () => {
    expect(countTones(screened({ truth: { ...truth, isIrregular: true } })).visible).toBe(0);
  });
});

describe('clearToFigures', () => {
  const bandFoldDb = [-90, -80, -70, -60, -50, -39, -20, -10, 0, 0];

  it('holds a claim up to the last band under the protection and breaks one that takes in the next', () => {
    const holding = clearToFigures([screened({ clearToHz: 299, truth: { bandFoldDb } })]);
    expect(holding.holds.count).toBe(1);
    const broken = clearToFigures([screened({ clearToHz: 300, truth: { bandFoldDb } })]);
    expect(broken.holds.count).toBe(0);
    expect(broken.broken[0]?.worstBandDb).toBe(-39);
  });

  it('tells claims that can fail from those too short to', () => {
    const figures = clearToFigures([screened({ clearToHz: 20, truth: { bandFoldDb } })]);
    expect(figures.holds.total).toBe(1);
    expect(figures.holdsWhereTestable.total).toBe(0);
  });

  it('sets a missing claim at 0 of what the true densities give', () => {
    const figures = clearToFigures([
      screened({ clearToHz: null, truth: { trueClearToHz: 100 } }),
      screened({ clearToHz: 90, truth: { trueClearToHz: 100 } }),
      screened({ clearToHz: 95, truth: { trueClearToHz: 100 } }),
    ]);
    expect(figures.shareOfTrueRule?.median).toBeCloseTo(0.9, 12);
    expect(figures.shareOfTrueRule?.lowerQuartile).toBe(0);
  });
});

describe('isClearable', () => {
  it('asks for 3 dB more than the protection and an untouched rate', () => {
    const at = (edgeAgainstTotalDb: number, isRateRaised = false): boolean =>
      isClearable(screened({ simple: { edgeAgainstMidDb: 0, edgeAgainstTotalDb }, truth: { isRateRaised } }));
    expect([at(-43), at(-42.9), at(-60, true)]).toEqual([true, false, false]);
    expect(isClearable(screened({ simple: null }))).toBe(false);
  });
});

describe('raisedRateFigures', () => {
  const finding = (trueBandwidthHz: number): ScreenedCapture['findings'][number] => ({
    kind: 'rateRaised',
    severity: 'limit',
    confidence: 0.9,
    text: '',
    evidence: { trueBandwidthHz },
  });

  it('wants the verdict and the bandwidth within 5 %', () => {
    const truth = { isRateRaised: true, trueBandwidthHz: 100 };
    const figures = raisedRateFigures([
      screened({ truth, verdict: 'limited', findings: [finding(104.9)] }),
      screened({ truth, verdict: 'limited', findings: [finding(106)] }),
      screened({ truth, verdict: 'unproven', findings: [finding(96)] }),
      screened({ verdict: 'limited' }),
    ]);
    expect([figures.calledLimited.count, figures.bandwidthRight.count, figures.both.count]).toEqual([2, 2, 1]);
    expect(figures.both.total).toBe(3);
  });
});

describe('shareFigure', () => {
  it('has wider limits when the captures come from few recordings', () => {
    const captures = (recordings: number): ScreenedCapture[] =>
      Array.from({ length: 100 }, (_, n) =>
        screened({
          verdict: (n % recordings) * 2 < recordings ? 'folded' : 'unproven',
          truth: { source: `r${n % recordings}` },
        }),
      );
    const width = (recordings: number): number => {
      const { byRecording } = shareFigure(captures(recordings), ({ verdict }) => verdict === 'folded');
      return byRecording.high - byRecording.low;
    };
    expect(width(4)).toBeGreaterThan(2 * width(100));
  });
});

describe('benchFigures', () => {
  const folded = (evidence: string, verdict: ScreenedCapture['verdict'], foldScore: number): ScreenedCapture =>
    screened({ verdict, foldScore, logRatio: 1, truth: { label: 'folded', evidence } });
  const figures = benchFigures([
    folded('tone', 'folded', 0.9),
    folded('no_rolloff', 'clear', 0.7),
    folded('weak', 'clear', 0.1),
    screened({ verdict: 'clear', foldScore: 0.2 }),
    screened({ verdict: 'folded', foldScore: 0.8 }),
    screened({ truth: { label: 'grey' }, verdict: 'folded', foldScore: 1 }),
    screened({ truth: { label: 'na' }, verdict: 'unproven', foldScore: null }),
  ]);
  const engine = figures.methods[0];

  it('leaves out grey ones, and weak ones unless said', () => {
    // 0.9 and 0.7 against 0.2 and 0.8: three of four pairs in order; with 0.1 three of six.
    expect(engine?.roc.all.area).toBeCloseTo(0.75, 12);
    expect(engine?.rocWithWeak.all.area).toBeCloseTo(0.5, 12);
    expect(engine?.cleanCalledFolded).toMatchObject({ count: 1, total: 2 });
    expect(engine?.foldedCalledClear).toMatchObject({ count: 1, total: 2 });
    expect(engine?.foldedCalledClearWithWeak).toMatchObject({ count: 2, total: 3 });
  });

  it('counts what is provable by the evidence there is', () => {
    expect(engine?.provableCalledFolded).toMatchObject({ count: 1, total: 1 });
    expect(figures.evidence.map(({ evidence }) => evidence)).toEqual(['no_rolloff', 'tone', 'weak']);
    expect(figures.naUnproven).toMatchObject({ count: 1, total: 1 });
  });

  it('sets the simple methods beside it on the same captures', () => {
    const script = figures.methods.find(({ name }) => name === 'Welch-and-threshold script');
    // An edge 50 dB under the total is no folding to it.
    expect(script?.cleanCalledFolded).toMatchObject({ count: 0, total: 2 });
    expect(script?.foldedCalledClear).toMatchObject({ count: 2, total: 2 });
  });
});
