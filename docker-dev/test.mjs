// npm test: brings up its own services on free ports in a temporary folder, runs every test, and ends with one plain line.
// Arguments after -- go to vitest (file filters, -t NAME).
import { spawn } from 'node:child_process';
import { chmodSync, existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { startBackgroundServices } from './services/backgroundServices.mjs';
import { ensureDebianPackages } from './services/debianPackages.mjs';
import { findFreePorts } from './services/ports.mjs';
import { say } from './services/say.mjs';
import { projectDir } from './services/settings.mjs';
import { setUpBuild, setUpPackages } from './services/setUpOnce.mjs';

const vitestProjects = ['node', 'client', 'integration', 'system'];

function runVitest(project, filters, resultFile, env) {
  return new Promise((resolve) => {
    const child = spawn(
      join(projectDir, 'node_modules', '.bin', 'vitest'),
      [
        'run',
        '--project',
        project,
        '--reporter=default',
        '--reporter=json',
        `--outputFile.json=${resultFile}`,
        '--passWithNoTests',
        ...filters,
      ],
      { cwd: projectDir, env, stdio: ['ignore', 'inherit', 'inherit'] },
    );
    running = child;
    child.once('exit', (code) => resolve(code ?? 1));
  });
}

let running;
let services;
const folder = mkdtempSync(join(tmpdir(), 'overfold-test-'));
// PostgreSQL's own user must be able to enter.
chmodSync(folder, 0o755);

async function cleanUp() {
  await services?.stop();
  rmSync(folder, { recursive: true, force: true });
}
for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) {
  process.once(signal, () => {
    running?.kill('SIGTERM');
    void cleanUp().then(() => process.exit(130));
  });
}

let exitCode = 0;
const totals = { passed: 0, failed: 0, skipped: 0 };
try {
  await setUpPackages();
  ensureDebianPackages(['postgresql', 'redis-server', 'chromium']);
  await setUpBuild();
  say('starting PostgreSQL and Redis for the tests');
  const [postgresPort, redisPort] = await findFreePorts(2);
  services = await startBackgroundServices({ stateDir: folder, postgresPort, redisPort, isThrowAway: true });
  const env = {
    ...process.env,
    NODE_ENV: 'test',
    OVERFOLD_TEST_DATABASE_URL: `postgres://overfold@127.0.0.1:${postgresPort}/overfold`,
    OVERFOLD_TEST_REDIS_URL: `redis://127.0.0.1:${redisPort}`,
    OVERFOLD_TEST_DIR: folder,
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
  };
  for (const project of vitestProjects) {
    say(`running tests: ${project}`);
    const resultFile = join(folder, `${project}.json`);
    const code = await runVitest(project, process.argv.slice(2), resultFile, env);
    if (code !== 0) exitCode = 1;
    if (!existsSync(resultFile)) {
      // It ended before it could say anything: that must not pass for "nothing failed".
      totals.failed += 1;
      continue;
    }
    const result = JSON.parse(readFileSync(resultFile, 'utf8'));
    totals.passed += result.numPassedTests;
    totals.failed += result.numFailedTests;
    totals.skipped += result.numPendingTests + result.numTodoTests;
    // A file that fails before its first test counts no failed test of its own.
    const broken = result.testResults.filter(
      ({ status, assertionResults }) => status === 'failed' && assertionResults.length === 0,
    );
    totals.failed += broken.length;
  }
} catch (error) {
  process.stderr.write(`overfold: ${error.stack ?? error.message}\n`);
  totals.failed += 1;
} finally {
  await cleanUp();
}
if (totals.passed === 0 || totals.failed > 0) exitCode = 1;
if (totals.skipped > 0) say(`${totals.skipped} skipped`);
process.stdout.write(`${totals.passed} passed, ${totals.failed} failed\n`);
process.exit(exitCode);
