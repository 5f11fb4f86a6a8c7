import type { Finding } from '@shared/schemas/screening.js';
import type { Range } from '@/components/charts/SpectrumModel';

const widthShare = 0.08;

/** The stretch of the spectrum that shows where a finding is, with some room about it; null: all of it. */
export function rangeAround(
  finding: Pick<Finding, 'frequencyHz' | 'fromHz' | 'toHz'>,
  foldingHz: number,
): Range | null {
  const fromHz = finding.fromHz ?? finding.frequencyHz;
  const toHz = finding.toHz ?? finding.frequencyHz;
  if (fromHz === undefined || toHz === undefined || fromHz > foldingHz) return null;
  const room = Math.max((toHz - fromHz) * 0.25, foldingHz * widthShare * 0.5);
  return { fromHz: Math.max(0, fromHz - room), toHz: Math.min(foldingHz, toHz + room) };
}
