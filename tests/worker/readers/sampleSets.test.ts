import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { describe, expect, it } from 'vitest';
import { CaptureError } from '../../../shared/formats/CaptureError.js';
import { CsvSource } from '../../../worker/readers/CsvSource.js';
import { openCapture } from '../../../worker/readers/openCapture.js';
import type { SampleSource } from '../../../worker/readers/SampleSource.js';

// Odd files from the test data of published libraries and made by hand; sources, licences and expected answers are in
// each folder's PROVENANCE.md and MANIFEST.json.

interface Accept {
  answer: 'accept';
  rate: number | null;
  channels: number;
  frames?: number;
  rows?: number;
}
interface Refuse {
  answer: 'refuse';
  reason: string[];
}
interface Entry {
  file: string;
  odd: string;
  expect: Accept | Refuse | { answer: 'either'; any_of: (Accept | Refuse)[] };
  check?: { first_channel_first3: number[]; last_channel_last: number[]; rms_first_and_last_channel: number[] };
}

const folder = (kind: string): string => join(import.meta.dirname, '../../fixtures/captures', kind);
const entriesOf = (kind: string): Entry[] =>
  JSON.parse(readFileSync(join(folder(kind), 'MANIFEST.json'), 'utf8')) as Entry[];

function tryOpen(path: string): SampleSource | string {
  try {
    return openCapture(path, {});
  } catch (error) {
    if (error instanceof CaptureError) return error.code;
    throw error;
  }
}

function matches(outcome: SampleSource | string, wanted: Accept | Refuse): boolean {
  if (typeof outcome === 'string') return wanted.answer === 'refuse' && wanted.reason.includes(outcome);
  if (wanted.answer === 'refuse') return false;
  const count = outcome instanceof CsvSource ? outcome.rowCount : outcome.frameCount;
  const wantedCount = wanted.frames ?? wanted.rows;
  const isRateRight = wanted.rate === null || Math.abs((outcome.sampleRateHz ?? 0) - wanted.rate) < 0.006 * wanted.rate;
  return (
    isRateRight && outcome.channelCount === wanted.channels && (wantedCount === undefined || count === wantedCount)
  );
}

const describeOutcome = (outcome: SampleSource | string): string =>
  typeof outcome === 'string'
    ? `refused ${outcome}`
    : `accepted rate ${outcome.sampleRateHz} channels ${outcome.channelCount} frames ${outcome.frameCount}`;

function readAll(source: SampleSource): Float64Array[] {
  const all = Array.from({ length: source.channelCount }, () => new Float64Array(source.frameCount));
  source.readBlocks((channels, _frames, firstFrame) => {
    channels.forEach((channel, index) => all[index]?.set(channel, firstFrame));
  });
  return all;
}

describe.each(['wav', 'csv'])('%s sample set', (kind) => {
  const entries = entriesOf(kind);

  it('has an answer for every file of the folder', () => {
    const files = readdirSync(folder(kind)).filter((name) => !['MANIFEST.json', 'PROVENANCE.md'].includes(name));
    expect(entries.map(({ file }) => file).sort()).toEqual(files.sort());
  });

  it.each(entries.map((entry) => [entry.file, entry] as const))('answers %s as its manifest says', (file, entry) => {
    const outcome = tryOpen(join(folder(kind), file));
    const wanted = entry.expect.answer === 'either' ? entry.expect.any_of : [entry.expect];
    expect(
      wanted.some((one) => matches(outcome, one)),
      `${describeOutcome(outcome)}; wanted ${JSON.stringify(wanted)}`,
    ).toBe(true);
    if (typeof outcome !== 'string') outcome.close();
  });
});

describe('wav sample set', () => {
  // Files that may be refused and are have no samples to compare; the set above holds them to their answer.
  const checked = entriesOf('wav').flatMap((entry) =>
    entry.check && typeof tryOpen(join(folder('wav'), entry.file)) !== 'string'
      ? [[entry.file, entry.check] as const]
      : [],
  );

  it.each(checked)('reads the samples of %s', (file, check) => {
    const source = openCapture(join(folder('wav'), file), {});
    const channels = readAll(source);
    source.close();
    const rms = (values: Float64Array): number =>
      Math.sqrt(values.reduce((sum, value) => sum + value * value, 0) / values.length);
    const first = channels[0] ?? new Float64Array();
    const last = channels.at(-1) ?? new Float64Array();
    check.first_channel_first3.forEach((value, index) => expect(first[index]).toBeCloseTo(value, 5));
    expect(last.at(-1)).toBeCloseTo(check.last_channel_last[0] ?? Number.NaN, 5);
    expect(rms(first)).toBeCloseTo(check.rms_first_and_last_channel[0] ?? Number.NaN, 5);
    expect(rms(last)).toBeCloseTo(check.rms_first_and_last_channel[1] ?? Number.NaN, 5);
  });
});
