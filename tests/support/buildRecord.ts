import type { MeasurementRecord, ToneMeasurement } from '../../shared/screening/MeasurementRecord.js';

/** A tone as measured: 30 dB over its surroundings, known to a millihertz. */
export function buildTone(frequencyHz: number, overrides: Partial<ToneMeasurement> = {}): ToneMeasurement {
  return {
    frequencyHz,
    boundHz: 1e-3,
    wanderHz: 0,
    levelDb: -30,
    standsOutDb: 30,
    floorDb: -90,
    peaksPerHz: 0.02,
    ...overrides,
  };
}

/** A well recorded channel: 10 s at 2000 Hz, flat to 800 Hz, edge 80 dB down. */
export function buildRecord(overrides: Partial<MeasurementRecord> = {}): MeasurementRecord {
  const cells = 512;
  const levels = Array.from({ length: cells }, (_, cell) =>
    cell < 0.8 * cells ? -40 : -40 - 800 * Math.min(0.1, cell / cells - 0.8),
  );
  return {
    version: 1,
    channel: 0,
    channelName: '',
    unit: '',
    format: 'wav',
    sampleRateHz: 2000,
    headerRateHz: 2000,
    samples: 20_000,
    durationS: 10,
    obstacles: [],
    warnings: [],
    level: { mean: 0, rms: 0.28, minimum: -0.9, maximum: 0.9, powerDb: -11, kurtosis: 3 },
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
      nominalBits: 24,
      stepsPerDeviation: null,
      quantisationFloorDb: null,
    },
    timeStamps: null,
    profile: {
      cellHz: 1000 / cells,
      resolutionHz: 1000 / 2048,
      segments: 20,
      effectiveSegments: 19,
      meanDb: levels,
      tonelessDb: levels,
      medianDb: levels,
    },
    edge: {
      fromHz: 980,
      toHz: 998,
      densityDb: -120,
      densityWithTonesDb: -120,
      relativeError: 0.05,
      burstDb: 1,
      kurtosis: 1.1,
      follows: null,
      steepestFallDb: 75,
      steepestFallHz: 800,
      fallToEdgeDb: 80,
      occupiedToHz: 870,
      mirror: null,
      raised: null,
      cliff: null,
    },
    damageLeftOut: false,
    tones: [],
    irregular: null,
    companion: null,
    ...overrides,
  };
}
