/** `12.4 s`, `3 min 05 s`, `1 h 02 min`. */
export function formatDuration(durationS: number | null | undefined): string {
  if (durationS === null || durationS === undefined || !Number.isFinite(durationS)) return '–';
  if (durationS < 60) return `${Number(durationS.toPrecision(3))} s`;
  const wholeS = Math.round(durationS);
  const two = (value: number): string => String(value).padStart(2, '0');
  if (wholeS < 3600) return `${Math.floor(wholeS / 60)} min ${two(wholeS % 60)} s`;
  return `${Math.floor(wholeS / 3600)} h ${two(Math.floor((wholeS % 3600) / 60))} min`;
}
