import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry, Batch, MailMessage, type Project } from '../../../server/entities/index.js';
import { batchPageSchema, batchSchema } from '../../../shared/schemas/batch.js';
import { capturePageSchema, type CaptureRow } from '../../../shared/schemas/capture.js';
import type { Verdict } from '../../../shared/schemas/screening.js';
import { startPageSchema } from '../../../shared/schemas/system.js';
import { errorOf } from '../../support/errorOf.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildCapture } from '../../support/factories/buildCapture.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { buildScreenedCapture } from '../../support/factories/buildScreenedCapture.js';
import { buildFinding } from '../../support/factories/buildScreening.js';
import { buildUser } from '../../support/factories/buildUser.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';

let app: TestApp;
let project: Project;
let client: TestClient;

beforeEach(async () => {
  app = await createTestApp();
  project = await buildProject(app.deps.dataSource, { name: 'Ferrow Quay' });
  client = await app.as(await buildMember(app.deps.dataSource, project.id, ['analyst', 'reviewer']));
});
afterEach(() => app.close());

const screenedAs = (batch: Batch, verdict: Verdict, screen = {}, capture = {}) =>
  buildScreenedCapture(app.deps.dataSource, batch, { screen: { verdict, ...screen }, capture });
/** Walks all pages of a list. */
const walk = async (address: string): Promise<CaptureRow[]> => {
  const rows: CaptureRow[] = [];
  for (let cursor: string | null = ''; cursor !== null;) {
    const response = await client.get(`${address}${cursor === '' ? '' : `&cursor=${cursor}`}`);
    expect(response.status).toBe(200);
    const page = capturePageSchema.parse(response.body);
    rows.push(...page.items);
    cursor = page.nextCursor;
  }
  return rows;
};

describe('POST /projects/:projectId/batches', () => {
  const body = { name: ' Pump hall 2 ', acquisition: { logger: 'L7', highestFrequencyHz: 400 } };

  it('opens a batch that takes files', async () => {
    const response = await client.post(`/projects/${project.id}/batches`).send(body);
    expect(response.status).toBe(201);
    expect(batchSchema.parse(response.body)).toMatchObject({
      name: 'Pump hall 2',
      projectName: 'Ferrow Quay',
      state: 'receiving',
      acquisition: body.acquisition,
      counts: { clear: 0, limited: 0, folded: 0, unproven: 0, failed: 0, pending: 0 },
      progress: 0,
    });
  });

  it('answers 403 to a reviewer, 404 to a stranger, 409 in an archived project', async () => {
    const reviewer = await app.as(await buildMember(app.deps.dataSource, project.id, ['reviewer']));
    const stranger = await app.as(await buildUser(app.deps.dataSource));
    const address = `/projects/${project.id}/batches`;
    expect(errorOf(await reviewer.post(address).send(body))).toEqual({ status: 403, code: 'FORBIDDEN' });
    expect(errorOf(await stranger.post(address).send(body))).toEqual({ status: 404, code: 'NOT_FOUND' });
    const old = await buildProject(app.deps.dataSource, { isArchived: true });
    const member = await app.as(await buildMember(app.deps.dataSource, old.id, ['analyst']));
    const response = await member.post(`/projects/${old.id}/batches`).send(body);
    expect(errorOf(response)).toEqual({ status: 409, code: 'PROJECT_ARCHIVED' });
  });
});

describe('GET /batches/:batchId', () => {
  it('counts every capture exactly once', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    for (const verdict of ['clear', 'clear', 'limited', 'folded', 'unproven'] as const)
      await screenedAs(batch, verdict);
    await buildCapture(app.deps.dataSource, batch, { state: 'failed' });
    await buildCapture(app.deps.dataSource, batch, { state: 'queued' });
    await buildCapture(app.deps.dataSource, batch, { state: 'screening', progress: 0.5 });
    const dto = batchSchema.parse((await client.get(`/batches/${batch.id}`)).body);
    expect(dto.counts).toEqual({ clear: 2, limited: 1, folded: 1, unproven: 1, failed: 1, pending: 2 });
    expect(dto.progress).toBeCloseTo(6.5 / 8, 9);
    expect(await walk(`/batches/${batch.id}/captures?limit=200`)).toHaveLength(8);
  });
});

