import { UnrecoverableError, Worker } from 'bullmq';
import { Redis } from 'ioredis';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry, type Batch, Capture } from '../../../server/entities/index.js';
import { reconcileCaptures } from '../../../server/queues/reconcileCaptures.js';
import { relayCaptures } from '../../../server/queues/relayCaptures.js';
import { ScreeningQueue } from '../../../server/queues/ScreeningQueue.js';
import { screenCaptureJobId, type ScreenCapturePayload } from '../../../shared/jobs/screenCapture.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildCapture } from '../../support/factories/buildCapture.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { createTestDependencies, type TestDependencies } from '../../support/testDependencies.js';

let deps: TestDependencies;
let batch: Batch;
let redis: Redis;

beforeEach(async () => {
  deps = await createTestDependencies();
  batch = await buildBatch(deps.dataSource, (await buildProject(deps.dataSource)).id);
  redis = new Redis(deps.config.REDIS_URL);
});
afterEach(async () => {
  redis.disconnect();
  await deps.release();
});

const relay = (): Promise<number> => relayCaptures(deps.dataSource, deps.queue);
const reconcile = (): Promise<number> => reconcileCaptures(deps.dataSource, deps.queue);
const reload = (id: string): Promise<Capture> => deps.dataSource.manager.findOneByOrFail(Capture, { id });
const long = new Date(Date.now() - 60_000);
/** A capture that has been in a state for longer than any hand-over takes. */
const old = (overrides: Partial<Capture> = {}): Promise<Capture> =>
  buildCapture(deps.dataSource, batch, { state: 'queued', attempt: 1, queuedAt: long, ...overrides });
const received = (): Promise<Capture> => buildCapture(deps.dataSource, batch);
/** Everything this test's queue holds is gone, as after a Redis that came back empty. */
async function loseQueue(): Promise<void> {
  const keys = await redis.keys(`bull:${deps.queueName}:*`);
  if (keys.length > 0) await redis.del(...keys);
}

describe('relayCaptures', () => {
  it('queues received captures under a raised attempt with a job of ids only', async () => {
    const { id } = await received();
    expect(await relay()).toBe(1);
    expect(await reload(id)).toMatchObject({ state: 'queued', attempt: 1 });
    const jobId = screenCaptureJobId({ captureId: id, attempt: 1 });
    const data = await redis.hget(`bull:${deps.queueName}:${jobId}`, 'data');
    expect(JSON.parse(data ?? '')).toEqual({ captureId: id, attempt: 1 });
  });

  it('queues each capture once with four relays at once', async () => {
    for (let n = 0; n < 40; n += 1) await received();
    const counts = await Promise.all([relay(), relay(), relay(), relay()]);
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(40);
    expect(await deps.queue.counts()).toMatchObject({ waiting: 40 });
    expect(await deps.dataSource.manager.countBy(Capture, { state: 'queued', attempt: 1 })).toBe(40);
  });

  it('fails at once and leaves captures received when Redis is away', async () => {
    const { id } = await received();
    const away = new ScreeningQueue('redis://127.0.0.1:1', deps.logger);
    const startedMs = performance.now();
    await expect(relayCaptures(deps.dataSource, away)).rejects.toThrow();
    expect(performance.now() - startedMs).toBeLessThan(1_500);
    await away.close();
    expect(await reload(id)).toMatchObject({ state: 'received', attempt: 0 });
    expect(await relay()).toBe(1);
  });
});

describe('reconcileCaptures', () => {
  it('leaves a capture with a live job alone', async () => {
    const { id } = await received();
    await relay();
    await deps.dataSource.manager.update(Capture, { id }, { queuedAt: long });
    expect(await reconcile()).toBe(0);
    expect(await reload(id)).toMatchObject({ state: 'queued', attempt: 1 });
  });

  it('leaves a capture alone that was handed over a moment ago', async () => {
    await old({ queuedAt: new Date() });
    expect(await reconcile()).toBe(0);
  });

  it('rebuilds a lost queue: each open capture gets one job, finished ones none', async () => {
    for (let n = 0; n < 5; n += 1) await received();
    const done = await buildCapture(deps.dataSource, batch, { state: 'screened', attempt: 1 });
    await relay();
    await deps.dataSource.query('UPDATE captures SET queued_at = $1', [long]);
    await loseQueue();
    expect(await reconcile()).toBe(5);
    expect(await relay()).toBe(5);
    expect(await deps.queue.counts()).toMatchObject({ waiting: 5 });
    expect(await deps.dataSource.manager.countBy(Capture, { state: 'queued', attempt: 2, faultCount: 0 })).toBe(5);
    expect(await reload(done.id)).toMatchObject({ state: 'screened', attempt: 1 });
  });

  it('counts a worker lost on a capture, and gives the capture up after four', async () => {
    const { id } = await old({ state: 'screening', startedAt: long, faultCount: 3 });
    expect(await reconcile()).toBe(1);
    expect(await reload(id)).toMatchObject({ state: 'received', faultCount: 4, attempt: 1 });
    await deps.dataSource.manager.update(Capture, { id }, { state: 'screening' });
    expect(await reconcile()).toBe(1);
    expect(await reload(id)).toMatchObject({ state: 'failed', failureCode: 'WORKER_DIED' });
    expect(await deps.dataSource.manager.countBy(AuditEntry, { entityId: id, action: 'failed' })).toBe(1);
  });

  it('puts a capture back whose job has failed', async () => {
    const { id } = await received();
    await relay();
    const payload: ScreenCapturePayload = { captureId: id, attempt: 1 };
    const worker = new Worker(deps.queueName, null, {
      connection: { url: deps.config.REDIS_URL, maxRetriesPerRequest: null },
      autorun: false,
    });
    const job = await worker.getNextJob('token');
    expect(job?.data).toEqual(payload);
    await job?.moveToFailed(new UnrecoverableError('disk full'), 'token');
    await worker.close();
    await deps.dataSource.manager.update(Capture, { id }, { queuedAt: long });
    expect(await reconcile()).toBe(1);
    expect(await reload(id)).toMatchObject({ state: 'received' });
  });

  it('puts each capture right once with four reconcilers at once', async () => {
    for (let n = 0; n < 10; n += 1) await old({ state: 'screening', startedAt: long });
    const counts = await Promise.all([reconcile(), reconcile(), reconcile(), reconcile()]);
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(10);
    expect(await deps.dataSource.manager.countBy(Capture, { state: 'received', faultCount: 1 })).toBe(10);
  });

  it('changes nothing while Redis is away', async () => {
    const { id } = await old();
    const away = new ScreeningQueue('redis://127.0.0.1:1', deps.logger);
    await expect(reconcileCaptures(deps.dataSource, away)).rejects.toThrow();
    await away.close();
    expect(await reload(id)).toMatchObject({ state: 'queued', attempt: 1 });
  });
});
