import { availableParallelism } from 'node:os';
import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import type { MonteCarloResult, MonteCarloTask } from './MonteCarloTask.js';
import { noiseCases } from './noiseCases.js';
import { toneCases } from './toneCases.js';

export interface MonteCarloFigures {
  runs: number;
  tones: {
    name: string;
    tones: number;
    missed: number;
    /** Mean square error over the bound, dB, with its 95 % interval. */
    aboveBoundDb: number;
    lowDb: number;
    highDb: number;
  }[];
  noise: { name: string; runs: number; calledFolded: number; kinds: MonteCarloResult['kinds'] }[];
}

const runsPerTask = 50;

/** Runs every case `runs` times, spread over the cores; the same number of runs gives the same figures. */
export async function runMonteCarlo(
  runs: number,
  options: { threads?: number; onProgress: (text: string) => void },
): Promise<MonteCarloFigures> {
  const pool = new Piscina({
    filename: fileURLToPath(new URL('./monteCarloThread.ts', import.meta.url)),
    maxThreads: options.threads ?? availableParallelism(),
    minThreads: 1,
  });
  const runCase = async (what: MonteCarloTask['what'], index: number): Promise<MonteCarloResult> => {
    const tasks: MonteCarloTask[] = [];
    for (let from = 0; from < runs; from += runsPerTask)
      tasks.push({ what, index, runs: Math.min(runsPerTask, runs - from), seed: 1 + from + 1_000_000 * index });
    const results = (await Promise.all(tasks.map((task) => pool.run(task)))) as MonteCarloResult[];
    options.onProgress(`${what} ${index + 1}: ${runs} runs`);
    return results.reduce(addUp);
  };
  try {
    const [tones, noise]: [MonteCarloFigures['tones'], MonteCarloFigures['noise']] = [[], []];
    for (const [index, { name }] of toneCases.entries()) {
      const { tones: drawn, missed, squares } = await runCase('tones', index);
      tones.push({ name, tones: drawn, missed, ...aboveBound(squares, drawn - missed) });
    }
    for (const [index, { name }] of noiseCases.entries()) {
      const { calledFolded, kinds } = await runCase('noise', index);
      noise.push({ name, runs, calledFolded, kinds });
    }
    return { runs, tones, noise };
  } finally {
    await pool.destroy();
  }
}

function addUp(a: MonteCarloResult, b: MonteCarloResult): MonteCarloResult {
  const kinds = { ...a.kinds };
  for (const [kind, count] of Object.entries(b.kinds)) {
    const name = kind as keyof typeof kinds;
    kinds[name] = (kinds[name] ?? 0) + count;
  }
  return {
    tones: a.tones + b.tones,
    missed: a.missed + b.missed,
    squares: a.squares + b.squares,
    kinds,
    calledFolded: a.calledFolded + b.calledFolded,
  };
}

/**
 * The mean of n squared normal errors is chi-square over n: a standard deviation of sqrt(2/n) on a logarithmic scale, for many.
 */
export function aboveBound(squares: number, count: number): { aboveBoundDb: number; lowDb: number; highDb: number } {
  const aboveBoundDb = 10 * Math.log10(squares / count);
  const half = ((1.96 * 10) / Math.LN10) * Math.sqrt(2 / count);
  return { aboveBoundDb, lowDb: aboveBoundDb - half, highDb: aboveBoundDb + half };
}
