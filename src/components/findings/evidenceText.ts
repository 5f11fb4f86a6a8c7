const units: [RegExp, string][] = [
  [/Hz$/, 'Hz'],
  [/Db$/, 'dB'],
  [/Ms$/, 'ms'],
  [/S$/, 's'],
  [/Share$/, 'share'],
  [/Count$/, 'count'],
];

/** `contaminationBoundDb` -> `contamination bound (dB)`. */
export function evidenceLabel(name: string): string {
  const unit = units.find(([ending]) => ending.test(name));
  const bare = unit ? name.replace(unit[0], '') : name;
  const words = bare.replace(/([a-z0-9])([A-Z])/g, '$1 $2').toLowerCase();
  return unit ? `${words} (${unit[1]})` : words;
}

export function evidenceValue(value: number | string | boolean): string {
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  return typeof value === 'number' ? String(Number(value.toPrecision(6))) : value;
}
