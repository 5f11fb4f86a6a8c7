import { spawnSync } from 'node:child_process';
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { channelScreenSchema, screenErrorSchema } from '../../shared/schemas/screening.js';
import { defaultThresholds } from '../../shared/schemas/thresholds.js';
import { screenArguments, UsageError } from '../../worker/screenArguments.js';
import { screenFile } from '../../worker/screenFile.js';
import { encodeWav } from '../support/encodeWav.js';
import { lowPass, seededNoise } from '../support/seededNoise.js';

let folder: string;
const inFolder = (name: string): string => join(folder, name);

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'overfold-screen-'));
  const bursts = seededNoise(16_384, 5).map((value, n) => 0.15 * value * (0.05 + Math.exp(-(n % 4000) / 700)));
  writeFileSync(inFolder('open.wav'), encodeWav([bursts], 2000));
  writeFileSync(inFolder('pair.wav'), encodeWav([lowPass(bursts, 0.3), bursts], 2000));
  writeFileSync(inFolder('broken.wav'), 'no recording');
  // 1300 Hz lands on 700 Hz at 2000 Hz and on 1200 Hz at 2500 Hz.
  const event = (rateHz: number): Float64Array =>
    Float64Array.from(
      seededNoise(5 * rateHz, rateHz),
      (value, n) =>
        0.001 * value +
        0.3 * Math.sin((2 * Math.PI * 120 * n) / rateHz) +
        0.1 * Math.sin((2 * Math.PI * 1300 * n) / rateHz),
    );
  writeFileSync(inFolder('slow.wav'), encodeWav([event(2000)], 2000));
  writeFileSync(inFolder('other.wav'), encodeWav([event(2500)], 2500));
});

afterAll(() => rmSync(folder, { recursive: true, force: true }));

function run(...argv: string[]): { status: number | null; lines: unknown[]; stderr: string } {
  const result = spawnSync(process.execPath, ['--import', 'tsx', 'worker/screen.ts', ...argv], { encoding: 'utf8' });
  const lines = result.stdout
    .split('\n')
    .filter((line) => line !== '')
    .map((line) => JSON.parse(line) as unknown);
  return { status: result.status, lines, stderr: result.stderr };
}

describe('screenFile', () => {
  it('gives one result a channel, as the schema says', () => {
    const { screens } = screenFile(inFolder('pair.wav'), { sheet: {}, thresholds: defaultThresholds });
    expect(screens.map(({ channel }) => channel)).toEqual([0, 1]);
    for (const screen of screens) expect(channelScreenSchema.parse(JSON.parse(JSON.stringify(screen)))).toEqual(screen);
    expect(screens[1]?.verdict).toBe('folded');
    expect(screens[0]?.verdict).not.toBe('folded');
  });

  it('shows a tone that moved in the companion as folded', () => {
    const companion = { path: inFolder('other.wav'), name: 'other.wav', sheet: {} };
    const alone = screenFile(inFolder('slow.wav'), { sheet: {}, thresholds: defaultThresholds });
    const { screens } = screenFile(inFolder('slow.wav'), { sheet: {}, thresholds: defaultThresholds, companion });
    expect(alone.screens[0]?.verdict).not.toBe('folded');
    expect(screens[0]?.verdict).toBe('folded');
    const moved = screens[0]?.tones.find(({ explanation }) => explanation === 'movedBetweenRates');
    expect(moved?.frequencyHz).toBeCloseTo(700, 2);
    expect(moved?.trueFrequencyHz).toBeCloseTo(1300, 2);
  });

  it('notes a companion that cannot be read and still screens the file', () => {
    const companion = { path: inFolder('broken.wav'), name: 'broken.wav', sheet: {} };
    const { screens } = screenFile(inFolder('slow.wav'), { sheet: {}, thresholds: defaultThresholds, companion });
    expect(screens[0]?.findings.map(({ kind }) => kind)).toContain('companionMissing');
  });

  it('throws on a file that is no capture', () => {
    expect(() => screenFile(inFolder('broken.wav'), { sheet: {}, thresholds: defaultThresholds })).toThrow(/WAV/);
  });
});

