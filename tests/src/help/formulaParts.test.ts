import { describe, expect, it } from 'vitest';
import { formulaParts } from '@/help/formulaParts';

describe('formulaParts', () => {
  it('lowers and raises what stands in braces', () => {
    expect(formulaParts('f_{s} = 10^{x}')).toEqual([
      { place: 'line', text: 'f' },
      { place: 'sub', text: 's' },
      { place: 'line', text: ' = 10' },
      { place: 'sup', text: 'x' },
    ]);
  });

  it('leaves plain text and braces that mark nothing as they are', () => {
    expect(formulaParts('a_b {c}')).toEqual([{ place: 'line', text: 'a_b {c}' }]);
    expect(formulaParts('')).toEqual([]);
  });
});
