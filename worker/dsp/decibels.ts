/** 10·lg of a power ratio or density, held within ±400 dB so that records stay finite. */
export function decibels(power: number): number {
  return 10 * Math.log10(Math.min(1e40, Math.max(power, 1e-40)));
}
