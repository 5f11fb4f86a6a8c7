import { spawnSync } from 'node:child_process';
import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { startBackgroundServices } from './services/backgroundServices.mjs';
import { ensureDebianPackages } from './services/debianPackages.mjs';
import { requireFreePort } from './services/ports.mjs';
import { Processes } from './services/Processes.mjs';
import { addChild, clearRunning, readRunning, writeRunning } from './services/runFile.mjs';
import { fail, say } from './services/say.mjs';
import { setUpPackages } from './services/setUpOnce.mjs';
import { appEnvironment, projectDir, readSettings } from './services/settings.mjs';

function checkNode() {
  const [major, minor] = process.versions.node.split('.').map(Number);
  if (major < 20 || (major === 20 && minor < 19)) {
    throw new Error(`Node ${process.versions.node} is too old: 20.19 or newer is needed.`);
  }
}

async function checkPorts(settings, extraPorts) {
  const running = readRunning(settings.stateDir);
  if (running) {
    throw new Error(
      `This installation runs already (process ${running.pid}, http://127.0.0.1:${running.port}). Stop it with: npm run stop`,
    );
  }
  await requireFreePort(settings.port, 'PORT', 'the app');
  await requireFreePort(settings.postgresPort, 'OVERFOLD_PG_PORT', 'its PostgreSQL');
  await requireFreePort(settings.redisPort, 'OVERFOLD_REDIS_PORT', 'its Redis');
  await requireFreePort(settings.smtpPort, 'OVERFOLD_SMTP_PORT', 'its mail catcher');
  for (const { port, variable, purpose } of extraPorts) await requireFreePort(port, variable, purpose);
}

/** Runs one of the app's commands to its end; `command` is a program with its arguments. */
export function runToEnd(what, [program, ...args], env) {
  say(what);
  const result = spawnSync(program, args, {
    cwd: projectDir,
    env,
    stdio: ['ignore', 'pipe', 'pipe'],
    encoding: 'utf8',
  });
  if (result.status !== 0) throw new Error(`${what} failed:\n${result.stdout}${result.stderr}`.trim());
  return result.stdout;
}

/**
 * The frame of `npm start` and `npm run dev`: checks, packages, services; then `launch` starts the processes. Everything
 * that was started is stopped on a signal, on a failure, and when a process ends by itself.
 */
export async function runInstallation(launch, { extraPorts = () => [] } = {}) {
  let settings;
  let services;
  let processes;
  let isStopping = false;
  const stopAll = async (exitCode) => {
    if (isStopping) return;
    isStopping = true;
    await processes?.stop();
    await services?.stop();
    if (settings) clearRunning(settings.stateDir);
    process.exit(exitCode);
  };
  // A closed terminal takes the output with it; stopping must go on all the same.
  for (const stream of [process.stdout, process.stderr]) stream.on('error', () => undefined);
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
    process.on(signal, () => {
      if (!isStopping) say('stopping');
      void stopAll(0);
    });
  }
  try {
    checkNode();
    settings = readSettings();
    await checkPorts(settings, extraPorts(settings));
  } catch (error) {
    fail(error.message);
  }
  try {
    writeRunning(settings.stateDir, settings.port);
    await setUpPackages();
    ensureDebianPackages(['postgresql', 'redis-server']);
    mkdirSync(settings.mailDir, { recursive: true });
    say('starting PostgreSQL and Redis');
    services = await startBackgroundServices(settings);
    processes = new Processes({
      logDir: join(settings.stateDir, 'logs'),
      onStart: (pid) => addChild(settings.stateDir, pid),
      onUnexpectedExit: (name, code, logFile) => {
        process.stderr.write(`overfold: ${name} ended by itself (code ${code}); its log is ${logFile}\n`);
        void stopAll(1);
      },
    });
    await launch({ settings, processes, env: appEnvironment(settings) });
  } catch (error) {
    process.stderr.write(`overfold: ${error.message}\n`);
    await stopAll(1);
  }
}
