import { createHash } from 'node:crypto';
import { mkdir, readdir, writeFile } from 'node:fs/promises';
import { createServer, request as httpRequest, type Server } from 'node:http';
import type { AddressInfo } from 'node:net';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry, Batch, Capture, type Project, type User } from '../../../server/entities/index.js';
import { uploadResponseSchema, type UploadResponse } from '../../../shared/schemas/capture.js';
import { errorOf } from '../../support/errorOf.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildCapture } from '../../support/factories/buildCapture.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { multipartBody, type FilePart } from '../../support/multipartBody.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';
import { wavBytes } from '../../support/wavBytes.js';

const maxFileBytes = 200_000;
const maxFilesPerBatch = 3;

let app: TestApp;
let project: Project;
let batch: Batch;
let analyst: User;
let client: TestClient;

beforeEach(async () => {
  app = await createTestApp({ config: { MAX_FILE_BYTES: maxFileBytes, MAX_FILES_PER_BATCH: maxFilesPerBatch } });
  project = await buildProject(app.deps.dataSource);
  batch = await buildBatch(app.deps.dataSource, project.id);
  analyst = await buildMember(app.deps.dataSource, project.id, ['analyst']);
  client = await app.as(analyst);
});
afterEach(() => app.close());

const sha256 = (bytes: Buffer): string => createHash('sha256').update(bytes).digest('hex');
const post = (files: FilePart[], fields: Record<string, string> = {}, asClient = client) => {
  const { contentType, body } = multipartBody(files, fields);
  return asClient.post(`/batches/${batch.id}/captures`).set('Content-Type', contentType).send(body);
};
const upload = async (files: FilePart[], fields?: Record<string, string>): Promise<UploadResponse> => {
  const response = await post(files, fields);
  expect(response.status).toBe(201);
  return uploadResponseSchema.parse(response.body);
};
const rows = (): Promise<Capture[]> => app.deps.dataSource.manager.find(Capture, { order: { fileName: 'ASC' } });
/** Every file below the store, those of uploads in progress included. */
const storedFiles = async (): Promise<string[]> => {
  await mkdir(app.deps.config.STORAGE_DIR, { recursive: true });
  const entries = await readdir(app.deps.config.STORAGE_DIR, { recursive: true, withFileTypes: true });
  return entries.filter((entry) => entry.isFile()).map((entry) => path.join(entry.parentPath, entry.name));
};

