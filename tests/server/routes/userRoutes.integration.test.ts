import { randomUUID } from 'node:crypto';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry, MailMessage, User } from '../../../server/entities/index.js';
import { buildUser } from '../../support/factories/buildUser.js';
import { errorOf } from '../../support/errorOf.js';
import { linkTokenIn } from '../../support/linkTokenIn.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';

let app: TestApp;
let admin: User;
let client: TestClient;

beforeEach(async () => {
  app = await createTestApp();
  admin = await buildUser(app.deps.dataSource, { email: 'ove@marram.example', name: 'Ove Brandt', isAdmin: true });
  client = await app.as(admin);
});
afterEach(() => app.close());

const mails = () => app.deps.dataSource.manager.find(MailMessage, { order: { createdAt: 'ASC' } });
const invite = (body: object) => client.post('/users').send(body);
const reload = (id: string) => app.deps.dataSource.manager.findOneByOrFail(User, { id });

describe('POST /users', () => {
  it('creates a user without a password and sends an invitation that opens the account', async () => {
    const created = await invite({ email: 'Ines@Marram.example', name: ' Ines Corvane ' });
    expect(created.status).toBe(201);
    expect(created.body).toMatchObject({
      email: 'ines@marram.example',
      name: 'Ines Corvane',
      isAdmin: false,
      isActive: true,
      hasPassword: false,
      lastSeenAt: null,
    });
    const [mail] = await mails();
    expect(mail).toMatchObject({ kind: 'invitation', recipient: 'ines@marram.example' });
    const token = linkTokenIn(mail?.text ?? '', '/invitation/');
    const password = 'quiet-harbour-lantern-7';
    expect((await app.anonymous.post('/passwords').send({ token, password })).status).toBe(204);
    expect((await app.anonymous.post('/session').send({ email: 'ines@marram.example', password })).status).toBe(200);
  });

  it('answers 409 EMAIL_TAKEN for an address in use, whatever its case, and sends nothing', async () => {
    const response = await invite({ email: 'OVE@marram.example', name: 'Second Ove' });
    expect(errorOf(response)).toEqual({ status: 409, code: 'EMAIL_TAKEN' });
    expect(await mails()).toEqual([]);
  });

  it.each([
    ['two addresses', { email: 'b@x.example, c@y.example', name: 'B' }],
    ['a line break in the address', { email: 'b@x.example\r\nBcc: c@y.example', name: 'B' }],
    ['no name', { email: 'b@x.example', name: '  ' }],
    ['a name of 121 characters', { email: 'b@x.example', name: 'n'.repeat(121) }],
    ['a field that is not to be set', { email: 'b@x.example', name: 'B', passwordHash: 'x' }],
    ['an id', { email: 'b@x.example', name: 'B', id: randomUUID() }],
    ['a text where a truth value belongs', { email: 'b@x.example', name: 'B', isAdmin: 'true' }],
  ])('refuses %s', async (_name, body) => {
    expect(errorOf(await invite(body))).toEqual({ status: 400, code: 'INVALID_INPUT' });
    expect(await app.deps.dataSource.manager.count(User)).toBe(1);
  });

  it('keeps a line break in a name out of the subject and shows markup literally', async () => {
    await invite({ email: 'b@x.example', name: '<b>Bo</b>\r\nBcc: c@y.example' });
    const [mail] = await mails();
    expect(mail?.subject).toBe('Your invitation to Overfold');
    expect(mail?.html).toContain('&lt;b&gt;Bo&lt;/b&gt;');
  });
});

describe('POST /users/:userId/invitation', () => {
  it('sends another link, and after its use the first buys nothing', async () => {
    const { body: user } = await invite({ email: 'ines@marram.example', name: 'Ines' });
    expect((await client.post(`/users/${user.id}/invitation`)).status).toBe(202);
    const [first, second] = (await mails()).map(({ text }) => linkTokenIn(text, '/invitation/'));
    const password = 'quiet-harbour-lantern-7';
    expect((await app.anonymous.post('/passwords').send({ token: second, password })).status).toBe(204);
    expect(errorOf(await app.anonymous.post('/passwords').send({ token: first, password })).code).toBe('LINK_USED');
  });

  it('answers 409 ALREADY_ACCEPTED for a user with a password', async () => {
    const response = await client.post(`/users/${admin.id}/invitation`);
    expect(errorOf(response)).toEqual({ status: 409, code: 'ALREADY_ACCEPTED' });
  });

  it('answers 404 for an unknown user', async () => {
    expect(errorOf(await client.post(`/users/${randomUUID()}/invitation`))).toEqual({ status: 404, code: 'NOT_FOUND' });
  });

  it('takes an empty object as body and refuses anything in it', async () => {
    const { body: user } = await invite({ email: 'ines@marram.example', name: 'Ines' });
    expect((await client.post(`/users/${user.id}/invitation`).send({})).status).toBe(202);
    const response = await client.post(`/users/${user.id}/invitation`).send({ email: 'eve@evil.example' });
    expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
  });
});

