import type { Config } from '../config/config.js';
import type { CaptureStorage } from './CaptureStorage.js';
import { LocalCaptureStorage } from './LocalCaptureStorage.js';
import { S3CaptureStorage } from './S3CaptureStorage.js';

/** The store that the configuration names. */
export function createStorage(config: Config): CaptureStorage {
  if (config.STORAGE_DRIVER === 'local') return new LocalCaptureStorage(config.STORAGE_DIR);
  return new S3CaptureStorage({
    endpoint: config.S3_ENDPOINT,
    region: config.S3_REGION,
    bucket: config.S3_BUCKET,
    accessKeyId: config.S3_ACCESS_KEY_ID,
    secretAccessKey: config.S3_SECRET_ACCESS_KEY,
  });
}
