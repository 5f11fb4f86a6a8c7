import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { openCapture } from '../../../worker/readers/openCapture.js';
import { readLabelledSet } from '../sets/readLabelledSet.js';
import { writeSyntheticSet } from './writeSyntheticSet.js';

const directories = [0, 1].map(() => mkdtempSync(join(tmpdir(), 'overfold-bench-test-')));
const [first, second] = directories as [string, string];
afterAll(() => directories.forEach((directory) => rmSync(directory, { recursive: true, force: true })));
directories.forEach((directory) => writeSyntheticSet(directory, 7, 2));
const captures = readLabelledSet(first, 'built-in');

describe('writeSyntheticSet', () => {
  it('makes the same bytes from the same seed', () => {
    expect(readFileSync(join(first, 'labels.csv'), 'utf8')).toBe(readFileSync(join(second, 'labels.csv'), 'utf8'));
    for (const { file } of captures.slice(0, 12)) {
      expect(readFileSync(join(first, file)).equals(readFileSync(join(second, file)))).toBe(true);
    }
  });

  it('makes no look-alike that folds', () => {
    const lookalikes = captures.filter(({ lookalike }) => lookalike !== '');
    expect(lookalikes.length).toBeGreaterThanOrEqual(11);
    expect(lookalikes.filter(({ label }) => label !== 'clean')).toEqual([]);
  });

  it('makes folded and clean ones, each folded one with something to look for', () => {
    const folded = captures.filter(({ label }) => label === 'folded');
    expect(folded.length).toBeGreaterThanOrEqual(8);
    expect(folded.every(({ evidence }) => evidence !== '')).toBe(true);
    expect(captures.filter(({ label }) => label === 'clean').length).toBeGreaterThan(20);
  });

  it('lists where each folded line lands', () => {
    const tones = captures.flatMap(({ tones: all, sampleRateHz, isIrregular }) =>
      isIrregular ? [] : all.map((tone) => ({ ...tone, sampleRateHz })),
    );
    expect(tones.length).toBeGreaterThan(10);
    for (const { trueHz, foldedHz, sampleRateHz } of tones) {
      expect(trueHz).toBeGreaterThanOrEqual(sampleRateHz / 2);
      if (foldedHz === null) continue;
      expect(foldedHz).toBeCloseTo(Math.abs(trueHz - sampleRateHz * Math.round(trueHz / sampleRateHz)), 2);
    }
  });

  it('gives both files of a pair the same event at two rates', () => {
    const pair = captures.filter(({ pairId }) => pairId === 'P0');
    expect(pair).toHaveLength(2);
    expect(pair[0]?.sampleRateHz).not.toBe(pair[1]?.sampleRateHz);
  });

  it('writes files that can be read at the stated rate', () => {
    for (const { path, sampleRateHz } of captures) {
      const source = openCapture(path, {});
      expect((source.sampleRateHz ?? 0) / sampleRateHz).toBeCloseTo(1, 3);
      source.close();
    }
  });
});
