import { describe, expect, it } from 'vitest';
import type { AcquisitionSheet } from '../../../shared/schemas/acquisitionSheet.js';
import {
  asksForCompanion,
  chooseCompanion,
  type CompanionChoice,
  type PairableCapture,
} from '../../../shared/screening/chooseCompanion.js';

const capture = (
  fileName: string,
  sheet: AcquisitionSheet = {},
  rest: Partial<PairableCapture> = {},
): PairableCapture => ({ id: fileName, fileName, sheet, sampleRateHz: null, state: 'received', ...rest });

interface Surroundings {
  elsewhere?: PairableCapture[];
  usedId?: string;
}

const choose = (
  chosen: PairableCapture,
  batch: PairableCapture[] = [],
  { elsewhere = [], usedId }: Surroundings = {},
): CompanionChoice<PairableCapture> => chooseCompanion(chosen, { batch, elsewhere, usedId: usedId ?? null });
const idOf = (...given: Parameters<typeof choose>): string | undefined => choose(...given).companion?.id;

const slow = capture('slow.wav', { companion: 'fast.wav' });

describe('a companion named in the sheet', () => {
  it('is the capture of that name in the batch, before one of the same pair', () => {
    const labelled = capture('slow.wav', { companion: 'fast.wav', pair: 'A' });
    expect(idOf(labelled, [labelled, capture('other.wav', { pair: 'A' }), capture('fast.wav')])).toBe('fast.wav');
  });

  it('is found with its folder, in the folder of the capture, and by its last part alone, in this order', () => {
    const inFolder = capture('run-1/slow.wav', { companion: 'fast.wav' });
    const [whole, beside, away] = [capture('fast.wav'), capture('run-1/fast.wav'), capture('run-2/fast.wav')];
    expect(idOf(inFolder, [inFolder, away, beside, whole])).toBe('fast.wav');
    expect(idOf(inFolder, [inFolder, away, beside])).toBe('run-1/fast.wav');
    expect(idOf(inFolder, [inFolder, away])).toBe('run-2/fast.wav');
  });

  it('is not guessed where the last part fits several', () => {
    const { companion, note } = choose(slow, [slow, capture('run-1/fast.wav'), capture('run-2/fast.wav')]);
    expect(companion).toBeNull();
    expect(note).toContain('2 captures in this batch are called fast.wav');
  });

  it('is looked for in other batches of the project only when the batch has none', () => {
    const elsewhere = [capture('fast.wav', {}, { id: 'elsewhere' })];
    expect(idOf(slow, [slow, capture('fast.wav')], { elsewhere })).toBe('fast.wav');
    expect(idOf(slow, [slow], { elsewhere })).toBe('elsewhere');
  });

  it('of several in other batches stays the one that was used, and is none before', () => {
    const elsewhere = [capture('fast.wav', {}, { id: 'first' }), capture('fast.wav', {}, { id: 'second' })];
    expect(choose(slow, [slow], { elsewhere }).note).toContain('2 captures in other batches');
    expect(idOf(slow, [slow], { elsewhere, usedId: 'second' })).toBe('second');
  });

  it('that is not there is said to be missing, and nothing else is taken by its place', () => {
    const place = { logger: 'K2', position: 'bearing' };
    const asking = capture('slow.wav', { ...place, companion: 'fast.wav' }, { sampleRateHz: 1000 });
    const { companion, note } = choose(asking, [asking, capture('other.wav', place, { sampleRateHz: 1280 })]);
    expect(companion).toBeNull();
    expect(note).toBe('The companion fast.wav is not uploaded yet. Once it is, this capture is screened again.');
  });

  it('by the sheet of the batch is not missed by the companion itself', () => {
    const named = capture('fast.wav', { companion: 'fast.wav' });
    expect(choose(named, [named, capture('slow.wav', { companion: 'fast.wav' })])).toEqual({
      companion: null,
      note: null,
    });
  });
});

