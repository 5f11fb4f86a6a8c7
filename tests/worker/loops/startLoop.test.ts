import { pino } from 'pino';
import { expect, it, vi } from 'vitest';
import { startLoop } from '../../../worker/loops/startLoop.js';

const logger = pino({ level: 'silent' });

it('runs again after a failing run, and not after stop', async () => {
  const task = vi.fn<() => Promise<void>>().mockRejectedValueOnce(new Error('down')).mockResolvedValue();
  const loop = startLoop('test', 1, logger, task);
  await vi.waitFor(() => expect(task.mock.calls.length).toBeGreaterThan(2));
  await loop.stop();
  const callsAtStop = task.mock.calls.length;
  await new Promise((resolve) => setTimeout(resolve, 20));
  expect(task.mock.calls.length).toBe(callsAtStop);
});

it('waits for the run in progress when stopped', async () => {
  let isFinished = false;
  const loop = startLoop('test', 1000, logger, async () => {
    await new Promise((resolve) => setTimeout(resolve, 20));
    isFinished = true;
  });
  await loop.stop();
  expect(isFinished).toBe(true);
});
