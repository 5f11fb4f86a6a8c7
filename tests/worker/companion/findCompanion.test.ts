import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { AcquisitionSheet } from '../../../shared/schemas/acquisitionSheet.js';
import { findCompanion } from '../../../worker/companion/findCompanion.js';

let folder: string;
const at = (name: string): string => join(folder, name);

beforeAll(() => {
  folder = mkdtempSync(join(tmpdir(), 'overfold-companion-'));
  mkdirSync(at('lists'));
  for (const name of ['a.wav', 'b.wav', 'lists/c.wav']) writeFileSync(at(name), '');
});
afterAll(() => rmSync(folder, { recursive: true, force: true }));

function find(
  file: string,
  sheets: Record<string, AcquisitionSheet>,
  { rates = {}, companionPath = null }: { rates?: Record<string, number>; companionPath?: string | null } = {},
): string | null {
  const byPath = new Map(Object.entries(sheets).map(([name, sheet]) => [at(name), sheet]));
  const found = findCompanion(at(file), {
    files: [...byPath.keys()],
    manifestPath: at('lists/manifest.csv'),
    companionPath,
    sheetOf: (path) => byPath.get(path) ?? {},
    companionSheetOf: (path) => byPath.get(path) ?? {},
    rateHzOf: (path) => rates[path.slice(folder.length + 1)] ?? null,
  });
  return found === null ? null : found.path.slice(folder.length + 1);
}

describe('findCompanion', () => {
  it('takes the one given for all files, except for that file itself', () => {
    const sheets = { 'a.wav': { companion: 'x.wav' }, 'b.wav': {} };
    expect(find('a.wav', sheets, { companionPath: at('b.wav') })).toBe('b.wav');
    expect(find('b.wav', sheets, { companionPath: at('b.wav') })).toBeNull();
  });

  it('looks for the one named beside the file, then beside the manifest, then among the files of the run', () => {
    expect(find('a.wav', { 'a.wav': { companion: 'b.wav' } })).toBe('b.wav');
    expect(find('a.wav', { 'a.wav': { companion: 'c.wav' } })).toBe('lists/c.wav');
    expect(find('a.wav', { 'a.wav': { companion: 'd.wav' }, 'far/d.wav': {} })).toBe('far/d.wav');
    expect(find('a.wav', { 'a.wav': { companion: 'gone.wav' } })).toBe('gone.wav');
  });

  it('pairs files of the same pair, the fastest of several', () => {
    const sheets = { 'a.wav': { pair: '7' }, 'b.wav': { pair: '7' }, 'c.wav': { pair: '8' }, 'd.wav': { pair: '7' } };
    expect(find('a.wav', sheets, { rates: { 'a.wav': 2000, 'b.wav': 2500, 'd.wav': 8000 } })).toBe('d.wav');
    expect(find('d.wav', sheets, { rates: { 'a.wav': 2000, 'b.wav': 2500, 'd.wav': 8000 } })).toBe('b.wav');
    expect(find('c.wav', sheets)).toBeNull();
  });

  it('takes the only file from the same logger and position at another rate', () => {
    const same = { logger: 'L1', position: 'bearing' };
    const sheets = { 'a.wav': same, 'b.wav': same, 'c.wav': { ...same, position: 'foot' } };
    expect(find('a.wav', sheets, { rates: { 'a.wav': 2000, 'b.wav': 2500, 'c.wav': 4000 } })).toBe('b.wav');
    expect(find('a.wav', sheets, { rates: { 'a.wav': 2000, 'b.wav': 2000 } })).toBeNull();
    const two = { ...sheets, 'c.wav': same };
    expect(find('a.wav', two, { rates: { 'a.wav': 2000, 'b.wav': 2500, 'c.wav': 4000 } })).toBeNull();
  });
});
