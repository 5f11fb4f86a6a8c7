import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import {
  AuditEntry,
  Batch,
  Capture,
  ChannelResult,
  Decision,
  FindingRow,
  Spectrum,
  ThresholdsVersion,
  type Project,
  type User,
} from '../../../server/entities/index.js';
import { saveScreening } from '../../../server/repositories/saveScreening.js';
import { captureSchema, spectrumSchema, type CaptureDto } from '../../../shared/schemas/capture.js';
import { errorOf } from '../../support/errorOf.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildCapture } from '../../support/factories/buildCapture.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { buildScreenedCapture } from '../../support/factories/buildScreenedCapture.js';
import { buildScreening } from '../../support/factories/buildScreening.js';
import { buildUser } from '../../support/factories/buildUser.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';

let app: TestApp;
let project: Project;
let batch: Batch;
let analyst: User;
let reviewer: User;
let asAnalyst: TestClient;
let asReviewer: TestClient;

beforeEach(async () => {
  app = await createTestApp();
  project = await buildProject(app.deps.dataSource);
  analyst = await buildMember(app.deps.dataSource, project.id, ['analyst'], { name: 'Ines Corvane' });
  reviewer = await buildMember(app.deps.dataSource, project.id, ['reviewer'], { name: 'Ruth Aldane' });
  batch = await buildBatch(app.deps.dataSource, project.id, {
    acquisition: { logger: 'L7', highestFrequencyHz: 1000 },
  });
  asAnalyst = await app.as(analyst);
  asReviewer = await app.as(reviewer);
});
afterEach(() => app.close());

const accept = { decision: 'accept', reason: 'Supply harmonic is known and small.' };
const screened = (capture: Partial<Capture> = {}) =>
  buildScreenedCapture(app.deps.dataSource, batch, { capture: { uploadedById: analyst.id, ...capture } });
const reload = (id: string): Promise<Capture> => app.deps.dataSource.manager.findOneByOrFail(Capture, { id });
const read = async (id: string, client = asReviewer): Promise<CaptureDto> => {
  const response = await client.get(`/captures/${id}`);
  expect(response.status).toBe(200);
  return captureSchema.parse(response.body);
};

describe('GET /captures/:captureId', () => {
  it('puts together channels, sheet, decision and history', async () => {
    const { id } = await screened({ acquisition: { position: 'bearing 2', highestFrequencyHz: 800 } });
    await asReviewer.put(`/captures/${id}/decision`).send({ ...accept, version: 0 });
    const capture = await read(id);
    expect(capture).toMatchObject({
      state: 'screened',
      verdict: 'folded',
      logger: 'L7',
      position: 'bearing 2',
      acquisition: { logger: 'L7', position: 'bearing 2', highestFrequencyHz: 800 },
      acquisitionOverride: { position: 'bearing 2', highestFrequencyHz: 800 },
      guardStart: 0.8,
      thresholdsVersion: 1,
      engineVersion: '1.0.0',
      uploadedBy: { id: analyst.id, name: 'Ines Corvane' },
      decision: { decision: 'accept', version: 1, decidedBy: { name: 'Ruth Aldane' } },
      decisionVersion: 1,
    });
    expect(capture.channels).toHaveLength(1);
    expect(capture.history.map(({ action, actorName }) => [action, actorName])).toEqual([
      ['screened', null],
      ['decided', 'Ruth Aldane'],
    ]);
  });

  it('tells each role what it may do', async () => {
    const { id } = await screened();
    expect((await read(id)).permissions).toEqual({ decide: true, edit: false, decideRefusal: null });
    expect((await read(id, asAnalyst)).permissions).toMatchObject({ decide: false, edit: true });
  });

  it('shows why a capture failed, and no channels', async () => {
    const { id } = await buildCapture(app.deps.dataSource, batch, {
      state: 'failed',
      failureCode: 'RAGGED',
      failureMessage: 'Line 7 has 3 cells instead of 2. Correct it and upload the file again.',
      failureLine: 7,
    });
    const capture = await read(id);
    expect(capture.failure).toMatchObject({ code: 'RAGGED', line: 7 });
    expect(capture.channels).toEqual([]);
  });

  it('answers 404 alike for a missing capture and one of a foreign project', async () => {
    const foreign = await buildProject(app.deps.dataSource);
    const hidden = await buildCapture(app.deps.dataSource, await buildBatch(app.deps.dataSource, foreign.id));
    const missing = await asReviewer.get('/captures/00000000-0000-4000-8000-000000000000');
    const stranger = await asReviewer.get(`/captures/${hidden.id}`);
    expect(errorOf(stranger)).toEqual({ status: 404, code: 'NOT_FOUND' });
    expect(errorOf(missing)).toEqual(errorOf(stranger));
  });
});

