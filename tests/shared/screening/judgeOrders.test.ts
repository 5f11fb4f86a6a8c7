import { describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { findingSchema, toneSchema } from '../../../shared/schemas/screening.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import { judgeOrders } from '../../../shared/screening/judgeOrders.js';
import type { FoldedOrderMeasurement, OrderLawMeasurement } from '../../../shared/screening/OrderMeasurement.js';
import { buildRecord } from '../../support/buildRecord.js';

const line = (overrides: Partial<FoldedOrderMeasurement> = {}): FoldedOrderMeasurement => ({
  frequencyHz: 800,
  trueFrequencyHz: 1200,
  meanFrequencyHz: 1200,
  uncertaintyHz: 0.02,
  levelDb: -35,
  standsOutDb: 22,
  inBandStandsOutDb: null,
  foldedShare: 1,
  apartBins: 100,
  fromS: 0,
  toS: 10,
  ...overrides,
});

const law = (overrides: Partial<OrderLawMeasurement> = {}): OrderLawMeasurement => ({
  mode: 'blind',
  pulseHz: null,
  speedFrom: 0.98,
  speedTo: 1.02,
  speedChange: 0.04,
  sharpness: 120,
  steadySharpness: 4,
  inBandLines: Array.from({ length: 8 }, (_, k) => ({ frequencyHz: 24 * (k + 1), standsOutDb: 30 })),
  otherLines: 0,
  linesTried: 30_000,
  chanceStandsOutDb: 10,
  lines: [line()],
  ...overrides,
});

const judge = (laws: OrderLawMeasurement[], sheet = {}) =>
  judgeOrders(buildRecord({ orders: [{ fromS: 0, toS: 10, highestHz: 3000, laws }] }), defaultThresholds, sheet);

describe('judgeOrders', () => {
  it('shows a folded order with its true frequency, zone, number and chance', () => {
    const { tones, findings, shownConfidence } = judge([law()]);
    expect(tones).toHaveLength(1);
    expect(toneSchema.parse(tones[0])).toMatchObject({
      explanation: 'foldedOrder',
      frequencyHz: 800,
      trueFrequencyHz: 1200,
      candidatesHz: [800, 1200, 2800],
      explainedBy: expect.stringContaining('order 50 of 24'),
    });
    expect(findingSchema.parse(findings[0])).toMatchObject({
      kind: 'foldedOrder',
      severity: 'fold',
      text: expect.stringContaining('belongs at 1200 Hz (zone 2, mirrored)'),
      evidence: { orderCount: 50, linesFoundCount: 1 },
    });
    expect(shownConfidence).toBeGreaterThan(0.99);
  });

  it('makes the whole channel folded', () => {
    const record = buildRecord({ orders: [{ fromS: 0, toS: 10, highestHz: 3000, laws: [law()] }] });
    expect(judgeChannel(record, defaultThresholds, {})).toMatchObject({ verdict: 'folded' });
    expect(judgeChannel({ ...record, orders: [] }, defaultThresholds, {}).verdict).not.toBe('folded');
  });

  // METHODS of order tracking by transform (Blough 2003): two orders part only if their paths differ by several bins.
  it('tells nothing where the folded path hardly differs from one in band', () => {
    expect(judge([law({ lines: [line({ apartBins: 2.5 })] })]).findings).toEqual([]);
    expect(judge([law({ lines: [line({ apartBins: 20 })] })]).findings).toHaveLength(1);
  });

  it('counts lines of another machine as chances of a coincidence', () => {
    expect(judge([law({ otherLines: 40 })]).findings).toEqual([]);
    expect(judge([law({ otherLines: 4 })]).findings).toHaveLength(1);
  });

  it('asks a line to stand above what the opposite law shows', () => {
    expect(judge([law({ chanceStandsOutDb: 20 })]).findings).toEqual([]);
    expect(judge([law({ chanceStandsOutDb: 13, lines: [line({ standsOutDb: 25 })] })]).findings).toHaveLength(1);
  });

  it('takes a lone ridge for one in band unless it is seen on both sides of the fold', () => {
    const lone = law({ inBandLines: [] });
    expect(judge([lone]).findings).toEqual([]);
    const reflected = judge([{ ...lone, lines: [line({ inBandStandsOutDb: 25, foldedShare: 0.5 })] }]);
    expect(reflected.findings).toMatchObject([{ kind: 'reflectedSweep', severity: 'fold' }]);
  });

  it('reports a folded order far below the asked protection without deciding by it', () => {
    const { findings, shownConfidence } = judge([law({ lines: [line({ levelDb: -95 })] })]);
    expect(findings).toMatchObject([{ kind: 'foldedOrder', severity: 'limit' }]);
    expect(shownConfidence).toBe(0);
  });

  it('names clipping as a source of folded harmonics where the capture is clipped', () => {
    const record = buildRecord({ orders: [{ fromS: 0, toS: 10, highestHz: 3000, laws: [law()] }] });
    const clipped = { ...record, integrity: { ...record.integrity, clippedShare: 0.01 } };
    expect(judgeOrders(clipped, defaultThresholds, {}).findings[0]?.text).toContain('The capture is clipped');
    expect(judgeOrders(record, defaultThresholds, {}).findings[0]?.text).not.toContain('clipped');
  });

  it('counts orders of the stated speed where the lines follow it', () => {
    const [finding] = judge([law()], { nominalSpeedHz: 12.1 }).findings;
    expect(finding?.evidence).toMatchObject({ orderCount: 100 });
    expect(finding?.text).toContain('the stated speed, refined');
  });

  it('accepts records made before orders were measured', () => {
    const record = buildRecord();
    delete record.orders;
    expect(judgeOrders(record, defaultThresholds, {})).toEqual({
      tones: [],
      findings: [],
      logRatio: 0,
      shownConfidence: 0,
    });
  });
});
