const units = ['B', 'KiB', 'MiB', 'GiB', 'TiB'];

/** `1.4 MiB`: binary units, as the limits are. */
export function formatBytes(bytes: number): string {
  const exponent = bytes < 1 ? 0 : Math.min(units.length - 1, Math.floor(Math.log2(bytes) / 10));
  const value = bytes / 1024 ** exponent;
  return `${exponent === 0 ? value : Number(value.toPrecision(3))} ${units[exponent] ?? 'B'}`;
}
