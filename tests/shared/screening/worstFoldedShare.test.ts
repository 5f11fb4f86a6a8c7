import { describe, expect, it } from 'vitest';
import { worstFoldedShareDb } from '../../../shared/screening/worstFoldedShare.js';
import { buildRecord } from '../../support/buildRecord.js';

const profileOf = (levels: number[]) => {
  const { profile } = buildRecord();
  if (profile === null) throw new Error('a measured record is expected');
  return { ...profile, cellHz: 10, meanDb: levels, tonelessDb: levels, medianDb: levels };
};
const boundAt = (level: number) => ({
  edgeUpperDb: level,
  foldingFrequencyHz: 1000,
  atDb: () => level,
  usesFilter: false,
  assumption: '',
});

describe('worstFoldedShareDb', () => {
  it('is the distance between flat densities', () => {
    expect(worstFoldedShareDb(profileOf(Array<number>(100).fill(-30)), boundAt(-75), [0, 780])).toBeCloseTo(-45, 9);
  });

  it('sums powers: one strong cell among ten stands for all', () => {
    const levels = [0, ...Array<number>(9).fill(-200)];
    expect(worstFoldedShareDb(profileOf(levels), boundAt(-50), [0, 100])).toBeCloseTo(-40, 6);
  });
});
