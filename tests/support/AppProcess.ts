import { spawn, type ChildProcess } from 'node:child_process';

const stopLimitMs = 20_000;

/** One of the product's real processes, with the end of its output for the message of a failed test. */
export class AppProcess {
  private readonly child: ChildProcess;
  private readonly ended: Promise<void>;
  private output = '';

  constructor(
    private readonly name: string,
    args: string[],
    env: NodeJS.ProcessEnv,
  ) {
    this.child = spawn(process.execPath, args, { env, stdio: ['ignore', 'pipe', 'pipe'] });
    for (const stream of [this.child.stdout, this.child.stderr]) {
      stream?.on('data', (data: Buffer) => {
        this.output = (this.output + data.toString()).slice(-20_000);
      });
    }
    this.ended = new Promise((resolve) => this.child.once('close', () => resolve()));
  }

  get isRunning(): boolean {
    return this.child.exitCode === null && this.child.signalCode === null;
  }

  get log(): string {
    return `--- ${this.name} ---\n${this.output}`;
  }

  /** Ends it as an operator would. */
  async stop(): Promise<void> {
    if (!this.isRunning) return;
    this.child.kill('SIGTERM');
    const timer = setTimeout(() => this.child.kill('SIGKILL'), stopLimitMs);
    await this.ended;
    clearTimeout(timer);
  }

  /** Ends it as a power cut would. */
  async kill(): Promise<void> {
    this.child.kill('SIGKILL');
    await this.ended;
  }
}