describe('GET /captures/:captureId/spectrum', () => {
  it('keeps the height and place of a line while pooling', async () => {
    const { id } = await screened();
    const response = await asReviewer.get(`/captures/${id}/spectrum?points=100`);
    const spectrum = spectrumSchema.parse(response.body);
    expect(spectrum.frequencyHz.length).toBeLessThanOrEqual(100);
    const highest = spectrum.densityDb.indexOf(Math.max(...spectrum.densityDb));
    expect(spectrum.frequencyHz[highest]).toBe(72);
    // 10·log10(1e-2) dB, the density that was stored at 72 Hz
    expect(spectrum.densityDb[highest]).toBeCloseTo(-20, 3);
    expect(spectrum).toMatchObject({ sampleRateHz: 6000, foldingFrequencyHz: 3000, resolutionHz: 1, segments: 8 });
  });

  it('cuts the stretch asked for without pooling where there is room', async () => {
    const { id } = await screened();
    const response = await asReviewer.get(`/captures/${id}/spectrum?fromHz=70&toHz=74.5`);
    expect(spectrumSchema.parse(response.body).frequencyHz).toEqual([70, 71, 72, 73, 74]);
  });

  it('answers 409 for a capture that is not screened, 404 for a channel that is not there, no bins for a kind that was not made', async () => {
    const waiting = await buildCapture(app.deps.dataSource, batch);
    expect(errorOf(await asReviewer.get(`/captures/${waiting.id}/spectrum`))).toEqual({
      status: 409,
      code: 'NOT_SCREENED',
    });
    const { id } = await screened();
    const noChannel = await asReviewer.get(`/captures/${id}/spectrum?channel=1`);
    expect(errorOf(noChannel)).toEqual({ status: 404, code: 'NO_CHANNEL' });
    const noFine = await asReviewer.get(`/captures/${id}/spectrum?kind=fine`);
    expect(noFine.status).toBe(200);
    expect(spectrumSchema.parse(noFine.body)).toMatchObject({ kind: 'fine', frequencyHz: [], densityDb: [] });
  });
});

