import { createHash } from 'node:crypto';
import { closeSync, fstatSync, openSync, readSync } from 'node:fs';
import { CaptureError } from '../../shared/formats/CaptureError.js';

const blockBytes = 1024 * 1024;

/**
 * Compares a stored file with what was received: a result must never rest on bytes that changed since.
 * @throws CaptureError STORED_FILE_DAMAGED
 */
export function verifyStoredFile(filePath: string, expected: { sha256: string; sizeBytes: number }): void {
  const descriptor = openSync(filePath, 'r');
  try {
    const hash = createHash('sha256');
    const block = Buffer.allocUnsafe(blockBytes);
    for (let read = readSync(descriptor, block); read > 0; read = readSync(descriptor, block)) {
      hash.update(block.subarray(0, read));
    }
    if (fstatSync(descriptor).size !== expected.sizeBytes || hash.digest('hex') !== expected.sha256) {
      throw new CaptureError(
        'STORED_FILE_DAMAGED',
        'The stored file differs from what was uploaded (its checksum no longer matches). Upload the capture again.',
      );
    }
  } finally {
    closeSync(descriptor);
  }
}