describe('GET /batches', () => {
  it('lists the batches of the own projects only, newest first, page by page', async () => {
    const foreign = await buildProject(app.deps.dataSource);
    await buildBatch(app.deps.dataSource, foreign.id, { name: 'hidden' });
    for (const name of ['first', 'second', 'third']) await buildBatch(app.deps.dataSource, project.id, { name });
    const one = batchPageSchema.parse((await client.get('/batches?limit=2')).body);
    const two = batchPageSchema.parse((await client.get(`/batches?limit=2&cursor=${one.nextCursor}`)).body);
    expect([...one.items, ...two.items].map(({ name }) => name)).toEqual(['third', 'second', 'first']);
    expect(two.nextCursor).toBeNull();
  });

  it('lists every batch for an administrator', async () => {
    await buildBatch(app.deps.dataSource, project.id);
    await buildBatch(app.deps.dataSource, (await buildProject(app.deps.dataSource)).id);
    const admin = await app.as(await buildUser(app.deps.dataSource, { isAdmin: true }));
    expect(batchPageSchema.parse((await admin.get('/batches')).body).items).toHaveLength(2);
  });

  it('answers 400 for a cursor that is not of this list', async () => {
    const cursors = ['x', Buffer.from('["newest","now(); select 1","a"]').toString('base64url')];
    for (const cursor of cursors) {
      expect(errorOf(await client.get(`/batches?cursor=${cursor}`))).toEqual({ status: 400, code: 'INVALID_INPUT' });
    }
    const fromReview = Buffer.from('["foldScore","0.5","00000000-0000-4000-8000-000000000000"]').toString('base64url');
    expect((await client.get(`/review?cursor=${fromReview}`)).status).toBe(200);
    expect((await client.get(`/review?sort=newest&cursor=${fromReview}`)).status).toBe(400);
  });
});

describe('PATCH /batches/:batchId', () => {
  it('renames a batch and refuses one that is released', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    const response = await client.patch(`/batches/${batch.id}`).send({ name: 'Pump hall 3' });
    expect(batchSchema.parse(response.body).name).toBe('Pump hall 3');
    await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'released' });
    expect(errorOf(await client.patch(`/batches/${batch.id}`).send({ name: 'Pump hall 4' }))).toEqual({
      status: 409,
      code: 'BATCH_CLOSED',
    });
  });

  it('answers 400 for fields that are not for a client to set', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    for (const body of [{ state: 'released' }, { projectId: project.id }, { completedAt: null }]) {
      expect(errorOf(await client.patch(`/batches/${batch.id}`).send(body))).toEqual({
        status: 400,
        code: 'INVALID_INPUT',
      });
    }
  });
});

describe('POST /batches/:batchId/complete', () => {
  it('answers 409 for an empty batch', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    expect(errorOf(await client.post(`/batches/${batch.id}/complete`))).toEqual({ status: 409, code: 'BATCH_EMPTY' });
  });

  it('leaves a batch with captures under way in screening; once more changes nothing', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    await buildCapture(app.deps.dataSource, batch, { state: 'queued' });
    const first = batchSchema.parse((await client.post(`/batches/${batch.id}/complete`)).body);
    expect(first).toMatchObject({ state: 'screening', screenedAt: null });
    const second = batchSchema.parse((await client.post(`/batches/${batch.id}/complete`)).body);
    expect(second).toEqual(first);
    expect(await app.deps.dataSource.manager.countBy(AuditEntry, { entityId: batch.id, action: 'completed' })).toBe(1);
  });

  it('takes a batch whose captures have all ended straight to review and writes its mails', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    await screenedAs(batch, 'clear');
    await buildCapture(app.deps.dataSource, batch, { state: 'failed' });
    await buildMember(app.deps.dataSource, project.id, ['qaManager']);
    const dto = batchSchema.parse((await client.post(`/batches/${batch.id}/complete`)).body);
    expect(dto.state).toBe('review');
    expect(dto.screenedAt).not.toBeNull();
    expect(await app.deps.dataSource.manager.countBy(MailMessage, { kind: 'batchScreened' })).toBe(1);
  });
});

describe('GET /batches/:batchId/captures', () => {
  it('gives each capture once over all pages, though all were made at the same moment', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    const createdAt = new Date('2026-11-30T10:00:00Z');
    const made = [];
    for (let n = 0; n < 7; n += 1) made.push(await buildCapture(app.deps.dataSource, batch, { createdAt }));
    const rows = await walk(`/batches/${batch.id}/captures?limit=3`);
    expect(rows.map(({ id }) => id).sort()).toEqual(made.map(({ id }) => id).sort());
  });

  it('filters by verdict and state', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    const folded = await screenedAs(batch, 'folded');
    await screenedAs(batch, 'clear');
    const failed = await buildCapture(app.deps.dataSource, batch, { state: 'failed' });
    expect((await walk(`/batches/${batch.id}/captures?verdict=folded`)).map(({ id }) => id)).toEqual([folded.id]);
    expect((await walk(`/batches/${batch.id}/captures?state=failed`)).map(({ id }) => id)).toEqual([failed.id]);
  });
});