describe('GET /captures/:captureId/file', () => {
  const store = async (fileName: string, content: string): Promise<Capture> => {
    const folder = path.join(app.deps.config.STORAGE_DIR, 'ab');
    await mkdir(folder, { recursive: true });
    await writeFile(path.join(folder, 'key'), content);
    return buildCapture(app.deps.dataSource, batch, {
      fileName,
      format: 'csv',
      storageKey: 'ab/key',
      sizeBytes: Buffer.byteLength(content),
    });
  };

  it('sends the bytes as an attachment that no browser renders', async () => {
    const { id } = await store('hall/übersicht "1".csv', '<script>alert(1)</script>\n');
    const response = await asReviewer.get(`/captures/${id}/file`).buffer(true);
    expect(response.status).toBe(200);
    expect(response.text).toBe('<script>alert(1)</script>\n');
    expect(response.headers).toMatchObject({
      'content-type': 'text/csv; charset=utf-8',
      'content-length': '26',
      'x-content-type-options': 'nosniff',
      'content-security-policy': "default-src 'none'; sandbox",
    });
    // RFC 6266: a plain name for old readers, the exact one in UTF-8 beside it
    expect(response.headers['content-disposition']).toMatch(/^attachment; filename="/);
    expect(response.headers['content-disposition']).toContain("filename*=UTF-8''%C3%BCbersicht%20%221%22.csv");
  });

  it('answers 410 when the stored file is gone, and 404 to a stranger', async () => {
    const { id } = await buildCapture(app.deps.dataSource, batch);
    expect(errorOf(await asReviewer.get(`/captures/${id}/file`))).toEqual({ status: 410, code: 'FILE_MISSING' });
    const elsewhere = await buildProject(app.deps.dataSource);
    const stranger = await app.as(await buildMember(app.deps.dataSource, elsewhere.id, ['reviewer']));
    expect(errorOf(await stranger.get(`/captures/${id}/file`))).toEqual({ status: 404, code: 'NOT_FOUND' });
  });
});

describe('PUT /captures/:captureId/acquisition', () => {
  const put = (id: string, body: object) => asAnalyst.put(`/captures/${id}/acquisition`).send(body);

  it('judges again from the stored measurement, with the thresholds now in force, and keeps the spectra', async () => {
    const { id, attempt } = await screened();
    await app.deps.dataSource.manager.insert(ThresholdsVersion, {
      projectId: project.id,
      version: 2,
      values: (await app.deps.dataSource.manager.findOneByOrFail(ThresholdsVersion, { projectId: project.id })).values,
      reason: 'The same once more',
    });
    const response = await put(id, { acquisition: { highestFrequencyHz: 500 } });
    expect(response.status).toBe(200);
    const capture = captureSchema.parse(response.body);
    expect(capture).toMatchObject({ state: 'screened', thresholdsVersion: 2, verdict: 'unproven' });
    expect(capture.channels[0]).toMatchObject({ verdict: 'unproven', bandOfInterestHz: [0, 500], samples: 60_000 });
    expect(await reload(id)).toMatchObject({ attempt, acquisition: { highestFrequencyHz: 500 } });
    expect(await app.deps.dataSource.manager.count(Spectrum)).toBe(1);
    const findings = await app.deps.dataSource.manager.find(FindingRow, { order: { position: 'ASC' } });
    expect(findings.map(({ finding }) => finding)).toEqual(capture.channels[0]?.findings);
    expect(await app.deps.queue.counts()).toMatchObject({ waiting: 0 });
  });

  it('screens again where the measurement itself used what has changed, and opens the batch again', async () => {
    const { id } = await screened();
    await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'review', completedAt: new Date() });
    const response = await put(id, { acquisition: { sampleRateHz: 12_000 } });
    expect(captureSchema.parse(response.body)).toMatchObject({ state: 'queued', verdict: null, channels: [] });
    expect(await reload(id)).toMatchObject({ attempt: 3, foldScore: null, headline: null });
    expect(await app.deps.dataSource.manager.findOneBy(Batch, { id: batch.id })).toMatchObject({ state: 'screening' });
    expect(await app.deps.queue.counts()).toMatchObject({ waiting: 1 });
  });

  it('shuts out a worker that still screens with the old sheet', async () => {
    const { id } = await buildCapture(app.deps.dataSource, batch, { state: 'screening', attempt: 1 });
    expect((await put(id, { acquisition: { notes: 'gain was 2' } })).status).toBe(200);
    const isSaved = await app.deps.dataSource.transaction((manager) =>
      saveScreening(manager, {
        captureId: id,
        attempt: 1,
        engineVersion: '1.0.0',
        thresholdsVersion: 1,
        result: buildScreening(),
      }),
    );
    expect(isSaved).toBe(false);
    expect(await app.deps.dataSource.manager.count(ChannelResult)).toBe(0);
  });

  it('refuses a reviewer with 403, a released batch with 409 and a senseless sheet with 400', async () => {
    const { id } = await screened();
    const acquisition = { notes: 'checked' };
    const byReviewer = await asReviewer.put(`/captures/${id}/acquisition`).send({ acquisition });
    expect(errorOf(byReviewer)).toEqual({ status: 403, code: 'FORBIDDEN' });
    expect(errorOf(await put(id, { acquisition: { sampleRateHz: 0 } }))).toEqual({
      status: 400,
      code: 'INVALID_INPUT',
    });
    await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'released' });
    expect(errorOf(await put(id, { acquisition }))).toEqual({ status: 409, code: 'BATCH_CLOSED' });
    await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'review' });
    expect((await put(id, { acquisition })).status).toBe(200);
  });
});

describe('POST /captures/:captureId/retry', () => {
  it('queues a failed capture again under a new attempt', async () => {
    const { id } = await buildCapture(app.deps.dataSource, batch, {
      state: 'failed',
      attempt: 2,
      faultCount: 4,
      failureCode: 'WORKER_DIED',
    });
    const response = await asAnalyst.post(`/captures/${id}/retry`);
    expect(captureSchema.parse(response.body)).toMatchObject({ state: 'queued', failure: null });
    expect(await reload(id)).toMatchObject({ attempt: 4, faultCount: 0 });
  });

  it('answers 409 for a capture that did not fail, and 403 to a reviewer', async () => {
    const { id } = await screened();
    expect(errorOf(await asAnalyst.post(`/captures/${id}/retry`))).toEqual({ status: 409, code: 'NOT_FAILED' });
    expect(errorOf(await asReviewer.post(`/captures/${id}/retry`))).toEqual({ status: 403, code: 'FORBIDDEN' });
  });
});

