import supertest from 'supertest';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { sessionResponseSchema } from '../../../shared/schemas/account.js';
import { AuditEntry, Session, type User } from '../../../server/entities/index.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { buildUser, defaultPassword } from '../../support/factories/buildUser.js';
import { errorOf } from '../../support/errorOf.js';
import { createTestApp, type TestApp } from '../../support/testApp.js';

let app: TestApp;
let user: User;

async function start(config: Parameters<typeof createTestApp>[0] = {}): Promise<void> {
  app = await createTestApp(config);
  user = await buildUser(app.deps.dataSource, { email: 'ines@marram.example', name: 'Ines' });
}

beforeEach(() => start());
afterEach(() => app.close());

const signIn = (email = user.email, password = defaultPassword) =>
  app.anonymous.post('/session').send({ email, password });

function cookiesOf(response: supertest.Response): Record<string, string> {
  const lines = (response.headers['set-cookie'] as unknown as string[] | undefined) ?? [];
  return Object.fromEntries(lines.map((line) => [line.slice(0, line.indexOf('=')), line]));
}

const cookieHeader = (response: supertest.Response): string =>
  Object.values(cookiesOf(response))
    .map((line) => line.split(';')[0])
    .join('; ');

describe('POST /session', () => {
  it('answers a token that signs requests in, and the user with their memberships', async () => {
    const project = await buildProject(app.deps.dataSource, { name: 'Ferrow Quay' });
    user = await buildMember(app.deps.dataSource, project.id, ['analyst'], { email: 'tomas@marram.example' });
    const response = await signIn();
    expect(response.status).toBe(200);
    const body = sessionResponseSchema.parse(response.body);
    expect(body.user).toMatchObject({
      id: user.id,
      memberships: [{ projectId: project.id, projectName: 'Ferrow Quay', roles: ['analyst'] }],
    });
    expect((await app.withToken(body.token).get('/session')).status).toBe(200);
  });

  it('takes the address in any case', async () => {
    expect((await signIn('INES@Marram.Example')).status).toBe(200);
  });

  it.each([
    ['a wrong password', async () => signIn(user.email, 'wrong-password-here')],
    ['an unknown address', async () => signIn('nobody@marram.example')],
    [
      'a user who was deactivated',
      async () => signIn((await buildUser(app.deps.dataSource, { isActive: false })).email),
    ],
    [
      'a user who has not accepted the invitation',
      async () => signIn((await buildUser(app.deps.dataSource, { password: null })).email),
    ],
  ])('answers the same 401 BAD_CREDENTIALS to %s', async (_name, act) => {
    const response = await act();
    expect(errorOf(response)).toEqual({ status: 401, code: 'BAD_CREDENTIALS' });
    expect(response.body.error.message).toBe('E-mail address or password is wrong.');
    expect(response.headers['set-cookie']).toBeUndefined();
  });

  it('sets cookies that scripts of a page cannot read and other sites cannot use', async () => {
    const cookies = cookiesOf(await signIn());
    expect(cookies.overfold_access).toMatch(/; Path=\/; .*HttpOnly; SameSite=Strict$/);
    expect(cookies.overfold_renewal).toMatch(/; Path=\/api\/v1\/session; .*HttpOnly; SameSite=Strict$/);
  });

  it('binds the cookies to the host and to https where the public address is https', async () => {
    await app.close();
    await start({ config: { publicUrl: 'https://overfold.example' } });
    const cookies = cookiesOf(await signIn());
    expect(cookies['__Host-overfold_access']).toMatch(/; Path=\/; .*HttpOnly; Secure; SameSite=Strict$/);
    expect(cookies['__Secure-overfold_renewal']).toMatch(/; HttpOnly; Secure; SameSite=Strict$/);
  });

  it('stores no token, only hashes', async () => {
    const { body } = await signIn();
    const [row] = await app.deps.dataSource.query('select * from sessions');
    expect(JSON.stringify(row)).not.toContain(body.token);
    expect(JSON.stringify(row)).not.toContain(body.renewalToken);
  });
});