describe('screenArguments', () => {
  it('reads every option', () => {
    const argv = [
      '--acquisition',
      'a',
      '--manifest',
      'm',
      '--thresholds',
      't',
      '--companion',
      'c',
      '--out',
      'o',
      '--pretty',
      'x.wav',
    ];
    expect(screenArguments(argv)).toEqual({
      files: ['x.wav'],
      acquisition: 'a',
      manifest: 'm',
      thresholds: 't',
      companion: 'c',
      out: 'o',
      pretty: true,
      help: false,
    });
  });

  it.each([[['--bogus', 'x.wav']], [[]], [['x.wav', '--out']]])('refuses %j', (argv) => {
    expect(() => screenArguments(argv)).toThrow(UsageError);
  });
});

describe('the screen command', { timeout: 90_000 }, () => {
  it('prints one line a channel, writes record and picture, and ends with 0', () => {
    const { status, lines } = run('--out', inFolder('out'), inFolder('pair.wav'));
    expect(status).toBe(0);
    expect(lines.map((line) => channelScreenSchema.parse(line).channel)).toEqual([0, 1]);
    expect(readdirSync(inFolder('out')).sort()).toEqual([
      'pair.wav.ch0.json',
      'pair.wav.ch0.svg',
      'pair.wav.ch1.json',
      'pair.wav.ch1.svg',
    ]);
    expect(readFileSync(inFolder('out/pair.wav.ch1.svg'), 'utf8')).toContain('pair.wav, channel 1: folded');
  });

  it('screens the others when one file fails, and ends with 1', () => {
    const { status, lines, stderr } = run(inFolder('broken.wav'), inFolder('open.wav'), inFolder('missing.wav'));
    expect(status).toBe(1);
    expect(screenErrorSchema.parse(lines[0]).error.code).toBe('NOT_WAV');
    expect(channelScreenSchema.parse(lines[1]).verdict).toBe('folded');
    expect(screenErrorSchema.parse(lines[2]).error.code).toBe('FILE_NOT_FOUND');
    expect(stderr).toContain('[2/3]');
  });

  it('uses sheet, manifest and thresholds, the manifest on top', () => {
    writeFileSync(inFolder('sheet.json'), JSON.stringify({ highestFrequencyHz: 300 }));
    writeFileSync(inFolder('manifest.csv'), 'file,highestFrequencyHz,companion\nslow.wav,250,other.wav\n');
    writeFileSync(inFolder('thresholds.json'), JSON.stringify({ requiredProtectionDb: 30 }));
    const { status, lines } = run(
      '--acquisition',
      inFolder('sheet.json'),
      '--manifest',
      inFolder('manifest.csv'),
      '--thresholds',
      inFolder('thresholds.json'),
      inFolder('slow.wav'),
      inFolder('open.wav'),
    );
    expect(status).toBe(0);
    const [slow, open] = lines.map((line) => channelScreenSchema.parse(line));
    expect(slow).toMatchObject({ verdict: 'folded', protectionDb: 30, bandOfInterestHz: [0, 250] });
    expect(open?.bandOfInterestHz).toEqual([0, 300]);
  });

  it('compares the files of one pair with each other', () => {
    writeFileSync(inFolder('pairs.csv'), 'file,pair\nslow.wav,blow 1\nother.wav,blow 1\n');
    const { status, lines, stderr } = run(
      '--manifest',
      inFolder('pairs.csv'),
      inFolder('slow.wav'),
      inFolder('other.wav'),
    );
    expect(status).toBe(0);
    const moved = lines.map((line) =>
      channelScreenSchema.parse(line).tones.find(({ explanation }) => explanation === 'movedBetweenRates'),
    );
    // 1300 Hz lands on 700 Hz at 2000 Hz and on 1200 Hz at 2500 Hz.
    expect(moved.map((tone) => Math.round(tone?.frequencyHz ?? 0))).toEqual([700, 1200]);
    expect(moved.map((tone) => Math.round(tone?.trueFrequencyHz ?? 0))).toEqual([1300, 1300]);
    expect(stderr).toContain('companion: ');
  });

  it('ends with 2 and prints nothing on standard output when called wrongly', () => {
    writeFileSync(inFolder('bad.json'), JSON.stringify({ requiredProtectionDb: 1000 }));
    for (const argv of [[], ['--bogus'], ['--thresholds', inFolder('bad.json'), inFolder('open.wav')]]) {
      const { status, lines, stderr } = run(...argv);
      expect({ status, lines }).toEqual({ status: 2, lines: [] });
      expect(stderr.length).toBeGreaterThan(0);
    }
  });
});