describe('PUT /captures/:captureId/decision', () => {
  const decide = (id: string, body: object = accept, client = asReviewer) =>
    client.put(`/captures/${id}/decision`).send(body);

  it('keeps every decision; the newest is in force', async () => {
    const { id } = await screened();
    await decide(id, { ...accept, version: 0 });
    const response = await decide(id, { decision: 'retake', reason: 'Needs the filter.', version: 1 });
    const capture = captureSchema.parse(response.body);
    expect(capture.decision).toMatchObject({ decision: 'retake', version: 2 });
    expect(capture.decisions.map(({ version }) => version)).toEqual([2, 1]);
  });

  it('gives one of thirty decisions at once a 200 and each other one a 409', async () => {
    const { id } = await screened();
    const answers = await Promise.all(Array.from({ length: 30 }, () => decide(id, { ...accept, version: 0 })));
    const statuses = answers.map(({ status }) => status).sort();
    expect(statuses).toEqual([200, ...Array<number>(29).fill(409)]);
    const refused = answers.filter(({ status }) => status === 409);
    expect(new Set(refused.map((response) => errorOf(response).code))).toEqual(new Set(['DECISION_CHANGED']));
    expect(await app.deps.dataSource.manager.countBy(Decision, { captureId: id })).toBe(1);
    expect(await app.deps.dataSource.manager.countBy(AuditEntry, { entityId: id, action: 'decided' })).toBe(1);
  });

  it('without a version follows whatever was decided before', async () => {
    const { id } = await screened();
    expect((await decide(id)).status).toBe(200);
    expect((await decide(id, { decision: 'exclude', reason: 'Sensor came off.' })).status).toBe(200);
    expect(await reload(id)).toMatchObject({ decisionVersion: 2 });
  });

  describe('where the project asks for independent review', () => {
    let both: User;
    beforeEach(async () => {
      project = await buildProject(app.deps.dataSource, { thresholds: { independentReview: true } });
      batch = await buildBatch(app.deps.dataSource, project.id);
      both = await buildMember(app.deps.dataSource, project.id, ['analyst', 'reviewer']);
    });

    it('refuses the uploader with 403 and takes the decision of another reviewer', async () => {
      const { id } = await screened({ uploadedById: both.id });
      const asBoth = await app.as(both);
      expect(errorOf(await decide(id, accept, asBoth))).toEqual({ status: 403, code: 'INDEPENDENT_REVIEW' });
      expect((await read(id, asBoth)).permissions.decideRefusal).toMatch(/independent review/);
      const other = await app.as(await buildMember(app.deps.dataSource, project.id, ['reviewer']));
      expect((await decide(id, accept, other)).status).toBe(200);
    });

    it('takes the decision of the uploader where the project does not ask for it', async () => {
      const relaxed = await buildProject(app.deps.dataSource);
      batch = await buildBatch(app.deps.dataSource, relaxed.id);
      const uploader = await buildMember(app.deps.dataSource, relaxed.id, ['analyst', 'reviewer']);
      const { id } = await screened({ uploadedById: uploader.id });
      expect((await decide(id, accept, await app.as(uploader))).status).toBe(200);
    });
  });

  it.each(['received', 'queued', 'screening', 'failed'] as const)(
    'answers 409 for a capture that is %s',
    async (state) => {
      const { id } = await buildCapture(app.deps.dataSource, batch, { state });
      expect(errorOf(await decide(id))).toEqual({ status: 409, code: 'NOT_SCREENED' });
    },
  );

  it.each(['released', 'withdrawn'] as const)(
    'answers 409 in a batch that is %s, 200 in one under review',
    async (state) => {
      const { id } = await screened();
      await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state });
      expect(errorOf(await decide(id))).toEqual({ status: 409, code: 'BATCH_CLOSED' });
      await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'review' });
      expect((await decide(id)).status).toBe(200);
    },
  );

  it('answers 403 to an analyst, and to an administrator who is no member', async () => {
    const { id } = await screened();
    expect(errorOf(await decide(id, accept, asAnalyst))).toEqual({ status: 403, code: 'FORBIDDEN' });
    const asAdmin = await app.as(await buildUser(app.deps.dataSource, { isAdmin: true }));
    expect(errorOf(await decide(id, accept, asAdmin))).toEqual({ status: 403, code: 'FORBIDDEN' });
  });

  it('takes a limit up to the folding frequency and no further', async () => {
    const { id } = await screened();
    const limited = (limitHz: number) => decide(id, { decision: 'acceptTo', limitHz, reason: 'Clear below.' });
    expect(errorOf(await limited(3001))).toEqual({ status: 422, code: 'LIMIT_ABOVE_FOLDING' });
    expect((await limited(3000)).status).toBe(200);
  });

  it.each([
    [{ decision: 'acceptTo', reason: 'no limit given' }],
    [{ decision: 'accept', limitHz: 100, reason: 'limit without need' }],
    [{ decision: 'accept', reason: '' }],
    [{ ...accept, decidedById: '00000000-0000-4000-8000-000000000000' }],
    [{ ...accept, version: -1 }],
  ])('answers 400 for %j', async (body) => {
    const { id } = await screened();
    expect(errorOf(await decide(id, body))).toEqual({ status: 400, code: 'INVALID_INPUT' });
  });
});
