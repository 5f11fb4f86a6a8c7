import { z } from 'zod';
import { uploadLimits } from '../../shared/constants/limits.js';

const flag = z.enum(['0', '1']).transform((value) => value === '1');
const port = z.coerce.number().int().min(1).max(65_535);

/** Every key the server and the worker read from the environment, with its default; described in the README. */
const environmentSchema = z.object({
  NODE_ENV: z.enum(['development', 'test', 'production']).default('production'),
  PORT: port.default(4400),
  HOST: z.string().default('127.0.0.1'),
  /** Address under which people reach the app; links in e-mails begin with it. */
  PUBLIC_URL: z.url().optional(),
  DATABASE_URL: z.string().startsWith('postgres'),
  REDIS_URL: z.string().startsWith('redis'),
  SMTP_URL: z.string().startsWith('smtp'),
  MAIL_FROM: z.string().default('Overfold <overfold@localhost>'),
  /** At least 32 characters; signs the access tokens. */
  JWT_SECRET: z.string().min(32),
  ACCESS_TOKEN_MINUTES: z.coerce.number().int().min(1).max(120).default(30),
  SESSION_IDLE_HOURS: z.coerce.number().min(0.1).max(720).default(12),
  SESSION_ABSOLUTE_DAYS: z.coerce.number().min(0.1).max(90).default(7),
  BCRYPT_COST: z.coerce.number().int().min(4).max(15).default(12),
  STORAGE_DRIVER: z.enum(['local', 's3']).default('local'),
  STORAGE_DIR: z.string().default('.overfold/captures'),
  S3_ENDPOINT: z.url().optional(),
  S3_REGION: z.string().default('eu-central-1'),
  S3_BUCKET: z.string().default('overfold'),
  S3_ACCESS_KEY_ID: z.string().optional(),
  S3_SECRET_ACCESS_KEY: z.string().optional(),
  /** Number of proxy hops whose X-Forwarded-* headers are believed. */
  TRUST_PROXY_HOPS: z.coerce.number().int().min(0).max(5).default(0),
  MAX_FILE_BYTES: z.coerce.number().int().min(1024).default(uploadLimits.maxFileBytes),
  MAX_FILES_PER_BATCH: z.coerce.number().int().min(1).default(uploadLimits.maxFilesPerBatch),
  SIGN_IN_ATTEMPTS_PER_15_MIN: z.coerce.number().int().min(3).default(10),
  WORKER_CONCURRENCY: z.coerce.number().int().min(1).max(64).default(2),
  /** A capture that takes longer is stopped and, after the last try, failed. */
  SCREENING_TIMEOUT_MS: z.coerce
    .number()
    .int()
    .min(1000)
    .default(30 * 60_000),
  JOB_LOCK_MS: z.coerce.number().int().min(1000).default(15_000),
  RECONCILE_INTERVAL_MS: z.coerce.number().int().min(200).default(10_000),
  MAIL_INTERVAL_MS: z.coerce.number().int().min(100).default(2_000),
  LOG_LEVEL: z.enum(['trace', 'debug', 'info', 'warn', 'error', 'silent']).default('info'),
  /** 1: demo installation: sign-ins on the sign-in page, e-mails of the local fake as a page. */
  OVERFOLD_DEMO: flag.default(false),
  /** Folder in which the local SMTP fake keeps its messages (demo only). */
  DEMO_MAIL_DIR: z.string().default('.overfold/mail'),
});

export type Config = Readonly<z.infer<typeof environmentSchema>> & { readonly publicUrl: string };

/**
 * Parses the environment once; nothing else reads process.env.
 * @throws Error naming every key that is missing or wrong.
 */
export function parseConfig(environment: NodeJS.ProcessEnv): Config {
  const present = Object.fromEntries(Object.entries(environment).filter(([, value]) => value !== ''));
  const parsed = environmentSchema.safeParse(present);
  if (!parsed.success) {
    const problems = parsed.error.issues.map((issue) => `  ${issue.path.join('.')}: ${issue.message}`).join('\n');
    throw new Error(`The configuration is not usable. Set these environment variables:\n${problems}`);
  }
  const publicUrl = (parsed.data.PUBLIC_URL ?? `http://127.0.0.1:${parsed.data.PORT}`).replace(/\/$/, '');
  return Object.freeze({ ...parsed.data, publicUrl });
}
