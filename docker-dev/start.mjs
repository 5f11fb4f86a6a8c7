// npm start: sets up everything that is missing, then runs the installation in this folder until it is stopped.
import { join } from 'node:path';
import { say } from './services/say.mjs';
import { projectDir } from './services/settings.mjs';
import { setUpBuild } from './services/setUpOnce.mjs';
import { waitForHealth } from './services/waitForHealth.mjs';
import { runInstallation, runToEnd } from './runInstallation.mjs';

const built = (...path) => join(projectDir, 'dist', 'node', ...path);

await runInstallation(async ({ settings, processes, env }) => {
  await setUpBuild();
  runToEnd('bringing the database up to date', ['node', built('server', 'migrate.js')], env);
  if (settings.isDemo) runToEnd('filling in the demo', ['node', built('server', 'demo', 'seed.js')], env);
  processes.start(
    'smtp',
    'node',
    [join(projectDir, 'docker-dev', 'services', 'smtpFake.mjs'), String(settings.smtpPort), settings.mailDir],
    env,
  );
  processes.start('server', 'node', [built('server', 'main.js')], env);
  processes.start('worker', 'node', [built('worker', 'main.js')], env);
  await waitForHealth(settings.port);

  say(`ready: http://127.0.0.1:${settings.port}`);
  if (settings.isDemo) {
    processes.start('demo', 'node', [built('server', 'demo', 'followUp.js')], env, { mayEnd: true });
    const { demoAccounts } = await import(built('server', 'demo', 'demoAccounts.js'));
    say('demo sign-ins:');
    for (const { role, email, password } of demoAccounts) {
      process.stdout.write(`  ${role.padEnd(14)} ${email.padEnd(24)} ${password}\n`);
    }
  } else {
    say('make the first admin with: npm run user -- add --email YOU@EXAMPLE --name "Your name" --admin');
  }
  say('stop with Ctrl-C');
});
