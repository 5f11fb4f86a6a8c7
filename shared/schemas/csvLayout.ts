import { z } from 'zod';

export const csvTimeUnits = ['s', 'ms', 'us', 'iso8601', 'epochS', 'epochMs'] as const;

/**
 * How a CSV capture is to be read: recognised from its first bytes, shown, and corrected by a person where wrong.
 * Columns are counted from 0; `timeColumn` null means values only (the rate then comes from a preamble or the sheet).
 */
export const csvLayoutSchema = z.strictObject({
  encoding: z.enum(['utf-8', 'utf-16le', 'utf-16be', 'latin1']),
  separator: z.enum([',', ';', '\t', ' ', '']),
  decimalSign: z.enum(['.', ',']),
  /** Lines before the first row of numbers (preamble, header, units row), counted in lines. */
  skipLines: z.int().min(0).max(10_000),
  columnNames: z.array(z.string().max(255)).max(1024),
  timeColumn: z.int().min(0).max(1023).nullable(),
  timeUnit: z.enum(csvTimeUnits),
  valueColumns: z.array(z.int().min(0).max(1023)).min(1).max(64),
  /** One per value column; empty where unknown. */
  units: z.array(z.string().max(24)).max(64),
  /** Rate found in a preamble, if any. */
  sampleRateHz: z.number().positive().nullable(),
});

export type CsvLayout = z.infer<typeof csvLayoutSchema>;
