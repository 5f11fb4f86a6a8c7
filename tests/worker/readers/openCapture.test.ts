import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import fc from 'fast-check';
import { afterAll, describe, expect, it } from 'vitest';
import type { AcquisitionSheet } from '../../../shared/schemas/acquisitionSheet.js';
import { openCapture } from '../../../worker/readers/openCapture.js';
import { writeWav, type WavBitDepth } from '../../support/writeWav.js';

const folder = mkdtempSync(join(tmpdir(), 'readers-'));
afterAll(() => rmSync(folder, { recursive: true }));

function csv(text: string): string {
  const path = join(folder, 'capture.csv');
  writeFileSync(path, text);
  return path;
}

function read(path: string, acquisition: AcquisitionSheet = {}, blockFrames?: number): number[][] {
  const source = openCapture(path, { acquisition });
  const channels: number[][] = Array.from({ length: source.channelCount }, () => []);
  source.readBlocks(
    (block, frames, firstFrame) => {
      expect(firstFrame).toBe(channels[0]?.length);
      block.forEach((values, index) => {
        expect(values).toHaveLength(frames);
        channels[index]?.push(...values);
      });
    },
    blockFrames === undefined ? {} : { blockFrames },
  );
  source.close();
  return channels;
}

const rows = (line: (row: number) => string, count = 100): string =>
  Array.from({ length: count }, (_, row) => line(row)).join('\n');

describe('openCapture of a WAV', () => {
  // Outside check: files written by the wavefile package.
  const depths: [WavBitDepth, number][] = [
    ['16', 2 ** 15],
    ['24', 2 ** 23],
    ['32', 2 ** 31],
  ];
  it.each(depths)('reads %s-bit integers exactly', (bitDepth, fullScale) => {
    const path = join(folder, `i${bitDepth}.wav`);
    const written = [
      [0, 1, -1, fullScale - 1, -fullScale, 1234],
      [5, 4, 3, 2, 1, 0],
    ];
    writeWav(path, written, { sampleRateHz: 6000, bitDepth });
    expect(read(path)).toEqual(written.map((channel) => channel.map((value) => value / fullScale)));
    const source = openCapture(path, {});
    expect(source).toMatchObject({
      channelCount: 2,
      frameCount: 6,
      sampleRateHz: 6000,
      bitsPerSample: Number(bitDepth),
    });
    source.close();
  });

  it('reads 8-bit samples about their middle', () => {
    const path = join(folder, 'i8.wav');
    writeWav(path, [[0, 128, 255]], { sampleRateHz: 6000, bitDepth: '8' });
    expect(read(path)).toEqual([[-1, 0, 127 / 128]]);
  });

  it.each(['32f', '64'] as const)('reads %s floating point as written', (bitDepth) => {
    const path = join(folder, `f${bitDepth}.wav`);
    writeWav(path, [[0, 0.5, -3.75, 1024]], { sampleRateHz: 6000, bitDepth });
    expect(read(path)).toEqual([[0, 0.5, -3.75, 1024]]);
  });

  it('reads big-endian files as what they are', () => {
    const path = join(folder, 'x.wav');
    writeWav(path, [[1, -2, 30_000]], { sampleRateHz: 6000, bitDepth: '16', container: 'RIFX' });
    expect(read(path)).toEqual([[1, -2, 30_000].map((value) => value / 2 ** 15)]);
  });

  it('gives the same samples whatever the size of a block', () => {
    const path = join(folder, 'blocks.wav');
    writeWav(path, [Array.from({ length: 700 }, (_, n) => (n * 7919) % 30_000)], {
      sampleRateHz: 6000,
      bitDepth: '24',
    });
    const whole = read(path);
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 900 }), (blockFrames) => {
        expect(read(path, {}, blockFrames)).toEqual(whole);
      }),
      { numRuns: 20 },
    );
  });

  it("lets the sheet's rate, unit and scale win and keeps the header's rate", () => {
    const path = join(folder, 'sheet.wav');
    writeWav(path, [[2 ** 14]], { sampleRateHz: 6000, bitDepth: '16' });
    expect(read(path, { scale: 9.81 })).toEqual([[4.905]]);
    const source = openCapture(path, { acquisition: { sampleRateHz: 2048, unit: 'g' } });
    expect(source).toMatchObject({ sampleRateHz: 2048, headerRateHz: 6000, units: ['g'], timeStamps: null });
    source.close();
  });

  it('refuses more channels than are asked for', () => {
    const path = join(folder, 'two.wav');
    writeWav(path, [[1], [2]], { sampleRateHz: 6000, bitDepth: '16' });
    expect(() => openCapture(path, { maxChannels: 1 })).toThrowError(
      expect.objectContaining({ code: 'BAD_CHANNELS' }) as Error,
    );
    openCapture(path, { maxChannels: 2 }).close();
  });
});

