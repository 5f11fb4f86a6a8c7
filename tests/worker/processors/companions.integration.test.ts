import { rm, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { twoRates } from '../../../server/demo/batches/twoRates.js';
import { demoProjects } from '../../../server/demo/demoProjects.js';
import { DemoSeeder } from '../../../server/demo/DemoSeeder.js';
import { AuditEntry, Batch, Capture, ChannelResult, type Project } from '../../../server/entities/index.js';
import { finishBatch } from '../../../server/queues/finishBatch.js';
import { screenDuePairs } from '../../../server/queues/screenPairsElsewhere.js';
import type { AcquisitionSheet } from '../../../shared/schemas/acquisitionSheet.js';
import { captureSchema, uploadResponseSchema, type CaptureDto } from '../../../shared/schemas/capture.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { multipartBody } from '../../support/multipartBody.js';
import { pairBytes } from '../../support/pairBytes.js';
import { runTask, screenJob, screenQueued } from '../../support/screenQueued.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';
import { wavBytes } from '../../support/wavBytes.js';

let app: TestApp;
let project: Project;
let batch: Batch;
let client: TestClient;

beforeEach(async () => {
  app = await createTestApp();
  project = await buildProject(app.deps.dataSource);
  batch = await buildBatch(app.deps.dataSource, project.id);
  client = await app.as(await buildMember(app.deps.dataSource, project.id, ['analyst']));
});
afterEach(() => app.close());

interface Upload {
  name: string;
  bytes: Buffer;
  sheet?: AcquisitionSheet;
}
const slow = (sheet: AcquisitionSheet = {}): Upload => ({ name: 'slow.wav', bytes: pairBytes.slow, sheet });
const fast = (sheet: AcquisitionSheet = {}): Upload => ({ name: 'fast.wav', bytes: pairBytes.fast, sheet });
/** A recording when it arrives; that it has no channel is found when it is screened. */
const broken = (): Upload => {
  const bytes = wavBytes();
  bytes.writeUInt16LE(0, 22);
  return { name: 'fast.wav', bytes };
};

async function upload(
  files: Upload[],
  { to = batch, by = client, fields = {} }: { to?: Batch; by?: TestClient; fields?: Record<string, string> } = {},
): Promise<string[]> {
  const sheets = Object.fromEntries(files.map(({ name, sheet }) => [name, sheet ?? {}]));
  const { contentType, body } = multipartBody(files, { acquisition: JSON.stringify(sheets), ...fields });
  const response = await by.post(`/batches/${to.id}/captures`).set('Content-Type', contentType).send(body);
  const { captures, refused } = uploadResponseSchema.parse(response.body);
  expect(refused).toEqual([]);
  return captures.map(({ id }) => id);
}

const uploadOne = async (...given: [Upload, Parameters<typeof upload>[1]?]): Promise<string> =>
  (await upload([given[0]], given[1]))[0] ?? '';
const read = async (id: string): Promise<CaptureDto> => captureSchema.parse((await client.get(`/captures/${id}`)).body);
const row = (id: string): Promise<Capture> => app.deps.dataSource.manager.findOneByOrFail(Capture, { id });
const batchState = async (id = batch.id) => (await app.deps.dataSource.manager.findOneByOrFail(Batch, { id })).state;
const complete = (id = batch.id) => client.post(`/batches/${id}/complete`).expect(200);
const screeningsOf = (entityId: string): Promise<number> =>
  app.deps.dataSource.manager.countBy(AuditEntry, { entityId, action: 'screened' });
/** Names of the companions in what was measured, of every channel. */
const measuredWith = async (captureId: string): Promise<(string | undefined)[]> =>
  (await app.deps.dataSource.manager.findBy(ChannelResult, { captureId })).map(
    ({ measurement }) => measurement.companion?.name,
  );
const showsMove = (shown: unknown): boolean => JSON.stringify(shown).includes('movedBetweenRates');

describe('a pair in one batch', () => {
  it.each([
    ['names', { companion: 'fast.wav' }, { companion: 'slow.wav' }],
    ['a pair label', { pair: 'gearbox' }, { pair: 'gearbox' }],
  ])('by %s is compared both ways in one screening each', async (_by, slowSheet, fastSheet) => {
    const [slowId = '', fastId = ''] = await upload([slow(slowSheet), fast(fastSheet)]);
    expect((await screenQueued(app.deps)).sort()).toEqual(['fast.wav', 'slow.wav']);
    expect(await measuredWith(slowId)).toEqual(['fast.wav']);
    expect(await measuredWith(fastId)).toEqual(['slow.wav']);
    const capture = await read(slowId);
    expect(capture).toMatchObject({
      verdict: 'folded',
      companion: { id: fastId, fileName: 'fast.wav', sampleRateHz: 1280, isCompared: true },
      companionNote: null,
    });
    expect(showsMove(capture.channels)).toBe(true);
    expect((await read(fastId)).companion).toMatchObject({ id: slowId, sampleRateHz: 1000, isCompared: true });
    await complete();
    expect(await batchState()).toBe('review');
    expect(await screenQueued(app.deps)).toEqual([]);
  });

  it('by logger and position is screened once more when both rates are known, before the batch ends', async () => {
    const place = { logger: 'K2', position: 'output shaft' };
    const [slowId = '', fastId = ''] = await upload([slow(place), fast(place)]);
    await complete();
    await screenJob(app.deps, slowId);
    await screenJob(app.deps, fastId);
    expect(await batchState()).toBe('screening');
    expect((await screenQueued(app.deps)).sort()).toEqual(['fast.wav', 'slow.wav']);
    expect(await measuredWith(slowId)).toEqual(['fast.wav']);
    expect(await measuredWith(fastId)).toEqual(['slow.wav']);
    expect(await batchState()).toBe('review');
    expect([await screeningsOf(slowId), await screeningsOf(fastId)].every((count) => count === 2)).toBe(true);
  });

  it('says nothing of a companion where no sheet asks for one', async () => {
    const [slowId = ''] = await upload([slow(), fast()]);
    await screenQueued(app.deps);
    expect(await read(slowId)).toMatchObject({ companion: null, companionNote: null });
  });
});

describe('a companion that arrives later', () => {
  const names = [slow({ companion: 'fast.wav' }), fast({ companion: 'slow.wav' })] as const;

  it('has the first capture screened once more; the batch does not end before', async () => {
    const slowId = await uploadOne(names[0]);
    await screenQueued(app.deps);
    expect(await read(slowId)).toMatchObject({ state: 'screened', companion: null });
    expect((await read(slowId)).companionNote).toContain('fast.wav is not uploaded yet');

    const fastId = await uploadOne(names[1]);
    expect(await read(slowId)).toMatchObject({ state: 'queued', verdict: null, companion: null, companionNote: null });
    await complete();
    expect(await batchState()).toBe('screening');
    expect((await screenQueued(app.deps)).sort()).toEqual(['fast.wav', 'slow.wav']);
    expect(await read(slowId)).toMatchObject({ companion: { id: fastId, isCompared: true }, companionNote: null });
    expect(await batchState()).toBe('review');
    expect([await screeningsOf(slowId), await screeningsOf(fastId)]).toEqual([2, 1]);
    expect((await read(slowId)).history.map(({ text }) => text)).toContain(
      'is screened again, to be compared with fast.wav',
    );
  });

  it('during the screening of the first leaves a result made without it, which is then replaced', async () => {
    const slowId = await uploadOne(names[0]);
    const seen: (string | undefined)[] = [];
    await screenJob(app.deps, slowId, async (task) => {
      seen.push(task.companion?.fileName);
      await uploadOne(names[1]);
      return runTask(task);
    });
    expect(seen).toEqual([undefined]);
    expect(await measuredWith(slowId)).toEqual([undefined]);
    await complete();
    expect(await batchState()).toBe('screening');
    expect((await screenQueued(app.deps)).sort()).toEqual(['fast.wav', 'slow.wav']);
    expect(await measuredWith(slowId)).toEqual(['fast.wav']);
    expect(await batchState()).toBe('review');
    expect(await screeningsOf(slowId)).toBe(2);
  });

  it('is named later: both captures are screened once more, and asking again changes nothing', async () => {
    const [slowId = '', fastId = ''] = await upload([slow(), fast()]);
    await screenQueued(app.deps);
    await complete();
    expect(await batchState()).toBe('review');
    const label = { acquisition: { pair: 'gearbox' } };
    await client.put(`/captures/${slowId}/acquisition`).send(label).expect(200);
    expect(await read(slowId)).toMatchObject({ state: 'screened', companion: null });
    expect((await read(slowId)).companionNote).toContain('pair label gearbox');
    await client.put(`/captures/${fastId}/acquisition`).send(label).expect(200);
    expect(await batchState()).toBe('screening');
    expect((await screenQueued(app.deps)).sort()).toEqual(['fast.wav', 'slow.wav']);
    expect(await measuredWith(slowId)).toEqual(['fast.wav']);
    expect(await measuredWith(fastId)).toEqual(['slow.wav']);
    expect(await batchState()).toBe('review');
    await Promise.all([1, 2, 3].map(() => finishBatch(app.deps.dataSource, app.deps.config, batch.id)));
    expect(await screenQueued(app.deps)).toEqual([]);
  });

  it('another unit in its sheet has both screened again; notes in it neither', async () => {
    const [slowId = '', fastId = ''] = await upload([...names]);
    await screenQueued(app.deps);
    const put = (acquisition: AcquisitionSheet) =>
      client.put(`/captures/${fastId}/acquisition`).send({ acquisition }).expect(200);
    await put({ companion: 'slow.wav', notes: 'gain checked' });
    expect(await screenQueued(app.deps)).toEqual([]);
    await put({ companion: 'slow.wav', scale: 2 });
    expect((await screenQueued(app.deps)).sort()).toEqual(['fast.wav', 'slow.wav']);
    expect(await read(slowId)).toMatchObject({ companion: { id: fastId, isCompared: true } });
  });
});

describe('a companion in another batch', () => {
  it('of the same project is compared, and its arrival opens the other batch again', async () => {
    const slowId = await uploadOne(slow({ companion: 'fast.wav' }));
    await complete();
    await screenQueued(app.deps);
    expect(await batchState()).toBe('review');
    const other = await buildBatch(app.deps.dataSource, project.id);
    const fastId = await uploadOne(fast(), { to: other });
    expect(await batchState()).toBe('screening');
    await screenQueued(app.deps);
    expect(await read(slowId)).toMatchObject({ companion: { id: fastId, isCompared: true } });
    expect(await batchState()).toBe('review');
  });

  it('leaves a released batch as it is', async () => {
    const slowId = await uploadOne(slow({ companion: 'fast.wav' }));
    await screenQueued(app.deps);
    await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'released' });
    await uploadOne(fast(), { to: await buildBatch(app.deps.dataSource, project.id) });
    expect(await screenQueued(app.deps)).toEqual(['fast.wav']);
    expect(await read(slowId)).toMatchObject({ state: 'screened', companion: null });
  });

  it('is found by the background task when the process that should have noticed died', async () => {
    const slowId = await uploadOne(slow({ companion: 'fast.wav' }));
    await screenQueued(app.deps);
    const away = await buildBatch(app.deps.dataSource, project.id);
    const fastId = await uploadOne({ ...fast(), name: 'unnamed.wav' }, { to: away });
    await screenQueued(app.deps);
    // By the row alone, as if what follows an upload had not happened.
    await app.deps.dataSource.manager.update(Capture, { id: fastId }, { fileName: 'fast.wav' });
    expect(await screenDuePairs(app.deps.dataSource)).toBe(1);
    await screenQueued(app.deps);
    expect(await read(slowId)).toMatchObject({ companion: { id: fastId, isCompared: true } });
    expect(await screenDuePairs(app.deps.dataSource)).toBe(0);
  });

  it('of a foreign project is never used, whatever the sheets say', async () => {
    const foreign = await buildProject(app.deps.dataSource);
    const stranger = await app.as(await buildMember(app.deps.dataSource, foreign.id, ['analyst']));
    const away = await buildBatch(app.deps.dataSource, foreign.id);
    const sheet = { companion: 'fast.wav', pair: 'gearbox', logger: 'K2', position: 'output shaft' };
    await uploadOne(fast(sheet), { to: away, by: stranger });
    const slowId = await uploadOne(slow(sheet));
    await screenQueued(app.deps);
    await uploadOne({ ...fast(sheet), name: 'late/fast.wav' }, { to: away, by: stranger });
    await screenQueued(app.deps);
    await screenDuePairs(app.deps.dataSource);
    expect(await measuredWith(slowId)).toEqual([undefined]);
    expect(await row(slowId)).toMatchObject({ state: 'screened', companionId: null });
    expect(await screeningsOf(slowId)).toBe(1);
    // The twin: one of the same project is.
    await uploadOne(fast(), { to: await buildBatch(app.deps.dataSource, project.id) });
    await screenQueued(app.deps);
    expect(await measuredWith(slowId)).toEqual(['fast.wav']);
  });
});

