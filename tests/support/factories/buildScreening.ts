import type { ScreenedChannel, ScreeningResult } from '../../../server/repositories/saveScreening.js';
import type { ChannelScreen, Finding } from '../../../shared/schemas/screening.js';
import type { MeasurementRecord } from '../../../shared/screening/MeasurementRecord.js';

export function buildFinding(overrides: Partial<Finding> = {}): Finding {
  return {
    kind: 'foldedTone',
    severity: 'fold',
    confidence: 0.98,
    frequencyHz: 72,
    trueFrequencyHz: 5928,
    text: 'The tone at 72 Hz is the supply harmonic of 5928 Hz folded once.',
    evidence: { standsOutDb: 31.5 },
    method: 'predicted fold',
    ...overrides,
  };
}

/** What the measuring half leaves of a channel on which nothing could be measured: enough for the judge. */
export function buildMeasurementRecord(overrides: Partial<MeasurementRecord> = {}): MeasurementRecord {
  return {
    version: 1,
    channel: 0,
    channelName: '',
    unit: '',
    format: 'wav',
    sampleRateHz: 6000,
    headerRateHz: 6000,
    samples: 60_000,
    durationS: 10,
    obstacles: ['silent'],
    warnings: [],
    level: null,
    integrity: {
      notFiniteCount: 0,
      clippedCount: 0,
      clippedShare: 0,
      clippedRuns: 0,
      clippedSpans: [],
      clipsBelowFullScale: false,
      missingShare: 0,
      dropoutCount: 0,
      dropouts: [],
      pauses: [],
      pauseCount: 0,
      pauseShare: 0,
      offsetShare: 0,
      quantum: null,
      usedBits: null,
      nominalBits: 16,
      stepsPerDeviation: null,
      quantisationFloorDb: null,
    },
    timeStamps: null,
    profile: null,
    edge: null,
    damageLeftOut: false,
    tones: [],
    irregular: null,
    companion: null,
    ...overrides,
  };
}

export function buildChannelScreen(overrides: Partial<ChannelScreen> = {}): ChannelScreen {
  return {
    schema: 'overfold.screen/1',
    file: 'pump.wav',
    channel: 0,
    sampleRateHz: 6000,
    samples: 60_000,
    durationS: 10,
    verdict: 'folded',
    foldScore: 0.97,
    foldLogLikelihoodRatio: 4.1,
    foldPrior: 0.3,
    clearToHz: 1200,
    protectionDb: 40,
    contaminationBoundDb: -71.5,
    bandOfInterestHz: [0, 2343.75],
    guardStartHz: 2400,
    bandEdge: { skirtDb: 12, edgeAboveFloorDb: 3, guardShareDb: -20 },
    tones: [],
    findings: [buildFinding()],
    engine: { version: '1.0.0', elapsedMs: 40 },
    ...overrides,
  };
}

/** Bins 1 Hz apart from 0 to the folding frequency, with one line. */
export function buildSpectrum({ bins = 3001, peakBin = 72 } = {}): ScreenedChannel['spectra'][number] {
  const densityMean = new Float32Array(bins).fill(1e-6);
  densityMean[peakBin] = 1e-2;
  return {
    kind: 'survey',
    resolutionHz: 1,
    segments: 8,
    densityMean,
    densityMedian: new Float32Array(bins).fill(1e-6),
  };
}

/** What the worker hands over for a one-channel capture. */
export function buildScreening(overrides: Partial<ChannelScreen> = {}): ScreeningResult {
  const screen = buildChannelScreen(overrides);
  return {
    verdict: screen.verdict,
    foldScore: screen.foldScore,
    clearToHz: screen.clearToHz,
    headline: screen.findings[0]?.text ?? null,
    channels: [{ record: buildMeasurementRecord({ channel: screen.channel }), screen, spectra: [buildSpectrum()] }],
  };
}