describe('a pair label', () => {
  const labelled = capture('slow.wav', { pair: 'A' });

  it('finds the other capture that carries it', () => {
    expect(idOf(labelled, [labelled, capture('b.wav', { pair: 'B' }), capture('c.wav', { pair: 'A' })])).toBe('c.wav');
  });

  it('steps in for a named companion that is not there', () => {
    const both = capture('slow.wav', { companion: 'gone.wav', pair: 'A' });
    expect(idOf(both, [both, capture('c.wav', { pair: 'A' })])).toBe('c.wav');
  });

  it('on no other capture is said and finds none', () => {
    expect(choose(labelled, [labelled])).toMatchObject({ companion: null });
    expect(choose(labelled, [labelled]).note).toContain('No other capture of the batch carries the pair label A');
  });

  it('on several finds the fastest that did not fail, once all rates are known', () => {
    const at = (fileName: string, sampleRateHz: number | null, rest: Partial<PairableCapture> = {}) =>
      capture(fileName, { pair: 'A' }, { sampleRateHz, ...rest });
    const [medium, quick] = [at('b.wav', 1280), at('c.wav', 6400)];
    expect(idOf(labelled, [labelled, medium, quick])).toBe('c.wav');
    expect(idOf(labelled, [labelled, quick, medium])).toBe('c.wav');
    expect(idOf(labelled, [labelled, medium, at('c.wav', 6400, { state: 'failed' })])).toBe('b.wav');
    expect(choose(labelled, [labelled, medium, at('c.wav', null)]).note).toContain('2 other captures carry');
  });

  it('on a failed capture alone finds it, so that its failure can be said', () => {
    expect(idOf(labelled, [labelled, capture('b.wav', { pair: 'A' }, { state: 'failed' })])).toBe('b.wav');
  });
});

describe('the same logger and position', () => {
  const place = { logger: 'K2', position: 'bearing' };
  const at = (fileName: string, sampleRateHz: number | null, rest: Partial<PairableCapture> = {}) =>
    capture(fileName, place, { sampleRateHz, ...rest });

  it('finds the only other capture there when its rate is another', () => {
    const [first, second] = [at('a.wav', 1000), at('b.wav', 1280)];
    expect(idOf(first, [first, second, capture('c.wav', { logger: 'K2', position: 'foot' })])).toBe('b.wav');
    expect(idOf(second, [first, second])).toBe('a.wav');
  });

  it('passes over those of the same rate', () => {
    const first = at('a.wav', 1000);
    expect(idOf(first, [first, at('b.wav', 1000), at('c.wav', 1280)])).toBe('c.wav');
  });

  it('takes a declared rate before a found one', () => {
    const first = at('a.wav', 1000);
    expect(idOf(first, [first, at('b.wav', 1280, { sheet: { ...place, sampleRateHz: 1000 } })])).toBeUndefined();
    expect(idOf(first, [first, at('b.wav', null, { sheet: { ...place, sampleRateHz: 1280 } })])).toBe('b.wav');
  });

  it.each([
    ['the rate is the same', [at('b.wav', 1000)]],
    ['the rate is not known yet', [at('b.wav', null)]],
    ['the rate of a third is not known yet', [at('b.wav', 1280), at('c.wav', null)]],
    ['two have another rate', [at('b.wav', 1280), at('c.wav', 1600)]],
    ['the other one failed', [at('b.wav', 1280, { state: 'failed' })]],
  ])('finds none, and asks for nothing, where %s', (_case, others) => {
    const first = at('a.wav', 1000);
    expect(choose(first, [first, ...others])).toEqual({ companion: null, note: null });
  });

  it('is not enough with the position missing', () => {
    const first = capture('a.wav', { logger: 'K2' }, { sampleRateHz: 1000 });
    expect(idOf(first, [first, capture('b.wav', { logger: 'K2' }, { sampleRateHz: 1280 })])).toBeUndefined();
  });
});

describe('asksForCompanion', () => {
  it.each([
    [{ companion: 'fast.wav' }, true],
    [{ pair: 'A' }, true],
    [{ logger: 'K2', position: 'bearing' }, true],
    [{ logger: 'K2' }, false],
    [{ companion: '', pair: '' }, false],
    [{}, false],
  ])('of %j is %s', (sheet, asks) => {
    expect(asksForCompanion(sheet)).toBe(asks);
  });
});
