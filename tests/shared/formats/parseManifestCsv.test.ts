import { describe, expect, it } from 'vitest';
import { parseManifestCsv } from '../../../shared/formats/parseManifestCsv.js';

const header =
  'file,sampleRateHz,highestFrequencyHz,filterType,filterOrder,filterCornerHz,sources,nominalSpeedHz,companion,unit,scale,logger,position,pair';

describe('parseManifestCsv', () => {
  it('reads every column into the sheet of its file', () => {
    const { byFile, problems } = parseManifestCsv(
      `${header}\r\n"a, b.wav",2048,400,butterworth,4,800,50 123.5,25,c.wav,g,9.81,L7,Pump 2,p1\r\n`,
    );
    expect(problems).toEqual([]);
    expect(byFile['a, b.wav']).toEqual({
      sampleRateHz: 2048,
      highestFrequencyHz: 400,
      filter: { type: 'butterworth', order: 4, cornerHz: 800 },
      sources: [{ frequencyHz: 50 }, { frequencyHz: 123.5 }],
      nominalSpeedHz: 25,
      companion: 'c.wav',
      unit: 'g',
      scale: 9.81,
      logger: 'L7',
      position: 'Pump 2',
      pair: 'p1',
    });
  });

  it('lets everything but the file be empty', () => {
    expect(parseManifestCsv(`\uFEFF${header}\na.wav,,,,,,,,,,,,,\n\nb.wav\n`)).toEqual({
      byFile: { 'a.wav': {}, 'b.wav': {} },
      problems: [],
    });
  });

  it('reads semicolons, columns in any order', () => {
    expect(parseManifestCsv('unit;file\ng;a.csv\n').byFile).toEqual({ 'a.csv': { unit: 'g' } });
  });

  it.each([
    ['a negative rate', 'a.wav,-1'],
    ['a hexadecimal rate', 'a.wav,0x800'],
    ['a word for a rate', 'a.wav,fast'],
    ['an empty file', ',2048'],
    ['a cell too many', 'a.wav,2048,1'],
    ['an open quote', '"a.wav,2048'],
  ])('names the line of %s and keeps the other rows', (_what, row) => {
    const { byFile, problems } = parseManifestCsv(`file,sampleRateHz\nz.wav,1000\n${row}\n`);
    expect(problems.map(({ line }) => line)).toEqual([3]);
    expect(byFile).toEqual({ 'z.wav': { sampleRateHz: 1000 } });
  });

  it('reports a file that stands there twice, and columns it does not know', () => {
    const { byFile, problems } = parseManifestCsv('file,unit,colour\na.wav,g,red\na.wav,V,red\n');
    expect(problems.map(({ line }) => line)).toEqual([1, 3]);
    expect(byFile).toEqual({ 'a.wav': { unit: 'g' } });
  });

  it('asks for the column "file"', () => {
    expect(parseManifestCsv('name\na.wav\n')).toMatchObject({ byFile: {}, problems: [{ line: 1 }] });
  });
});