describe('limits of POST /session', () => {
  const from = (address: string, email: string, password: string) =>
    app.anonymous.post('/session').set('X-Forwarded-For', address).send({ email, password });

  it('answers 429 with Retry-After after ten wrong tries, and lets another address in', async () => {
    await app.close();
    await start({ config: { TRUST_PROXY_HOPS: 1 } });
    for (let i = 0; i < 10; i++) expect((await from('192.0.2.1', user.email, 'wrong-password')).status).toBe(401);
    const refused = await from('192.0.2.1', user.email, defaultPassword);
    expect(errorOf(refused)).toEqual({ status: 429, code: 'TOO_MANY_REQUESTS' });
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    expect((await from('198.51.100.7', user.email, defaultPassword)).status).toBe(200);
  });

  it('counts an IPv6 network as one address', async () => {
    await app.close();
    await start({ config: { TRUST_PROXY_HOPS: 1 } });
    for (let i = 0; i < 10; i++) await from(`2001:db8:1:2::${i + 1}`, user.email, 'wrong-password');
    expect((await from('2001:db8:1:2:ffff::1', user.email, defaultPassword)).status).toBe(429);
    expect((await from('2001:db8:1:3::1', user.email, defaultPassword)).status).toBe(200);
  });

  it('is not reset by a forged X-Forwarded-For', async () => {
    for (let i = 0; i < 10; i++) await from(`192.0.2.${i + 1}`, user.email, 'wrong-password');
    expect((await from('192.0.2.99', user.email, defaultPassword)).status).toBe(429);
  });

  it('does not count right tries', async () => {
    for (let i = 0; i < 12; i++) expect((await signIn()).status).toBe(200);
  });

  it('stops one address from trying many accounts', async () => {
    for (let i = 0; i < 50; i++) await signIn(`nobody${i}@marram.example`, 'wrong-password');
    expect(errorOf(await signIn())).toEqual({ status: 429, code: 'TOO_MANY_REQUESTS' });
  });
});