describe('GET /users and GET /users/directory', () => {
  it('lists everybody by name, without hashes', async () => {
    await buildUser(app.deps.dataSource, { name: 'Abel', isActive: false });
    const response = await client.get('/users');
    expect(response.body.items.map(({ name }: { name: string }) => name)).toEqual(['Abel', 'Ove Brandt']);
    expect(response.text).not.toMatch(/\$2[aby]\$/);
  });

  it('finds active users by part of name or address, and takes wildcards literally', async () => {
    await buildUser(app.deps.dataSource, { name: 'Per 100% Cent', email: 'per@marram.example' });
    await buildUser(app.deps.dataSource, { name: 'Percival', isActive: false });
    const names = async (search: string): Promise<string[]> => {
      const response = await client.get(`/users/directory?search=${encodeURIComponent(search)}`);
      expect(response.status).toBe(200);
      return response.body.items.map(({ name }: { name: string }) => name);
    };
    expect(await names('PER')).toEqual(['Per 100% Cent']);
    expect(await names('marram')).toEqual(['Ove Brandt', 'Per 100% Cent']);
    expect(await names('%')).toEqual(['Per 100% Cent']);
    expect(await names('_')).toEqual([]);
    expect(await names("' or 1=1 --")).toEqual([]);
  });
});

describe('PATCH /users/:userId', () => {
  it('changes what is named and leaves the rest', async () => {
    const user = await buildUser(app.deps.dataSource, { name: 'Tomas' });
    const response = await client.patch(`/users/${user.id}`).send({ name: 'Tomas Helder' });
    expect(response.status).toBe(200);
    expect(response.body).toMatchObject({ name: 'Tomas Helder', email: user.email, isAdmin: false, isActive: true });
    const entry = await app.deps.dataSource.manager.findOneByOrFail(AuditEntry, { entityId: user.id });
    expect(entry).toMatchObject({ actorId: admin.id, actorName: 'Ove Brandt', action: 'updated' });
  });

  it('ends the sessions of a user whom it deactivates', async () => {
    const user = await buildUser(app.deps.dataSource);
    const session = await app.as(user);
    expect((await session.get('/session')).status).toBe(200);
    await client.patch(`/users/${user.id}`).send({ isActive: false });
    expect(errorOf(await session.get('/session')).status).toBe(401);
    await client.patch(`/users/${user.id}`).send({ isActive: true });
    expect(errorOf(await session.get('/session')).status).toBe(401);
  });

  it('takes the administrator role away at once', async () => {
    const second = await buildUser(app.deps.dataSource, { isAdmin: true });
    const session = await app.as(second);
    expect((await session.get('/users')).status).toBe(200);
    await client.patch(`/users/${second.id}`).send({ isAdmin: false });
    expect(errorOf(await session.get('/users'))).toEqual({ status: 403, code: 'FORBIDDEN' });
  });

  it.each([{ isAdmin: false }, { isActive: false }])(
    'answers 409 LAST_ADMIN to %j for the last one',
    async (change) => {
      const response = await client.patch(`/users/${admin.id}`).send(change);
      expect(errorOf(response)).toEqual({ status: 409, code: 'LAST_ADMIN' });
      expect(await reload(admin.id)).toMatchObject({ isAdmin: true, isActive: true });
    },
  );

  it('keeps one administrator when two remove each other at the same moment', async () => {
    const second = await buildUser(app.deps.dataSource, { isAdmin: true });
    const other = await app.as(second);
    const answers = await Promise.all([
      client.patch(`/users/${second.id}`).send({ isAdmin: false }),
      other.patch(`/users/${admin.id}`).send({ isAdmin: false }),
    ]);
    const left = await app.deps.dataSource.manager.countBy(User, { isAdmin: true });
    expect(left).toBe(1);
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
  });

  it.each(['email', 'passwordHash', 'id', 'createdAt', 'lastSeenAt'])('refuses to set %s', async (field) => {
    const before = await reload(admin.id);
    const response = await client.patch(`/users/${admin.id}`).send({ name: 'Changed', [field]: 'x' });
    expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
    expect(await reload(admin.id)).toEqual(before);
  });

  it('answers 404 for an unknown user', async () => {
    expect(errorOf(await client.patch(`/users/${randomUUID()}`).send({ name: 'X' })).status).toBe(404);
  });
});
