import { readFileSync } from 'node:fs';
import { z } from 'zod';

/** The product's version from package.json, which lies beside `server` in the sources and two folders above the build. */
export function readVersion(): string {
  for (const candidate of ['../package.json', '../../../package.json']) {
    try {
      const content: unknown = JSON.parse(readFileSync(new URL(candidate, import.meta.url), 'utf8'));
      return z.object({ name: z.literal('overfold'), version: z.string() }).parse(content).version;
    } catch {
      continue;
    }
  }
  throw new Error('package.json of Overfold was not found beside the program.');
}
