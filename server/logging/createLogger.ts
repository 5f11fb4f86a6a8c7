import { pino, type Logger } from 'pino';
import type { Config } from '../config/config.js';

/** One JSON line an event; secrets never reach it. */
export function createLogger(config: Pick<Config, 'LOG_LEVEL'>, name: 'server' | 'worker'): Logger {
  return pino({
    name,
    level: config.LOG_LEVEL,
    redact: {
      paths: ['req.headers.authorization', 'req.headers.cookie', 'res.headers["set-cookie"]', '*.password', '*.token'],
      censor: '[removed]',
    },
    timestamp: pino.stdTimeFunctions.isoTime,
  });
}
export type { Logger };
