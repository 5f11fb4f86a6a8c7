import { describe, expect, it } from 'vitest';
import { toCsv } from '@/utils/toCsv';

describe('toCsv', () => {
  it.each(['=1+1', '+1', '-1', '@SUM(A1)', '\t=1', '＝1'])('disarms the text %j', (text) => {
    expect(toCsv([[text]])).toBe(`'${text}`);
  });

  it('keeps negative numbers as numbers', () => expect(toCsv([[-12.5, 3, null]])).toBe('-12.5,3,'));

  it('quotes commas, quotes and line breaks', () => {
    expect(
      toCsv([
        ['a,b', 'say "x"'],
        ['c\nd', 'plain'],
      ]),
    ).toBe('"a,b","say ""x"""\r\n"c\nd",plain');
  });

  it('leaves a cell empty where there is no finite number', () => expect(toCsv([[Number.NaN, 1]])).toBe(',1'));
});
