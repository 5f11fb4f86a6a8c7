import { mkdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { Validator } from '@seriousme/openapi-schema-validator';
import supertest from 'supertest';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { healthSchema, publicSettingsSchema } from '../../shared/schemas/system.js';
import { createApp } from '../../server/app.js';
import { demoAccounts } from '../../server/demo/demoAccounts.js';
import type { ScreeningQueue } from '../../server/queues/ScreeningQueue.js';
import { buildUser } from '../support/factories/buildUser.js';
import { errorOf } from '../support/errorOf.js';
import { expressRoutes } from '../support/expressRoutes.js';
import { createTestApp, type TestApp } from '../support/testApp.js';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const withConfig = (config: Partial<TestApp['deps']['config']>, deps: Partial<TestApp['deps']> = {}) =>
  supertest(createApp({ ...app.deps, ...deps, config: { ...app.deps.config, ...config } }));

describe('GET /api/health', () => {
  const get = () => supertest(app.app).get('/api/health');

  it('answers 200 when database, queue and storage answer', async () => {
    const response = await get();
    expect(response.status).toBe(200);
    expect(healthSchema.parse(response.body)).toEqual({
      status: 'ok',
      parts: { database: { ok: true }, queue: { ok: true }, storage: { ok: true } },
    });
  });

  it.each([
    ['database', { dataSource: { query: () => Promise.reject(new Error('password=secret')) } }],
    ['database', { dataSource: { query: () => new Promise(() => undefined) } }],
    ['queue', { queue: { check: () => Promise.reject(new Error('redis://secret')) } }],
    ['storage', { storage: { check: () => Promise.reject(new Error('/secret/path')) } }],
  ])('answers 503 and names the %s when it does not answer, but not why', async (part, broken) => {
    const response = await withConfig({}, broken as unknown as { queue: ScreeningQueue }).get('/api/health');
    expect(response.status).toBe(503);
    const health = healthSchema.parse(response.body);
    expect(health.status).toBe('degraded');
    expect(
      Object.entries(health.parts)
        .filter(([, { ok }]) => !ok)
        .map(([name]) => name),
    ).toEqual([part]);
    expect(response.text).not.toContain('secret');
  });
});

describe('GET /settings', () => {
  it('tells limits and version, and no sign-ins outside a demo', async () => {
    const response = await withConfig({ MAX_FILE_BYTES: 5000, MAX_FILES_PER_BATCH: 7 }).get('/api/v1/settings');
    expect(publicSettingsSchema.parse(response.body)).toMatchObject({
      isDemo: false,
      demoAccounts: [],
      version: '0.0.0-test',
      limits: { maxFileBytes: 5000, maxFilesPerBatch: 7 },
    });
    for (const { password } of demoAccounts) expect(response.text).not.toContain(password);
  });

  it('shows the sign-ins of a demo', async () => {
    const { body } = await withConfig({ OVERFOLD_DEMO: true }).get('/api/v1/settings');
    expect(body.isDemo).toBe(true);
    expect(body.demoAccounts.map(({ role }: { role: string }) => role)).toEqual([
      'Analyst',
      'Reviewer',
      'QA manager',
      'Administrator',
    ]);
  });
});

describe('headers of every answer', () => {
  const places = ['/api/v1/settings', '/api/v1/session', '/api/v1/nothing', '/api/health', '/api/docs/', '/nothing'];

  it.each(places)('%s carries the security headers', async (place) => {
    const { headers } = await supertest(app.app).get(place);
    const policy = String(headers['content-security-policy']);
    for (const rule of [
      "default-src 'self'",
      "script-src 'self'",
      "object-src 'none'",
      "base-uri 'none'",
      "frame-ancestors 'none'",
    ]) {
      expect(policy.split(';')).toContain(rule);
    }
    expect(headers).toMatchObject({ 'x-content-type-options': 'nosniff', 'referrer-policy': 'no-referrer' });
    expect(headers['x-powered-by']).toBeUndefined();
    expect(headers['x-request-id']).toMatch(/^[0-9a-f-]{36}$/);
    expect(headers['strict-transport-security']).toBeUndefined();
  });

  it('asks for https for a year where the public address is https', async () => {
    const { headers } = await withConfig({ publicUrl: 'https://overfold.example' }).get('/api/v1/settings');
    expect(headers['strict-transport-security']).toBe('max-age=31536000; includeSubDomains');
    expect(headers['content-security-policy']).toContain('upgrade-insecure-requests');
  });

  it('lets nothing of the API be stored', async () => {
    expect((await supertest(app.app).get('/api/v1/settings')).headers['cache-control']).toBe('no-store');
    expect((await supertest(app.app).get('/api/v1/session')).headers['cache-control']).toBe('no-store');
  });

  it('allows no other origin', async () => {
    const { headers } = await supertest(app.app).get('/api/v1/settings').set('Origin', 'https://evil.example');
    expect(Object.keys(headers).filter((name) => name.startsWith('access-control-'))).toEqual([]);
  });

  it('takes no request id from the caller', async () => {
    const { headers } = await supertest(app.app).get('/api/v1/settings').set('X-Request-Id', 'mine');
    expect(headers['x-request-id']).not.toBe('mine');
  });
});

describe('addresses that lead nowhere', () => {
  it.each(['/api/v1/nothing', '/api/v2/session', '/api/nothing', '/nothing', '/.git/config', '/.env'])(
    'answers 404 as JSON at %s',
    async (place) => {
      expect(errorOf(await supertest(app.app).get(place)).status).toBe(404);
    },
  );

  it.each(['put', 'patch', 'trace', 'options'] as const)(
    'answers 405 with Allow to %s on a known path',
    async (method) => {
      const response = await supertest(app.app)[method]('/api/v1/session');
      expect(errorOf(response)).toEqual({ status: 405, code: 'METHOD_NOT_ALLOWED' });
      expect(response.headers.allow).toBe('POST, GET, DELETE');
    },
  );

  it('answers 400 to an address that cannot be decoded', async () => {
    const client = await app.as(await buildUser(app.deps.dataSource));
    expect(errorOf(await client.get('/projects/%zz'))).toEqual({ status: 400, code: 'BAD_REQUEST' });
  });
});

describe('the client', () => {
  async function withClient(): Promise<ReturnType<typeof supertest>> {
    const clientDir = path.join(app.deps.config.STORAGE_DIR, 'client');
    await mkdir(path.join(clientDir, 'assets'), { recursive: true });
    await writeFile(path.join(clientDir, 'index.html'), '<!doctype html><title>Overfold</title>');
    await writeFile(path.join(clientDir, 'assets', 'main-abc123.js'), 'export {};');
    return withConfig({}, { clientDir });
  }

  it.each(['/', '/batches/7d1f9c5e-3c0b-4b43-9a39-0f5a1c2b3d4e', '/sign-in?next=%2Freview', '/reset/abc-DEF_1'])(
    'is served at %s, to be asked for again each time',
    async (place) => {
      const response = await (await withClient()).get(place);
      expect(response.status).toBe(200);
      expect(response.text).toContain('<title>Overfold</title>');
      expect(response.headers['cache-control']).toBe('no-cache');
    },
  );

  it('serves its hashed files for long', async () => {
    const response = await (await withClient()).get('/assets/main-abc123.js');
    expect(response.status).toBe(200);
    expect(response.headers['cache-control']).toBe('public, max-age=31536000, immutable');
  });

  it.each(['/assets/missing.js', '/assets/', '/favicon.ico', '/../package.json', '/api/v1/nothing'])(
    'does not answer a page at %s',
    async (place) => {
      expect(errorOf(await (await withClient()).get(place)).status).toBe(404);
    },
  );
});

describe('the API document', () => {
  const load = async () => (await supertest(app.app).get('/api/v1/openapi.json')).body;

  it('is valid OpenAPI 3.1 by the schema that the OpenAPI Initiative publishes', async () => {
    const document = await load();
    const result = await new Validator().validate(document);
    expect(result.errors ?? []).toEqual([]);
    expect(result.valid).toBe(true);
    expect(document.openapi).toBe('3.1.0');
  });

  it('describes every route that Express serves, and no other', async () => {
    const { paths } = (await load()) as { paths: Record<string, Record<string, unknown>> };
    const described = Object.entries(paths).flatMap(([place, operations]) =>
      Object.keys(operations).map(
        (method) => `${method.toUpperCase()} ${place.replace(/^\/api(\/v1)?/, '').replace(/\{(\w+)\}/g, ':$1')}`,
      ),
    );
    const served = expressRoutes(app.app).filter((row) => !row.includes('{*page}'));
    expect(described.sort()).toEqual(served);
    expect(served.length).toBeGreaterThan(20);
  });

  it('names the one error body for every operation, and 401 wherever sign-in is asked for', async () => {
    const { paths } = (await load()) as {
      paths: Record<string, Record<string, { security: unknown[]; responses: Record<string, { content: unknown }> }>>;
    };
    const errorContent = { 'application/json': { schema: { $ref: '#/components/schemas/Error' } } };
    for (const operation of Object.values(paths).flatMap((operations) => Object.values(operations))) {
      expect(operation.responses.default?.content).toEqual(errorContent);
      expect('401' in operation.responses || operation.security.length === 0).toBe(true);
    }
  });

  it('has a page of which every file comes from here', async () => {
    const page = await supertest(app.app).get('/api/docs/');
    expect(page.status).toBe(200);
    const files = [...page.text.matchAll(/(?:src|href)="(\.\/[^"]+)"/g)].map(([, file]) => file ?? '');
    expect(files.length).toBeGreaterThan(3);
    expect(page.text).not.toMatch(/(src|href)="(https?:)?\/\//);
    expect(page.text).not.toMatch(/<script(?![^>]*src=)[^>]*>[^<\s]/);
    for (const file of files) expect((await supertest(app.app).get(`/api/docs/${file}`)).status).toBe(200);
    expect((await supertest(app.app).get('/api/docs/swagger-ui-init.js')).text).toContain('"openapi": "3.1.0"');
  });
});

describe('a fault of ours', () => {
  it('answers 500 with nothing but the request id, and 503 when the database is away', async () => {
    const fail = (error: Error) =>
      withConfig(
        {},
        { dataSource: { query: () => Promise.reject(error) } as unknown as TestApp['deps']['dataSource'] },
      );
    const { token } = await app.openSession(await buildUser(app.deps.dataSource));
    const ask = (error: Error) => fail(error).get('/api/v1/session').set('Authorization', `Bearer ${token}`);

    const bug = await ask(new TypeError('secret detail'));
    expect(errorOf(bug)).toEqual({ status: 500, code: 'INTERNAL' });
    expect(bug.text).not.toContain('secret');
    const away = await ask(Object.assign(new Error('connect 10.0.0.1'), { code: 'ECONNREFUSED' }));
    expect(errorOf(away)).toEqual({ status: 503, code: 'UNAVAILABLE' });
    expect(away.headers['retry-after']).toBe('5');
    expect(away.text).not.toContain('10.0.0.1');
  });
});
