// npm run reset -- --yes: deletes the installation in this folder with all its data.
import { existsSync, rmSync } from 'node:fs';
import { removePostgresData } from './services/postgres.mjs';
import { readChildren, readRunning } from './services/runFile.mjs';
import { fail, say } from './services/say.mjs';
import { readSettings } from './services/settings.mjs';

const { stateDir } = readSettings();
if (!process.argv.includes('--yes')) {
  fail(
    `this deletes ${stateDir} with all projects, captures, decisions and mails. If that is meant: npm run reset -- --yes`,
  );
}
if (readRunning(stateDir) || readChildren(stateDir).length > 0) {
  fail('the installation is running. Stop it first: npm run stop');
}
if (!existsSync(stateDir)) say('there is nothing to delete');
else {
  removePostgresData(stateDir);
  rmSync(stateDir, { recursive: true });
  say(`deleted ${stateDir}`);
}