describe('POST /batches/:batchId/captures', () => {
  it('makes a queued capture of a file, with its checksum, its bytes in the store and an audit entry', async () => {
    const bytes = wavBytes();
    const { captures, refused } = await upload([{ name: 'pump-1.wav', bytes }]);
    expect(refused).toEqual([]);
    expect(captures).toMatchObject([
      { fileName: 'pump-1.wav', sha256: sha256(bytes), sizeBytes: bytes.length, format: 'wav', duplicateOfId: null },
    ]);
    const [row] = await rows();
    expect(row).toMatchObject({ state: 'queued', attempt: 1, uploadedById: analyst.id });
    expect(await app.deps.queue.counts()).toMatchObject({ waiting: 1 });
    expect(await storedFiles()).toHaveLength(1);
    const [entry] = await app.deps.dataSource.manager.findBy(AuditEntry, { entityId: row?.id });
    expect(entry).toMatchObject({ action: 'uploaded', actorId: analyst.id });
  });

  it('keeps the good files of a request and says of each other one why it is refused', async () => {
    const { captures, refused } = await upload([
      { name: 'good.wav', bytes: wavBytes() },
      { name: 'page.wav', bytes: Buffer.from('<!doctype html><script>alert(1)</script>') },
      { name: 'archive.wav', bytes: Buffer.from([0x50, 0x4b, 0x03, 0x04, 0, 0]) },
      { name: 'empty.csv', bytes: Buffer.alloc(0) },
      { name: 'table.csv', bytes: Buffer.from('t,a\n0,1\n0.1,2\n') },
    ]);
    expect(captures.map(({ fileName, format }) => [fileName, format])).toEqual([
      ['good.wav', 'wav'],
      ['table.csv', 'csv'],
    ]);
    expect(refused.map(({ fileName, code }) => [fileName, code])).toEqual([
      ['page.wav', 'NOT_WAV'],
      ['archive.wav', 'NOT_WAV'],
      ['empty.csv', 'EMPTY_FILE'],
    ]);
    expect(await storedFiles()).toHaveLength(2);
  });

  it.each([
    ['../../etc/passwd.wav', 'etc/passwd.wav'],
    ['C:\\recordings\\hall 2\\pump.wav', 'recordings/hall 2/pump.wav'],
    ['Ferrow Quay/übersicht-振動.wav', 'Ferrow Quay/übersicht-振動.wav'],
    ['<img src=x onerror=alert(1)>.wav', '<img src=x onerror=alert(1)>.wav'],
    ['$(touch x);`id`.wav', '$(touch x);`id`.wav'],
    ['safe\u202Evaw.exe.wav', 'safevaw.exe.wav'],
    ['CON.wav', 'CON.wav'],
  ])('lists a file sent as %j as %j and stores it under a generated name', async (sent, listed) => {
    const { captures } = await upload([{ name: sent, bytes: wavBytes() }]);
    expect(captures.map(({ fileName }) => fileName)).toEqual([listed]);
    for (const file of await storedFiles()) expect(path.basename(file)).toMatch(/^[0-9a-f-]{36}$/);
  });

  it('answers 400 for a name with a zero byte, which no form may hold', async () => {
    const response = await post([{ name: 'nul\u0000byte.wav', bytes: wavBytes() }]);
    expect(errorOf(response)).toEqual({ status: 400, code: 'BAD_UPLOAD' });
    expect(await storedFiles()).toEqual([]);
  });

  it('refuses a name of which nothing readable is left', async () => {
    const { captures, refused } = await upload([{ name: '../..', bytes: wavBytes() }]);
    expect(captures).toEqual([]);
    expect(refused).toMatchObject([{ code: 'BAD_FILE_NAME' }]);
  });

  it('takes a file of exactly the largest size and answers 413 for one byte more, keeping nothing of it', async () => {
    const table = (size: number): Buffer => Buffer.alloc(size, '0,1\n');
    await upload([{ name: 'limit.csv', bytes: table(maxFileBytes) }]);
    const response = await post([{ name: 'over.csv', bytes: table(maxFileBytes + 1) }]);
    expect(errorOf(response)).toEqual({ status: 413, code: 'FILE_TOO_LARGE' });
    expect(response.body.error.message).toContain(String(maxFileBytes));
    expect(await storedFiles()).toHaveLength(1);
  });

  it('takes 20 files in one request and answers 413 for 21', async () => {
    const files = (count: number): FilePart[] =>
      Array.from({ length: count }, (_, n) => ({ name: `f${n}.txt`, bytes: Buffer.from([0, 1, 2]) }));
    expect((await upload(files(20))).refused).toHaveLength(20);
    expect(errorOf(await post(files(21)))).toEqual({ status: 413, code: 'TOO_MANY_FILES' });
  });

  it('answers the capture that is there when the same file comes again', async () => {
    const file = { name: 'pump.wav', bytes: wavBytes() };
    const first = await upload([file]);
    const second = await upload([file]);
    expect(second.captures.map(({ id }) => id)).toEqual(first.captures.map(({ id }) => id));
    expect(await storedFiles()).toHaveLength(1);
  });

  it('makes one capture of ten uploads of the same file at once', async () => {
    const file = { name: 'pump.wav', bytes: wavBytes() };
    const answers = await Promise.all(Array.from({ length: 10 }, () => upload([file])));
    expect(new Set(answers.map(({ captures }) => captures[0]?.id)).size).toBe(1);
    expect(await rows()).toHaveLength(1);
    expect(await storedFiles()).toHaveLength(1);
  });

  it('refuses another file with a name that the batch holds', async () => {
    await upload([{ name: 'pump.wav', bytes: wavBytes({ seed: 1 }) }]);
    const { captures, refused } = await upload([{ name: 'pump.wav', bytes: wavBytes({ seed: 2 }) }]);
    expect(captures).toEqual([]);
    expect(refused).toMatchObject([{ fileName: 'pump.wav', code: 'DUPLICATE_NAME' }]);
    expect(await storedFiles()).toHaveLength(1);
  });

  it('recognises bytes that the project got before, in another batch too', async () => {
    const bytes = wavBytes();
    const other = await buildBatch(app.deps.dataSource, project.id);
    const earlier = await buildCapture(app.deps.dataSource, other, { sha256: sha256(bytes) });
    const { captures } = await upload([{ name: 'again.wav', bytes }]);
    expect(captures).toMatchObject([{ duplicateOfId: earlier.id }]);
  });

  it('does not tell of the same bytes in a foreign project', async () => {
    const bytes = wavBytes();
    const foreign = await buildProject(app.deps.dataSource);
    await buildCapture(app.deps.dataSource, await buildBatch(app.deps.dataSource, foreign.id), {
      sha256: sha256(bytes),
    });
    const { captures } = await upload([{ name: 'pump.wav', bytes }]);
    expect(captures).toMatchObject([{ duplicateOfId: null }]);
  });

  it('never lets a batch grow over its limit, with many requests at once', async () => {
    const answers = await Promise.all(
      Array.from({ length: 8 }, (_, seed) => upload([{ name: `p${seed}.wav`, bytes: wavBytes({ seed }) }])),
    );
    expect(answers.flatMap(({ captures }) => captures)).toHaveLength(maxFilesPerBatch);
    const refused = answers.flatMap((answer) => answer.refused);
    expect(refused.map(({ code }) => code)).toEqual(Array<string>(5).fill('BATCH_FULL'));
    expect(await storedFiles()).toHaveLength(maxFilesPerBatch);
  });

  it('stores the sheet and the layout given for a file', async () => {
    const layout = {
      encoding: 'utf-8',
      separator: ';',
      decimalSign: ',',
      skipLines: 1,
      columnNames: ['t', 'a'],
      timeColumn: 0,
      timeUnit: 's',
      valueColumns: [1],
      units: ['g'],
      sampleRateHz: null,
    };
    await upload([{ name: 'hall/a.csv', bytes: Buffer.from('t;a\n0;1\n') }], {
      acquisition: JSON.stringify({ 'hall/a.csv': { logger: 'L7', highestFrequencyHz: 400 } }),
      csvLayout: JSON.stringify({ 'hall/a.csv': layout }),
    });
    const [row] = await rows();
    expect(row?.acquisition).toEqual({ logger: 'L7', highestFrequencyHz: 400 });
    expect(row?.csvLayout).toEqual(layout);
  });

  it.each([
    ['acquisition', '{not json'],
    ['acquisition', '{"a.wav":{"sampleRateHz":-1}}'],
    ['acquisition', '{"a.wav":{"verdict":"clear"}}'],
    ['csvLayout', '{"a.wav":{}}'],
    ['replaces', 'not-an-id'],
    ['state', 'screened'],
  ])('answers 400 naming the field for %s=%s, and keeps nothing', async (name, value) => {
    const response = await post([{ name: 'a.wav', bytes: wavBytes() }], { [name]: value });
    expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
    expect(response.body.error.details[0].path).toMatch(new RegExp(`^body\\.${name}`));
    expect(await rows()).toEqual([]);
    expect(await storedFiles()).toEqual([]);
  });

  it('answers 400 for a request without a file, and for a file in an unknown field', async () => {
    expect(errorOf(await post([], { acquisition: '{}' }))).toEqual({ status: 400, code: 'NO_FILES' });
    const response = await client.post(`/batches/${batch.id}/captures`).attach('avatar', wavBytes(), 'a.wav');
    expect(errorOf(response)).toEqual({ status: 400, code: 'UNEXPECTED_FILE' });
  });

  it('answers 415 for a body that is no form, and 400 for a form without a boundary', async () => {
    const json = await client.post(`/batches/${batch.id}/captures`).send({ files: [] });
    expect(errorOf(json)).toEqual({ status: 415, code: 'UNSUPPORTED_MEDIA_TYPE' });
    const bare = await client
      .post(`/batches/${batch.id}/captures`)
      .set('Content-Type', 'multipart/form-data')
      .send('files');
    expect(errorOf(bare)).toEqual({ status: 400, code: 'BAD_UPLOAD' });
  });

  it('answers 409 once the upload was closed', async () => {
    await upload([{ name: 'pump.wav', bytes: wavBytes() }]);
    expect((await client.post(`/batches/${batch.id}/complete`)).status).toBe(200);
    const response = await post([{ name: 'late.wav', bytes: wavBytes({ seed: 2 }) }]);
    expect(errorOf(response)).toEqual({ status: 409, code: 'BATCH_COMPLETE' });
  });

  it('answers 404 to a stranger, 403 to a reviewer and to an administrator who is no member', async () => {
    const stranger = await app.as(
      await buildMember(app.deps.dataSource, (await buildProject(app.deps.dataSource)).id, ['analyst']),
    );
    const reviewer = await app.as(await buildMember(app.deps.dataSource, project.id, ['reviewer']));
    const file = { name: 'pump.wav', bytes: wavBytes() };
    expect(errorOf(await post([file], {}, stranger))).toEqual({ status: 404, code: 'NOT_FOUND' });
    expect(errorOf(await post([file], {}, reviewer))).toEqual({ status: 403, code: 'FORBIDDEN' });
    expect(errorOf(await post([file], {}, app.anonymous))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
    expect(await storedFiles()).toEqual([]);
  });

  it('keeps the capture when Redis is away, for the relay to queue later', async () => {
    await app.deps.queue.close();
    await upload([{ name: 'pump.wav', bytes: wavBytes() }]);
    const [row] = await rows();
    expect(['received', 'queued']).toContain(row?.state);
  });

  it('keeps no row when the store is full, and says so', async () => {
    await app.close();
    app = await createTestApp();
    const full = Object.assign(new Error('no space left'), { code: 'ENOSPC' });
    app.deps.storage.save = () => Promise.reject(full);
    project = await buildProject(app.deps.dataSource);
    batch = await buildBatch(app.deps.dataSource, project.id);
    client = await app.as(await buildMember(app.deps.dataSource, project.id, ['analyst']));
    expect(errorOf(await post([{ name: 'pump.wav', bytes: wavBytes() }]))).toEqual({
      status: 507,
      code: 'STORAGE_FULL',
    });
    expect(await rows()).toEqual([]);
    expect(await storedFiles()).toEqual([]);
  });
});

describe('replacing a failed capture', () => {
  const build = async (state: 'failed' | 'screened'): Promise<Capture> => {
    await mkdir(path.join(app.deps.config.STORAGE_DIR, 'aa'), { recursive: true });
    await writeFile(path.join(app.deps.config.STORAGE_DIR, 'aa/old'), 'old bytes');
    return buildCapture(app.deps.dataSource, batch, {
      fileName: 'pump.wav',
      state,
      storageKey: 'aa/old',
      attempt: 1,
      failureCode: state === 'failed' ? 'TRUNCATED' : null,
    });
  };

  it('gives it the new file under the same id and screens it, in a closed batch too', async () => {
    const failed = await build('failed');
    await app.deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'review', completedAt: new Date() });
    const bytes = wavBytes();
    const { captures } = await upload([{ name: 'pump.wav', bytes }], { replaces: failed.id });
    expect(captures).toMatchObject([{ id: failed.id, sha256: sha256(bytes) }]);
    const [row] = await rows();
    expect(row).toMatchObject({ id: failed.id, state: 'queued', attempt: 3, failureCode: null });
    expect(await app.deps.dataSource.manager.findOneBy(Batch, { id: batch.id })).toMatchObject({ state: 'screening' });
    expect((await storedFiles()).map((file) => path.basename(file))).not.toContain('old');
  });

  it('answers 409 for a capture that did not fail', async () => {
    const screened = await build('screened');
    const response = await post([{ name: 'pump.wav', bytes: wavBytes() }], { replaces: screened.id });
    expect(errorOf(response)).toEqual({ status: 409, code: 'NOT_FAILED' });
    expect((await storedFiles()).map((file) => path.basename(file))).toEqual(['old']);
  });

  it('answers 404 for a capture of another batch', async () => {
    const other = await buildCapture(app.deps.dataSource, await buildBatch(app.deps.dataSource, project.id), {
      state: 'failed',
    });
    const response = await post([{ name: 'pump.wav', bytes: wavBytes() }], { replaces: other.id });
    expect(errorOf(response)).toEqual({ status: 404, code: 'NOT_FOUND' });
  });
});

