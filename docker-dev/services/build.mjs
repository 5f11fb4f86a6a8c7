import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { say } from './say.mjs';
import { projectDir } from './settings.mjs';

const sources = [
  'src',
  'server',
  'worker',
  'shared',
  'public',
  'index.html',
  'vite.config.ts',
  'tsconfig.json',
  'tsconfig.build.json',
  'package-lock.json',
];

function* filesBelow(path) {
  if (!existsSync(path)) return;
  if (!statSync(path).isDirectory()) yield path;
  else for (const name of readdirSync(path).sort()) yield* filesBelow(join(path, name));
}

function sourceHash() {
  const hash = createHash('sha256');
  for (const source of sources) {
    for (const file of filesBelow(join(projectDir, source))) hash.update(file).update(readFileSync(file));
  }
  return hash.digest('hex');
}

function run(script) {
  return new Promise((resolve, reject) => {
    const child = spawn('npm', ['run', '--silent', script], { cwd: projectDir, stdio: ['ignore', 'pipe', 'pipe'] });
    let output = '';
    for (const stream of [child.stdout, child.stderr]) stream.on('data', (data) => (output += data));
    child.once('exit', (code) =>
      code === 0 ? resolve() : reject(new Error(`npm run ${script} failed:\n${output.trim()}`)),
    );
  });
}

/** Builds client, server and worker, unless what is there was built from these very sources. */
export async function ensureBuild() {
  const marker = join(projectDir, 'dist', '.built-from');
  const hash = sourceHash();
  if (existsSync(marker) && readFileSync(marker, 'utf8') === hash) return;
  say('building');
  rmSync(join(projectDir, 'dist'), { recursive: true, force: true });
  await Promise.all([run('build:client'), run('build:node')]);
  mkdirSync(join(projectDir, 'dist'), { recursive: true });
  writeFileSync(marker, hash);
}
