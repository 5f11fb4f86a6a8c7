import express, { type Express } from 'express';
import supertest from 'supertest';
import { describe, expect, it } from 'vitest';
import { z } from 'zod';
import { createLogger } from '../../../server/logging/createLogger.js';
import { errorHandler } from '../../../server/middleware/errorHandler.js';
import { requestId } from '../../../server/middleware/requestId.js';
import { bindRoute } from '../../../server/routes/bindRoute.js';
import { route } from '../../../server/routes/Route.js';

const echoSchema = z.object({ query: z.unknown(), body: z.unknown(), params: z.unknown() });
const bodySchema = z.strictObject({
  name: z.string().max(5),
  size: z.number().int().min(0),
  when: z.iso.datetime().optional(),
});

/** One route with a schema for everything, which answers what it was given. */
function echoApp(): Express {
  const app = express();
  app.set('query parser', 'simple');
  app.use(requestId);
  const row = route({
    method: 'post',
    path: '/things/:thingId',
    tag: 'Test',
    summary: 'Echo',
    access: 'anyone',
    params: z.strictObject({ thingId: z.uuid() }),
    query: z.strictObject({ limit: z.coerce.number().int().max(10).default(5) }),
    body: bodySchema,
    success: { status: 200, schema: echoSchema },
    handle: ({ query, body, params }) => ({ query, body, params }),
  });
  bindRoute(app, row, { config: { NODE_ENV: 'test' } }, (_req, _res, next) => next());
  app.use(errorHandler(createLogger({ LOG_LEVEL: 'silent' }, 'server')));
  return app;
}

const path = '/things/7d1f9c5e-3c0b-4b43-9a39-0f5a1c2b3d4e';

describe('validation of a request', () => {
  it('hands on parsed values with defaults filled in', async () => {
    const answer = await supertest(echoApp()).post(path).send({ name: 'x', size: 3 });
    expect(answer.status).toBe(200);
    expect(answer.body).toEqual({
      query: { limit: 5 },
      body: { name: 'x', size: 3 },
      params: { thingId: path.slice(8) },
    });
  });

  it('takes characters beyond the basic plane', async () => {
    const answer = await supertest(echoApp()).post(path).send({ name: 'a🔧', size: 3 });
    expect(answer.body.body).toEqual({ name: 'a🔧', size: 3 });
  });

  it('tells every problem of the body with its path', async () => {
    const answer = await supertest(echoApp()).post(path).send({ name: 'too long', size: -1, extra: 1, when: 'soon' });
    expect(answer.status).toBe(400);
    expect(answer.body.error.code).toBe('INVALID_INPUT');
    const paths = answer.body.error.details.map((detail: { path: string }) => detail.path);
    expect(paths.sort()).toEqual(['body.extra', 'body.name', 'body.size', 'body.when']);
  });

  it.each([
    ['an unknown query name', '?nope=1', 'query.nope'],
    ['a repeated query name', '?limit=1&limit=2', 'query.limit'],
    ['a query value out of range', '?limit=11', 'query.limit'],
    ['a query value of the wrong kind', '?limit=abc', 'query.limit'],
  ])('refuses %s', async (_name, query, where) => {
    const answer = await supertest(echoApp()).post(`${path}${query}`).send({ name: 'x', size: 3 });
    expect(answer.status).toBe(400);
    expect(answer.body.error).toMatchObject({ code: 'INVALID_INPUT', details: [{ path: where }] });
  });

  it('refuses an id that is none before anything looks it up', async () => {
    const answer = await supertest(echoApp()).post("/things/1'or'1").send({ name: 'x', size: 3 });
    expect(answer.status).toBe(400);
    expect(answer.body.error.details[0].path).toBe('params.thingId');
  });

  it.each([
    ['a form', 'application/x-www-form-urlencoded', 'name=x&size=3'],
    ['plain text', 'text/plain', '{"name":"x","size":3}'],
  ])('answers 415 for %s', async (_name, type, body) => {
    const answer = await supertest(echoApp()).post(path).set('Content-Type', type).send(body);
    expect(answer.status).toBe(415);
    expect(answer.body.error.code).toBe('UNSUPPORTED_MEDIA_TYPE');
  });

  it.each([
    ['broken JSON', '{"name":', 'BAD_JSON', 400],
    ['a bare text', '"name"', 'BAD_JSON', 400],
    ['a list', '[]', 'INVALID_INPUT', 400],
    ['__proto__ as a name', '{"name":"x","size":3,"__proto__":{"isAdmin":true}}', 'INVALID_INPUT', 400],
    ['a NUL character', '{"name":"a\\u0000b","size":1}', 'INVALID_INPUT', 400],
    ['half a character', '{"name":"a\\ud800","size":1}', 'INVALID_INPUT', 400],
    ['a number that JSON cannot hold', '{"name":"x","size":1e999}', 'INVALID_INPUT', 400],
    ['300 kB', JSON.stringify({ name: 'x'.repeat(300_000), size: 1 }), 'BODY_TOO_LARGE', 413],
  ])('refuses %s', async (_name, text, code, status) => {
    const answer = await supertest(echoApp()).post(path).set('Content-Type', 'application/json').send(text);
    expect({ status: answer.status, code: answer.body.error.code }).toEqual({ status, code });
  });

  it('answers 400, not 500, when there is no body at all', async () => {
    const answer = await supertest(echoApp()).post(path);
    expect(answer.status).toBe(400);
    expect(answer.body.error).toMatchObject({ code: 'INVALID_INPUT', details: [{ path: 'body' }] });
  });
});
