import type { Logger } from '../../server/logging/createLogger.js';

export interface Loop {
  /** Stops after the run in progress. */
  stop: () => Promise<void>;
}

/**
 * Runs a task again and again with a pause between runs, never two at once; a failing run is logged and the next one
 * still comes: these loops put things right after faults and must outlive them.
 */
export function startLoop(name: string, pauseMs: number, logger: Logger, task: () => Promise<unknown>): Loop {
  let isStopped = false;
  let timer: NodeJS.Timeout | undefined;
  let wake: (() => void) | undefined;
  const finished = (async () => {
    while (!isStopped) {
      try {
        await task();
      } catch (error) {
        logger.warn({ err: error, loop: name }, 'background task failed, will run again');
      }
      if (isStopped) return;
      await new Promise<void>((resolve) => {
        wake = resolve;
        timer = setTimeout(resolve, pauseMs);
      });
    }
  })();
  return {
    stop: () => {
      isStopped = true;
      clearTimeout(timer);
      wake?.();
      return finished;
    },
  };
}
