import { setTimeout as pause } from 'node:timers/promises';

/** Asks until the answer is yes. @throws Error naming what did not come about, with what `describe` says of the state */
export async function waitUntil(
  what: string,
  isSo: () => Promise<boolean>,
  { limitMs = 60_000, pauseMs = 150, describe = () => Promise.resolve('') } = {},
): Promise<void> {
  const endMs = Date.now() + limitMs;
  while (!(await isSo())) {
    if (Date.now() > endMs) {
      throw new Error(`It did not come about within ${limitMs / 1000} s that ${what}. ${await describe()}`);
    }
    await pause(pauseMs);
  }
}
