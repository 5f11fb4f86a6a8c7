import { describe, expect, it } from 'vitest';
import { stripPath } from '@/components/charts/stripPath';

describe('stripPath', () => {
  it('draws the strongest density at the top and the weakest at the bottom', () => {
    expect(stripPath([-80, -20], 100, 20)).toBe('M0.0 19.0L100.0 1.0');
  });

  it('cuts off what lies more than 100 dB below the strongest', () => {
    expect(stripPath([-300, -100, 0], 100, 20)).toBe('M0.0 19.0L50.0 19.0L100.0 1.0');
  });

  it('draws a level spectrum without dividing by nothing', () => {
    expect(stripPath([-5, -5], 10, 10)).not.toContain('NaN');
  });

  it('draws nothing of a single point', () => expect(stripPath([-5], 10, 10)).toBe(''));
});
