import { Writable } from 'node:stream';
import { pino } from 'pino';
import supertest from 'supertest';
import { afterEach, beforeEach, expect, it } from 'vitest';
import { createApp } from '../../../server/app.js';
import { buildUser, defaultPassword } from '../../support/factories/buildUser.js';
import { linkTokenIn } from '../../support/linkTokenIn.js';
import { createTestApp, type TestApp } from '../../support/testApp.js';
import { testJwtSecret } from '../../support/testDependencies.js';

let app: TestApp;
let lines: string[];

beforeEach(async () => {
  app = await createTestApp();
  lines = [];
});
afterEach(() => app.close());

function loggedApp() {
  const stream = new Writable({
    write(chunk: Buffer, _encoding, done) {
      lines.push(chunk.toString());
      done();
    },
  });
  return supertest(createApp({ ...app.deps, logger: pino({ level: 'trace' }, stream) }));
}

it('writes one line a request with id, user, path and status', async () => {
  const user = await buildUser(app.deps.dataSource);
  const { token } = await app.openSession(user);
  const response = await loggedApp().get('/api/v1/projects?x=1').set('Authorization', `Bearer ${token}`);
  expect(response.status).toBe(400);
  expect(lines).toHaveLength(1);
  expect(JSON.parse(lines[0] ?? '')).toMatchObject({
    req: { id: response.headers['x-request-id'], method: 'GET', path: '/api/v1/projects' },
    res: { status: 400 },
    userId: user.id,
  });
});

it('logs refused sign-ins as warnings', async () => {
  const user = await buildUser(app.deps.dataSource);
  await loggedApp().post('/api/v1/session').send({ email: user.email, password: 'wrong-password-here' });
  expect(JSON.parse(lines[0] ?? '')).toMatchObject({ level: 40, event: 'signInRefused', userId: user.id });
});

it('writes no password, token, cookie or link', async () => {
  const client = loggedApp();
  const user = await buildUser(app.deps.dataSource, { isAdmin: true });
  const signedIn = await client.post('/api/v1/session').send({ email: user.email, password: defaultPassword });
  const { token, renewalToken } = signedIn.body;
  const cookies = (signedIn.headers['set-cookie'] as unknown as string[]).map((line) => line.split(';')[0] ?? '');
  await client.get('/api/v1/session').set('Cookie', cookies.join('; '));
  await client.post('/api/v1/session').send({ email: user.email, password: 'wrong-but-secret-too' });
  await client.post('/api/v1/session/renewal').send({ renewalToken });
  await client.post('/api/v1/passwords/reset-request').send({ email: user.email });
  const [mail] = await app.deps.dataSource.query('select text from mail_messages');
  const linkToken = linkTokenIn(mail.text, '/reset/');
  await client.post('/api/v1/passwords').send({ token: linkToken, password: 'quiet-harbour-lantern-7' });
  await client.post('/api/v1/session').set('Content-Type', 'application/json').send('{"password":"broken-but-secret"');

  expect(lines.length).toBeGreaterThan(6);
  const log = lines.join('');
  const secrets = [
    defaultPassword,
    'wrong-but-secret-too',
    'broken-but-secret',
    'quiet-harbour-lantern-7',
    token,
    renewalToken,
    linkToken,
    testJwtSecret,
    ...cookies.map((cookie) => cookie.split('=')[1] ?? ''),
  ];
  for (const secret of secrets) expect(log).not.toContain(secret);
});

it('keeps a line break in an address from opening a new line', async () => {
  await loggedApp().get('/api/v1/%0d%0a{"level":60}');
  expect(lines).toHaveLength(1);
  expect(lines[0]?.trimEnd()).not.toContain('\n');
});