describe('openCapture of a CSV', () => {
  it('reads every number as Number() does, whatever the size of a block', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ noNaN: true, noDefaultInfinity: true }), { minLength: 20, maxLength: 60 }),
        fc.integer({ min: 1, max: 80 }),
        (values, blockFrames) => {
          const path = csv(`time,a\n${values.map((value, row) => `${row / 1000},${value}`).join('\n')}`);
          expect(read(path, {}, blockFrames)).toEqual([values.map((value) => Number(String(value)))]);
        },
      ),
      { numRuns: 30 },
    );
  });

  it('names line and column of what is no number', () => {
    const bad = csv(`time,a,b\n${rows((row) => `${row / 1000},1,${row === 40 ? 'OVERLOAD' : row % 3}`)}`);
    expect(() => openCapture(bad, {})).toThrowError(
      expect.objectContaining({ code: 'NON_NUMERIC', line: 42, column: 3 }) as Error,
    );
    openCapture(csv(`time,a,b\n${rows((row) => `${row / 1000},1,${row % 3}`)}`), {}).close();
  });

  it('knows no rate for bare values until the sheet states one', () => {
    const path = csv(rows((row) => String(Math.cos(row))));
    const bare = openCapture(path, {});
    expect(bare).toMatchObject({ sampleRateHz: null, headerRateHz: null, timeStamps: null, frameCount: 100 });
    bare.close();
    const stated = openCapture(path, { acquisition: { sampleRateHz: 500 } });
    expect(stated).toMatchObject({ sampleRateHz: 500, headerRateHz: null });
    stated.close();
  });

  it('calls stamps that fit a grid within their rounding uniform, and keeps no times', () => {
    const source = openCapture(csv(`time,a\n${rows((row) => `${(row / 4096).toFixed(5)},${row % 7}`, 400)}`), {});
    expect(source.timeStamps).toMatchObject({ irregular: false, missingShare: 0, repeatedCount: 0 });
    expect(source.timeStamps?.timesS).toBeUndefined();
    expect(source.timeStamps?.roundingStepS).toBeCloseTo(1e-5, 12);
    expect(source.sampleRateHz).toBeCloseTo(4096, 0);
    source.close();
  });

  it('reports jitter, keeps the times and says so', () => {
    const times = Array.from({ length: 300 }, (_, row) => (row + 0.3 * Math.sin(row * row)) / 1000 + 1);
    const source = openCapture(csv(`time,a\n${times.map((time) => `${time},1`).join('\n')}`), {});
    expect(source.timeStamps?.irregular).toBe(true);
    expect(source.timeStamps?.jitterShare).toBeGreaterThan(0.1);
    expect(source.timeStamps?.timesS).toHaveLength(300);
    expect(source.timeStamps?.timesS?.[0]).toBe(0);
    expect(source.warnings.map(({ code }) => code)).toContain('NON_UNIFORM');
    source.close();
  });

  it('keeps the place of missing rows as gaps and reads no numbers into them', () => {
    const kept = Array.from({ length: 200 }, (_, row) => row).filter((row) => row < 50 || row > 54);
    const path = csv(`time,a\n${kept.map((row) => `${row / 1000},${row}`).join('\n')}`);
    const source = openCapture(path, {});
    expect(source).toMatchObject({ frameCount: 200, timeStamps: { irregular: false } });
    expect(source.timeStamps?.missingShare).toBeCloseTo(5 / 200, 10);
    expect(source.timeStamps?.gaps).toEqual([{ fromS: 0.049, toS: 0.055 }]);
    source.close();
    const [values = []] = read(path);
    expect(values.slice(49, 56)).toEqual([49, NaN, NaN, NaN, NaN, NaN, 55]);
  });

  it('reads an empty cell as missing and counts it', () => {
    const path = csv(`time,a\n${rows((row) => `${row / 1000},${row === 20 ? '' : 5}`)}`);
    expect(read(path)[0]?.[20]).toBeNaN();
    const source = openCapture(path, {});
    expect(source.warnings).toEqual([expect.objectContaining({ code: 'MISSING' })]);
    source.close();
  });
});
