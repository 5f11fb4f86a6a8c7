import { MessageChannel } from 'node:worker_threads';
import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { ScreenTask, ScreenTaskResult } from './ScreenTask.js';

/** Compiled code has only .js beside it; under the development loader the source is .ts. */
const extension = import.meta.url.endsWith('.ts') ? 'ts' : 'js';
const entry = fileURLToPath(new URL(`./screenThread.${extension}`, import.meta.url));

/** A capture that needs more heap than this is a fault of its file or of ours, and must not take the worker down. */
const heapLimitMb = 1024;

/** Computing threads of one worker process: screening never blocks the loop that keeps the job's lock alive. */
export class ScreeningPool {
  private readonly pool: Piscina;

  constructor(threadCount: number) {
    this.pool = new Piscina({
      filename: entry,
      minThreads: 1,
      maxThreads: threadCount,
      idleTimeout: 60_000,
      resourceLimits: { maxOldGenerationSizeMb: heapLimitMb },
    });
  }

  /** Rejects when the thread died, ran out of memory, or `signal` was raised. */
  async run(
    task: Omit<ScreenTask, 'progressPort'>,
    options: { onProgress: (share: number) => void; signal: AbortSignal },
  ): Promise<ScreenTaskResult> {
    const { port1, port2 } = new MessageChannel();
    port1.on('message', (share: number) => options.onProgress(share));
    try {
      return (await this.pool.run(
        { ...task, progressPort: port2 },
        { transferList: [port2], signal: options.signal },
      )) as ScreenTaskResult;
    } finally {
      port1.close();
    }
  }

  close(): Promise<void> {
    return this.pool.destroy();
  }
}
