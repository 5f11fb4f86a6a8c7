import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { LabelledCapture } from '../sets/LabelledCapture.js';
import type { BenchResult, BenchTask, ScreenedCapture } from './ScreenedCapture.js';

const reportEvery = 50;

/** Screens all captures of a set, one thread a core; the two files of a pair are given to each other as companions. */
export async function screenSet(
  captures: readonly LabelledCapture[],
  options: { threads?: number; withPairs: boolean; onProgress: (done: number) => void },
): Promise<ScreenedCapture[]> {
  const pool = new Piscina({
    filename: fileURLToPath(new URL('./benchThread.ts', import.meta.url)),
    maxThreads: options.threads ?? availableParallelism(),
    minThreads: 1,
  });
  let done = 0;
  try {
    return await Promise.all(
      captures.map(async (truth) => {
        const other = options.withPairs ? companionOf(truth, captures) : undefined;
        const task: BenchTask = {
          path: truth.path,
          file: truth.file,
          companion: other === undefined ? null : { path: other.path, name: other.file },
        };
        const result = (await pool.run(task)) as BenchResult;
        if (++done % reportEvery === 0) options.onProgress(done);
        return { ...result, truth };
      }),
    );
  } finally {
    await pool.destroy();
  }
}

function companionOf(truth: LabelledCapture, captures: readonly LabelledCapture[]): LabelledCapture | undefined {
  if (truth.pairId === '') return undefined;
  return captures.find((one) => one !== truth && one.pairId === truth.pairId);
}
