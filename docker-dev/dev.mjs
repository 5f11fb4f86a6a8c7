// npm run dev: like npm start, from the sources: Vite with hot reload, server and worker restarted on change.
import { join } from 'node:path';
import { say } from './services/say.mjs';
import { projectDir } from './services/settings.mjs';
import { waitForHealth } from './services/waitForHealth.mjs';
import { runInstallation, runToEnd } from './runInstallation.mjs';

const bin = (name) => join(projectDir, 'node_modules', '.bin', name);

await runInstallation(
  async ({ settings, processes, env }) => {
    const devEnv = { ...env, NODE_ENV: 'development', PUBLIC_URL: `http://127.0.0.1:${settings.devPort}` };
    runToEnd('bringing the database up to date', [bin('tsx'), 'server/migrate.ts'], devEnv);
    if (settings.isDemo) runToEnd('filling in the demo', [bin('tsx'), 'server/demo/seed.ts'], devEnv);
    processes.start(
      'smtp',
      'node',
      ['docker-dev/services/smtpFake.mjs', String(settings.smtpPort), settings.mailDir],
      devEnv,
    );
    processes.start('server', bin('tsx'), ['watch', 'server/main.ts'], devEnv, { isShown: true });
    processes.start('worker', bin('tsx'), ['watch', 'worker/main.ts'], devEnv, { isShown: true });
    processes.start('client', bin('vite'), [], devEnv, { isShown: true });
    await waitForHealth(settings.port);
    if (settings.isDemo) {
      processes.start('demo', bin('tsx'), ['server/demo/followUp.ts'], devEnv, { mayEnd: true });
    }
    say(`ready: http://127.0.0.1:${settings.devPort} (API on ${settings.port})`);
  },
  { extraPorts: ({ devPort }) => [{ port: devPort, variable: 'DEV_PORT', purpose: "Vite's server" }] },
);
