// npm run user -- …: the user command on the installation of this folder, or on the one that DATABASE_URL names.
import { spawnSync } from 'node:child_process';
import { appEnvironment, projectDir, readSettings } from './services/settings.mjs';

const env = process.env.DATABASE_URL ? process.env : appEnvironment(readSettings());
const { status } = spawnSync(process.execPath, ['--import', 'tsx', 'server/user.ts', ...process.argv.slice(2)], {
  cwd: projectDir,
  env,
  stdio: 'inherit',
});
process.exit(status ?? 1);
