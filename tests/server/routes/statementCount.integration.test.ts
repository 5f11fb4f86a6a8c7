import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { Logger } from 'typeorm';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import type { Batch, Capture } from '../../../server/entities/index.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { buildScreenedCapture } from '../../support/factories/buildScreenedCapture.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';

const mostStatements = 5;

let app: TestApp;
let client: TestClient;
let batch: Batch;
let capture: Capture;

beforeEach(async () => {
  app = await createTestApp();
  const project = await buildProject(app.deps.dataSource);
  batch = await buildBatch(app.deps.dataSource, project.id);
  for (let n = 0; n < 5; n += 1) capture = await buildScreenedCapture(app.deps.dataSource, batch);
  client = await app.as(await buildMember(app.deps.dataSource, project.id, ['analyst', 'reviewer']));
  const file = path.join(app.deps.config.STORAGE_DIR, capture.storageKey);
  await mkdir(path.dirname(file), { recursive: true });
  await writeFile(file, Buffer.alloc(capture.sizeBytes));
});
afterEach(() => app.close());

/** Number of SQL statements that are sent while `work` runs. */
async function countStatements(work: () => Promise<unknown>): Promise<number> {
  let count = 0;
  const nothing = (): undefined => undefined;
  const before = app.deps.dataSource.logger;
  const logger: Logger = {
    logQuery: () => (count += 1),
    logQueryError: nothing,
    logQuerySlow: nothing,
    logSchemaBuild: nothing,
    logMigration: nothing,
    log: nothing,
  };
  app.deps.dataSource.logger = logger;
  await work();
  app.deps.dataSource.logger = before;
  return count;
}

describe('reading routes', () => {
  it.each([
    ['/start', () => '/start'],
    ['/batches', () => '/batches'],
    ['/batches/:batchId', () => `/batches/${batch.id}`],
    ['/batches/:batchId/captures', () => `/batches/${batch.id}/captures`],
    ['/review', () => '/review?findingKind=foldedTone&search=pump'],
    ['/captures/:captureId', () => `/captures/${capture.id}`],
    ['/captures/:captureId/spectrum', () => `/captures/${capture.id}/spectrum`],
    ['/captures/:captureId/file', () => `/captures/${capture.id}/file`],
  ])('%s takes a few SQL statements, however many rows there are', async (_route, address) => {
    let status = 0;
    const count = await countStatements(async () => {
      status = (await client.get(address())).status;
    });
    expect(status).toBe(200);
    expect(count).toBeGreaterThan(0);
    expect(count).toBeLessThanOrEqual(mostStatements);
  });
});