describe('a client that hangs up', () => {
  let server: Server;
  beforeEach(async () => {
    server = createServer(app.app);
    await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  });
  afterEach(() => new Promise((resolve) => server.close(resolve)));

  it('leaves no temporary file and no row behind, thirty times over', async () => {
    const { token } = await app.openSession(analyst);
    const { port } = server.address() as AddressInfo;
    const head = [
      '--edge',
      'Content-Disposition: form-data; name="files"; filename="cut.wav"',
      'Content-Type: audio/wav',
      '',
      '',
    ].join('\r\n');
    const hangUp = (): Promise<void> =>
      new Promise((resolve) => {
        const req = httpRequest({
          port,
          method: 'POST',
          path: `/api/v1/batches/${batch.id}/captures`,
          headers: {
            authorization: `Bearer ${token}`,
            'content-type': 'multipart/form-data; boundary=edge',
            'content-length': 150_000,
          },
        });
        req.on('error', () => resolve());
        req.write(head);
        req.write(wavBytes({ frames: 30_000 }), () => req.destroy());
      });
    for (let n = 0; n < 30; n += 1) await hangUp();
    // Closing waits until each of the server's own ends has let go.
    await expect.poll(storedFiles, { timeout: 5_000 }).toEqual([]);
    await expect.poll(async () => readdir(app.deps.storage.temporaryDir), { timeout: 5_000 }).toEqual([]);
    expect(await rows()).toEqual([]);
  });
});
