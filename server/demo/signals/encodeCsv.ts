export interface CsvText {
  columns: string[];
  timesS: Float64Array;
  channels: Float64Array[];
  separator?: ',' | ';';
  decimalSign?: '.' | ',';
  timeDecimals?: number;
  preamble?: string[];
}

/** Text as loggers export it: a preamble, a header, one row a sample. */
export function encodeCsv(text: CsvText): Buffer {
  const { columns, timesS, channels, separator = ',', decimalSign = '.', timeDecimals = 6, preamble = [] } = text;
  const written = (value: number, decimals: number): string => value.toFixed(decimals).replace('.', decimalSign);
  const rows = Array.from(timesS, (timeS, row) =>
    [written(timeS, timeDecimals), ...channels.map((samples) => written(samples[row] ?? 0, 6))].join(separator),
  );
  return Buffer.from(`${[...preamble, columns.join(separator), ...rows].join('\n')}\n`);
}

export const evenTimes = (frames: number, sampleRateHz: number): Float64Array =>
  Float64Array.from({ length: frames }, (_, row) => row / sampleRateHz);
