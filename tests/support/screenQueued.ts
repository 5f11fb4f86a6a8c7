import { MessageChannel } from 'node:worker_threads';
import { UnrecoverableError } from 'bullmq';
import { Capture } from '../../server/entities/index.js';
import { relayCaptures } from '../../server/queues/relayCaptures.js';
import { screenCapture } from '../../worker/processors/screenCapture.js';
import type { ScreenTask, ScreenTaskResult } from '../../worker/threads/ScreenTask.js';
import { screenThread } from '../../worker/threads/screenThread.js';
import type { ScreeningPool } from '../../worker/threads/ScreeningPool.js';
import type { TestDependencies } from './testDependencies.js';

export type RunTask = (task: Omit<ScreenTask, 'progressPort'>) => ScreenTaskResult | Promise<ScreenTaskResult>;

/** What a computing thread does, in this thread: the tests' loader has no way into others. */
export function runTask(task: Parameters<RunTask>[0]): ScreenTaskResult {
  const { port1, port2 } = new MessageChannel();
  try {
    return screenThread({ ...task, progressPort: port2 });
  } finally {
    port1.close();
  }
}

/** Does a job as the worker would, its processor included. */
export async function screenJob(deps: TestDependencies, captureId: string, run: RunTask = runTask): Promise<void> {
  const { attempt } = await deps.dataSource.manager.findOneByOrFail(Capture, { id: captureId });
  const screeningPool = { run: async (task: Parameters<RunTask>[0]) => run(task) } as unknown as ScreeningPool;
  try {
    await screenCapture({ captureId, attempt }, { ...deps, screeningPool }, new AbortController().signal);
  } catch (error) {
    // A bad file: the capture says so.
    if (!(error instanceof UnrecoverableError)) throw error;
  }
}

/**
 * Screens whatever is received or queued until nothing is, in the order of upload.
 * @returns the names of the files screened, one for each time
 */
export async function screenQueued(deps: TestDependencies, run: RunTask = runTask): Promise<string[]> {
  const done: string[] = [];
  const mostJobs = 40;
  for (;;) {
    await relayCaptures(deps.dataSource, deps.queue);
    const next = await deps.dataSource.manager.findOne(Capture, {
      where: { state: 'queued' },
      order: { createdAt: 'ASC', id: 'ASC' },
    });
    if (!next) return done;
    if (done.length >= mostJobs) throw new Error(`Screening does not end: ${done.join(', ')}`);
    done.push(next.fileName);
    await screenJob(deps, next.id, run);
  }
}