describe('GET /review', () => {
  let batch: Batch;
  beforeEach(async () => {
    batch = await buildBatch(app.deps.dataSource, project.id, { name: 'Gearbox', acquisition: { logger: 'L7' } });
  });
  const names = async (query: string): Promise<string[]> =>
    (await walk(`/review?limit=2&${query}`)).map(({ fileName }) => fileName);

  it('shows what waits: screened and undecided, of the own projects, worst fold score first', async () => {
    await screenedAs(batch, 'clear', { foldScore: 0.1 }, { fileName: 'b.wav' });
    await screenedAs(batch, 'folded', { foldScore: 0.9 }, { fileName: 'a.wav' });
    await screenedAs(batch, 'unproven', { foldScore: null }, { fileName: 'c.wav' });
    await buildCapture(app.deps.dataSource, batch, { fileName: 'waiting.wav' });
    const decided = await screenedAs(batch, 'folded', {}, { fileName: 'decided.wav' });
    await client.put(`/captures/${decided.id}/decision`).send({ decision: 'exclude', reason: 'Sensor came off.' });
    const foreign = await buildProject(app.deps.dataSource);
    await screenedAs(await buildBatch(app.deps.dataSource, foreign.id), 'folded', {}, { fileName: 'foreign.wav' });
    expect(await names('')).toEqual(['a.wav', 'b.wav', 'c.wav']);
    expect(await names('decided=yes')).toEqual(['decided.wav']);
    expect(await names('decided=all&sort=fileName')).toEqual(['a.wav', 'b.wav', 'c.wav', 'decided.wav']);
    expect(await names(`projectId=${foreign.id}`)).toEqual([]);
  });

  it.each([
    ['sort=clearTo', ['none.wav', 'low.wav', 'high.wav']],
    ['sort=fileName', ['high.wav', 'low.wav', 'none.wav']],
    ['sort=newest', ['none.wav', 'high.wav', 'low.wav']],
    ['sort=oldest', ['low.wav', 'high.wav', 'none.wav']],
    ['clearToBelowHz=1000&sort=oldest', ['low.wav']],
    ['verdict=limited', ['low.wav']],
    ['findingKind=clipping&sort=oldest', ['low.wav', 'high.wav']],
    ['findingKind=clipping&verdict=clear', ['high.wav']],
    ['search=LOW', ['low.wav']],
    ['search=gearb&verdict=clear', ['high.wav']],
    ['search=l7&sort=oldest', ['low.wav', 'high.wav', 'none.wav']],
    ['search=%25', []],
    ['search=_ow', []],
  ])('answers %s with %j', async (query, expected) => {
    const clipping = [buildFinding({ kind: 'clipping', severity: 'limit' })];
    await screenedAs(batch, 'limited', { clearToHz: 200, findings: clipping }, { fileName: 'low.wav' });
    await screenedAs(batch, 'clear', { clearToHz: 2000, findings: clipping }, { fileName: 'high.wav' });
    await screenedAs(batch, 'unproven', { clearToHz: null, findings: [] }, { fileName: 'none.wav' });
    expect(await names(query)).toEqual(expected);
  });

  it.each(['sort=(case when 1=1 then 1 end)', 'sort=foldScore;select pg_sleep(3)', 'limit=0', 'limit=201', 'dir=asc'])(
    'answers 400 for %s',
    async (query) => {
      expect(errorOf(await client.get(`/review?${query}`))).toEqual({ status: 400, code: 'INVALID_INPUT' });
    },
  );
});

describe('GET /start', () => {
  it('adds up with the lists it points to', async () => {
    const batch = await buildBatch(app.deps.dataSource, project.id);
    await screenedAs(batch, 'clear');
    const retake = await screenedAs(batch, 'folded');
    await client.put(`/captures/${retake.id}/decision`).send({ decision: 'retake', reason: 'Needs the filter.' });
    await buildCapture(app.deps.dataSource, batch, { state: 'failed' });
    await buildCapture(app.deps.dataSource, batch, { state: 'received' });
    await buildCapture(app.deps.dataSource, batch, { state: 'queued' });
    await buildCapture(app.deps.dataSource, batch, { state: 'screening' });
    await screenedAs(await buildBatch(app.deps.dataSource, (await buildProject(app.deps.dataSource)).id), 'folded');
    const start = startPageSchema.parse((await client.get('/start')).body);
    expect(start).toEqual({
      awaitingReview: 1,
      retakesAsked: 1,
      failedCaptures: 1,
      queue: { waiting: 2, screening: 1 },
    });
    expect(await walk('/review?limit=1')).toHaveLength(start.awaitingReview);
  });
});
