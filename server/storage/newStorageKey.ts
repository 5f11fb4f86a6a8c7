import { randomUUID } from 'node:crypto';

/** Two levels of folders keep any one of them small. */
export function newStorageKey(): string {
  const id = randomUUID();
  return `${id.slice(0, 2)}/${id}`;
}