describe('GET /session', () => {
  it('answers the user and the end of the token', async () => {
    const response = await (await app.as(user)).get('/session');
    expect(response.status).toBe(200);
    expect(response.body.user).toMatchObject({ id: user.id, email: user.email, isAdmin: false, memberships: [] });
    expect(Date.parse(response.body.expiresAt)).toBeGreaterThan(Date.now());
  });

  it('answers 401 UNAUTHENTICATED to nobody', async () => {
    expect(errorOf(await app.anonymous.get('/session'))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
  });

  it.each(['Basic abc', 'Bearer', 'Bearer a b', 'Bearer <script>'])(
    'answers 401 to the header %j even with a good cookie',
    async (header) => {
      const cookie = cookieHeader(await signIn());
      const response = await supertest(app.app)
        .get('/api/v1/session')
        .set('Cookie', cookie)
        .set('Authorization', header);
      expect(errorOf(response)).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
      expect((await supertest(app.app).get('/api/v1/session').set('Cookie', cookie)).status).toBe(200);
    },
  );

  it('answers 401 SESSION_EXPIRED when the access token has run out', async () => {
    const { token } = await app.openSession(user);
    app.deps.clock.advance({ minutes: app.deps.config.ACCESS_TOKEN_MINUTES + 1 });
    expect(errorOf(await app.withToken(token).get('/session'))).toEqual({ status: 401, code: 'SESSION_EXPIRED' });
  });

  it('notes when a session was last used', async () => {
    const client = await app.as(user);
    app.deps.clock.advance({ minutes: 5 });
    await client.get('/session');
    const session = await app.deps.dataSource.manager.findOneByOrFail(Session, { userId: user.id });
    expect(session.lastUsedAt.getTime()).toBeGreaterThan(Date.now() + 4 * 60_000);
  });

  it('ends at once for a user who is deactivated', async () => {
    const client = await app.as(user);
    expect((await client.get('/session')).status).toBe(200);
    await app.deps.dataSource.query('update users set is_active = false where id = $1', [user.id]);
    expect(errorOf(await client.get('/session'))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
  });
});

describe('DELETE /session', () => {
  it('ends the session for its token and for its renewal', async () => {
    const { body } = await signIn();
    const client = app.withToken(body.token);
    expect((await client.delete('/session')).status).toBe(204);
    expect(errorOf(await client.get('/session'))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
    const renewal = await app.anonymous.post('/session/renewal').send({ renewalToken: body.renewalToken });
    expect(errorOf(renewal)).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
  });

  it('clears the cookies and leaves other sessions alone', async () => {
    const other = await app.as(user);
    const cookie = cookieHeader(await signIn());
    const response = await supertest(app.app)
      .delete('/api/v1/session')
      .set('Cookie', cookie)
      .set('X-Overfold-Client', 'web');
    expect(response.status).toBe(204);
    for (const line of Object.values(cookiesOf(response))) expect(line).toContain('Expires=Thu, 01 Jan 1970');
    expect((await other.get('/session')).status).toBe(200);
  });

  it('needs the client header when it comes by cookie', async () => {
    const cookie = cookieHeader(await signIn());
    const withCookie = () => supertest(app.app).delete('/api/v1/session').set('Cookie', cookie);
    expect(errorOf(await withCookie())).toEqual({ status: 403, code: 'CLIENT_HEADER_MISSING' });
    expect((await withCookie().set('X-Overfold-Client', 'web')).status).toBe(204);
  });
});

describe('POST /session/renewal', () => {
  const renew = (renewalToken: string) => app.anonymous.post('/session/renewal').send({ renewalToken });

  it('answers a new pair, of which the new renewal token renews again', async () => {
    const { renewalToken } = await app.openSession(user);
    const first = await renew(renewalToken);
    expect(first.status).toBe(200);
    expect(first.body.renewalToken).not.toBe(renewalToken);
    expect((await app.withToken(first.body.token).get('/session')).status).toBe(200);
    expect((await renew(first.body.renewalToken)).status).toBe(200);
  });

  it('takes the token from the cookie, with the client header', async () => {
    const cookie = cookieHeader(await signIn());
    const byCookie = () => supertest(app.app).post('/api/v1/session/renewal').set('Cookie', cookie);
    expect(errorOf(await byCookie())).toEqual({ status: 403, code: 'CLIENT_HEADER_MISSING' });
    const renewed = await byCookie().set('X-Overfold-Client', 'web');
    expect(renewed.status).toBe(200);
    expect(cookiesOf(renewed).overfold_renewal).toContain(renewed.body.renewalToken);
  });

  it('works when the access token has run out', async () => {
    const { renewalToken } = await app.openSession(user);
    app.deps.clock.advance({ hours: 2 });
    expect((await renew(renewalToken)).status).toBe(200);
  });

  it('gives two tabs that renew at the same moment the same successor, and both stay signed in', async () => {
    const { renewalToken } = await app.openSession(user);
    const answers = await Promise.all([renew(renewalToken), renew(renewalToken), renew(renewalToken)]);
    expect(answers.map(({ status }) => status)).toEqual([200, 200, 200]);
    expect(new Set(answers.map(({ body }) => body.renewalToken)).size).toBe(1);
    app.deps.clock.advance({ minutes: 10 });
    expect((await renew(answers[1]?.body.renewalToken)).status).toBe(200);
  });

  it('ends the session when a used token comes again after the grace', async () => {
    const { renewalToken, sessionId } = await app.openSession(user);
    const successor = await renew(renewalToken);
    expect(successor.status).toBe(200);
    app.deps.clock.advance({ seconds: 31 });
    expect(errorOf(await renew(renewalToken))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
    expect(errorOf(await renew(successor.body.renewalToken))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
    expect(errorOf(await app.withToken(successor.body.token).get('/session')).status).toBe(401);
    const entries = await app.deps.dataSource.manager.findBy(AuditEntry, { entityId: sessionId });
    expect(entries.map(({ action }) => action)).toEqual(['endedByReuse']);
  });

  it('ends the session when a token from further back comes again', async () => {
    const { renewalToken } = await app.openSession(user);
    const second = await renew(renewalToken);
    const third = await renew(second.body.renewalToken);
    expect(errorOf(await renew(renewalToken)).status).toBe(401);
    expect(errorOf(await renew(third.body.renewalToken)).status).toBe(401);
  });

  it.each([
    ['longer idle than allowed', { hours: 13 }],
    ['older than allowed', { days: 8 }],
  ])('answers 401 SESSION_EXPIRED for a session that is %s', async (_name, age) => {
    const { renewalToken } = await app.openSession(user);
    app.deps.clock.advance(age);
    expect(errorOf(await renew(renewalToken))).toEqual({ status: 401, code: 'SESSION_EXPIRED' });
  });

  it('ends at the absolute limit however often it was renewed', async () => {
    let { renewalToken } = await app.openSession(user);
    for (let halfDay = 0; halfDay < 14; halfDay++) {
      app.deps.clock.advance({ hours: 11 });
      const answer = await renew(renewalToken);
      expect(answer.status).toBe(200);
      renewalToken = answer.body.renewalToken;
    }
    app.deps.clock.advance({ hours: 11 });
    app.deps.clock.advance({ hours: 4 });
    expect(errorOf(await renew(renewalToken)).code).toBe('SESSION_EXPIRED');
  });

  it('takes neither an access token nor nothing', async () => {
    const { token } = await app.openSession(user);
    expect(errorOf(await renew(token)).status).toBe(400);
    expect(errorOf(await app.anonymous.post('/session/renewal'))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
  });

  it('is no access token itself', async () => {
    const { renewalToken } = await app.openSession(user);
    expect(errorOf(await app.withToken(renewalToken).get('/session')).status).toBe(401);
  });
});