describe('a companion that can’t be used', () => {
  const named = slow({ companion: 'fast.wav' });

  it('because its own screening failed is not opened; the capture is screened without it and says why', async () => {
    const brokenId = await uploadOne(broken());
    await screenQueued(app.deps);
    const slowId = await uploadOne(named);
    await complete();
    await screenQueued(app.deps);
    const capture = await read(slowId);
    expect(capture).toMatchObject({ state: 'screened', companion: { id: brokenId, isCompared: false } });
    expect(capture.companionNote).toContain('could not be screened itself');
    expect(await batchState()).toBe('review');

    await uploadOne(fast(), { fields: { replaces: brokenId } });
    expect((await screenQueued(app.deps)).sort()).toEqual(['fast.wav', 'slow.wav']);
    expect(await read(slowId)).toMatchObject({ companion: { id: brokenId, isCompared: true }, companionNote: null });
    expect(await batchState()).toBe('review');
  });

  it('because it can’t be read costs no second screening when it fails by itself later', async () => {
    const [slowId = '', brokenId = ''] = await upload([named, broken()]);
    await screenJob(app.deps, slowId);
    expect(await read(slowId)).toMatchObject({ state: 'screened', companion: { id: brokenId, isCompared: false } });
    expect((await read(slowId)).companionNote).toContain("can't be used");
    await complete();
    expect(await screenQueued(app.deps)).toEqual(['fast.wav']);
    expect(await row(brokenId)).toMatchObject({ state: 'failed' });
    expect(await batchState()).toBe('review');
  });

  const storedAt = (capture: Capture): string => path.join(app.deps.config.STORAGE_DIR, capture.storageKey);
  it.each([
    ['its bytes have changed', (file: string) => writeFile(file, pairBytes.slow), 'checksum no longer matches'],
    ['its file is gone', (file: string) => rm(file), 'stored file is gone'],
  ])('because %s leaves the capture screened alone', async (_why, spoil, reason) => {
    const [slowId = '', fastId = ''] = await upload([slow({ companion: 'fast.wav' }), fast()]);
    await spoil(storedAt(await row(fastId)));
    await screenJob(app.deps, slowId);
    expect(await measuredWith(slowId)).toEqual([undefined]);
    expect(await read(slowId)).toMatchObject({ state: 'screened', companion: { id: fastId, isCompared: false } });
    expect((await read(slowId)).companionNote).toContain(reason);
  });

  it('because the two together stop the screening leaves the capture screened alone', async () => {
    const [slowId = ''] = await upload([slow({ companion: 'fast.wav' }), fast()]);
    await screenJob(app.deps, slowId, (task) => {
      if (task.companion) throw new Error('The thread ran out of memory.');
      return runTask(task);
    });
    expect(await read(slowId)).toMatchObject({ state: 'screened', companion: { isCompared: false } });
    expect((await read(slowId)).companionNote).toContain('stopped without a result');
    expect(await screenQueued(app.deps)).toEqual(['fast.wav']);
  });

  it('because a worker has died with it is left out the next time', async () => {
    const [slowId = ''] = await upload([slow({ companion: 'fast.wav' }), fast()]);
    await app.deps.dataSource.manager.update(Capture, { id: slowId }, { faultCount: 1 });
    const seen: unknown[] = [];
    await screenJob(app.deps, slowId, (task) => {
      seen.push(task.companion);
      return runTask(task);
    });
    expect(seen).toEqual([null]);
    expect((await read(slowId)).companionNote).toContain('stopped without a result');
  });
});

describe('the demo’s pairs', () => {
  it('are compared, and show tones that moved between the rates', async () => {
    const [first] = demoProjects;
    if (!first) throw new Error('The demo has no project.');
    await new DemoSeeder(app.deps, [{ ...first, batches: [twoRates] }]).run();
    await screenQueued(app.deps);
    const results = await app.deps.dataSource.manager.find(ChannelResult, { relations: { capture: true } });
    expect(results).toHaveLength(twoRates.captures.length);
    expect(results.filter(({ measurement }) => measurement.companion === null)).toEqual([]);
    const moved = results.filter(({ screen }) => showsMove(screen));
    expect(moved.map(({ capture }) => capture.fileName).sort()).toEqual([
      'gearbox-a/at-1000-hz.wav',
      'gearbox-a/at-1280-hz.wav',
      'gearbox-c/at-1024-hz.wav',
      'gearbox-c/at-1600-hz.wav',
    ]);
    const states = await app.deps.dataSource.manager.findBy(Batch, { name: twoRates.name });
    expect(states.map(({ state }) => state)).toEqual(['review']);
  });
});
