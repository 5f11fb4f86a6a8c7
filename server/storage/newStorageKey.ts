import { randomUUID } from 'node:crypto';

/** Two levels of folders keep any one of them small. */
export function newStorageKey(): string {
  const id = randomUUID();
  return `${id.slice(0, 2)}/${id}`;
}

/** Whether a name in the store is one of ours; anything else there is left alone. */
export const isStorageKey = (name: string): boolean =>
  /^([0-9a-f]{2})\/\1[0-9a-f]{6}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/.test(name);
