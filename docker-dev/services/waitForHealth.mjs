import { setTimeout as pause } from 'node:timers/promises';

/** Resolves when every part of the app answers; the last answer is in the error otherwise. */
export async function waitForHealth(port, limitMs = 60_000) {
  const endMs = Date.now() + limitMs;
  let last = 'no answer';
  while (Date.now() < endMs) {
    try {
      const response = await fetch(`http://127.0.0.1:${port}/api/health`);
      if (response.ok) return;
      last = await response.text();
    } catch (error) {
      last = error.message;
    }
    await pause(200);
  }
  throw new Error(`The app did not become ready within ${limitMs / 1000} s: ${last}`);
}
