import { readFileSync } from 'node:fs';

/** A stored reference vector from tests/fixtures/reference; see the README there. */
export function readReference<T>(name: string): T {
  return JSON.parse(readFileSync(new URL(`../fixtures/reference/${name}`, import.meta.url), 'utf8')) as T;
}
