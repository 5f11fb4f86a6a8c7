import { createHash, randomUUID } from 'node:crypto';
import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { ReceivedFile } from '../middleware/receiveUpload.js';
import type { DemoCapture } from './DemoBatch.js';
import { SeededRandom } from './signals/SeededRandom.js';

const firstBytesLimit = 64 * 1024;

/** Makes the file of a demo capture and puts it where an upload would have put it. */
export async function stageCapture(
  { fileName, make }: Pick<DemoCapture, 'fileName' | 'make'>,
  seed: number,
  folder: string,
): Promise<ReceivedFile> {
  const bytes = make(new SeededRandom(seed));
  const temporaryPath = path.join(folder, randomUUID());
  await mkdir(folder, { recursive: true });
  await writeFile(temporaryPath, bytes);
  return {
    rawName: fileName,
    temporaryPath,
    sizeBytes: bytes.length,
    sha256: createHash('sha256').update(bytes).digest('hex'),
    firstBytes: bytes.subarray(0, firstBytesLimit),
  };
}
