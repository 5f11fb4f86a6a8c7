import { fileURLToPath } from 'node:url';
import { Piscina } from 'piscina';
import { UnavailableError } from '../errors/index.js';
import type { BcryptEngine } from './PasswordHasher.js';

/** About a minute of work at the usual cost: whoever comes later is told to try again rather than left waiting. */
const maxWaiting = 100;

/**
 * Hashes passwords in a thread: each takes as long as hundreds of ordinary requests, and would hold them all up.
 * Compiled code only: the loader of the sources does not reach into threads.
 */
export class BcryptPool implements BcryptEngine {
  private readonly pool = new Piscina({
    filename: fileURLToPath(new URL('./bcryptThread.js', import.meta.url)),
    minThreads: 0,
    maxThreads: 1,
    idleTimeout: 60_000,
  });

  hash(text: string, cost: number): Promise<string> {
    return this.run<string>('hash', { text, cost });
  }

  compare(text: string, hash: string): Promise<boolean> {
    return this.run<boolean>('compare', { text, hash });
  }

  close(): Promise<void> {
    return this.pool.destroy();
  }

  private async run<T>(name: 'hash' | 'compare', task: object): Promise<T> {
    if (this.pool.queueSize >= maxWaiting) throw new UnavailableError();
    return (await this.pool.run(task, { name })) as T;
  }
}
