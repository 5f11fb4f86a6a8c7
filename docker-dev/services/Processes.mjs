import { spawn } from 'node:child_process';
import { createWriteStream, mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { projectDir } from './settings.mjs';

const graceMs = 15_000;

/** The app's processes, each in a group of its own, with a log file each; stopped together. */
export class Processes {
  #running = [];
  #isStopping = false;

  constructor({ logDir, onStart, onUnexpectedExit }) {
    mkdirSync(logDir, { recursive: true });
    this.logDir = logDir;
    this.onStart = onStart;
    this.onUnexpectedExit = onUnexpectedExit;
  }

  start(name, command, args, env, { isShown = false, mayEnd = false } = {}) {
    const child = spawn(command, args, { cwd: projectDir, env, stdio: ['ignore', 'pipe', 'pipe'], detached: true });
    const log = createWriteStream(join(this.logDir, `${name}.log`), { flags: 'a' });
    for (const stream of [child.stdout, child.stderr]) {
      stream.pipe(log, { end: false });
      if (isShown) stream.pipe(process.stdout, { end: false });
    }
    const exited = new Promise((resolve) => {
      child.once('exit', resolve);
      child.once('error', resolve);
    });
    void exited.then((code) => {
      if (!this.#isStopping && !mayEnd) this.onUnexpectedExit(name, code, join(this.logDir, `${name}.log`));
    });
    if (child.pid) this.onStart(child.pid);
    this.#running.push({ child, exited });
    return child;
  }

  async stop() {
    this.#isStopping = true;
    await Promise.all(
      this.#running.map(async ({ child, exited }) => {
        if (child.exitCode !== null || child.signalCode !== null) return;
        signalGroup(child.pid, 'SIGTERM');
        const isGone = await Promise.race([exited.then(() => true), pause(graceMs, false, { ref: false })]);
        if (!isGone) signalGroup(child.pid, 'SIGKILL');
      }),
    );
    this.#running = [];
  }
}

export function signalGroup(pid, signal) {
  try {
    process.kill(-pid, signal);
  } catch (error) {
    if (error.code !== 'ESRCH') throw error;
  }
}
