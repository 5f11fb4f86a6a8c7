import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { fileURLToPath } from 'node:url';

export const projectDir = dirname(dirname(dirname(fileURLToPath(import.meta.url))));

function portOf(name, fallback) {
  const port = Number(process.env[name] || fallback);
  if (Number.isInteger(port) && port > 0 && port < 65_536) return port;
  throw new Error(`${name} must be a port number, not "${process.env[name]}".`);
}

/** Ports and folders of the installation that the start command makes. */
export function readSettings() {
  const stateDir = join(projectDir, '.overfold');
  return {
    stateDir,
    port: portOf('PORT', 4400),
    postgresPort: portOf('OVERFOLD_PG_PORT', 4401),
    redisPort: portOf('OVERFOLD_REDIS_PORT', 4402),
    smtpPort: portOf('OVERFOLD_SMTP_PORT', 4403),
    devPort: portOf('DEV_PORT', 4410),
    mailDir: join(stateDir, 'mail'),
    isDemo: (process.env.OVERFOLD_DEMO || '1') === '1',
  };
}

/** The signing key is made once and kept: a restart must not end every session. */
export function readSecret(stateDir) {
  const file = join(stateDir, 'secrets.json');
  if (!existsSync(file)) {
    mkdirSync(stateDir, { recursive: true });
    writeFileSync(file, JSON.stringify({ jwtSecret: randomBytes(48).toString('base64url') }), { mode: 0o600 });
  }
  return JSON.parse(readFileSync(file, 'utf8')).jwtSecret;
}

/** Environment of server and worker; what the caller has set already wins, except where the services really are. */
export function appEnvironment(settings) {
  return {
    NODE_ENV: 'production',
    STORAGE_DIR: join(settings.stateDir, 'captures'),
    ...process.env,
    PORT: String(settings.port),
    DATABASE_URL: `postgres://overfold@127.0.0.1:${settings.postgresPort}/overfold`,
    REDIS_URL: `redis://127.0.0.1:${settings.redisPort}`,
    SMTP_URL: `smtp://127.0.0.1:${settings.smtpPort}`,
    JWT_SECRET: process.env.JWT_SECRET || readSecret(settings.stateDir),
    OVERFOLD_DEMO: settings.isDemo ? '1' : '0',
    DEMO_MAIL_DIR: settings.mailDir,
    AWS_SDK_JS_NODE_VERSION_SUPPORT_WARNING_DISABLED: 'true',
  };
}
