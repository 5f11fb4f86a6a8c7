import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { MailMessage, OneTimeLink, User } from '../../../server/entities/index.js';
import { buildUser, defaultPassword } from '../../support/factories/buildUser.js';
import { errorOf } from '../../support/errorOf.js';
import { linkTokenIn } from '../../support/linkTokenIn.js';
import { createTestApp, type TestApp } from '../../support/testApp.js';

const newPassword = 'quiet-harbour-lantern-7';
let app: TestApp;
let user: User;

beforeEach(async () => {
  app = await createTestApp();
  user = await buildUser(app.deps.dataSource, { email: 'ines@marram.example', name: 'Ines' });
});
afterEach(() => app.close());

const mails = () => app.deps.dataSource.manager.find(MailMessage, { order: { createdAt: 'ASC' } });
const requestReset = (email: string) => app.anonymous.post('/passwords/reset-request').send({ email });
const setPassword = (token: string, password = newPassword) =>
  app.anonymous.post('/passwords').send({ token, password });
const signIn = (password: string) => app.anonymous.post('/session').send({ email: user.email, password });

async function resetToken(): Promise<string> {
  await requestReset(user.email);
  return linkTokenIn((await mails()).at(-1)?.text ?? '', '/reset/');
}

describe('POST /passwords/reset-request', () => {
  it('answers 202 and queues one mail with a link to the address of the account', async () => {
    expect((await requestReset('INES@marram.example')).status).toBe(202);
    const [mail, ...others] = await mails();
    expect(others).toEqual([]);
    expect(mail).toMatchObject({ kind: 'passwordReset', recipient: 'ines@marram.example', state: 'pending' });
    expect(mail?.text).toContain(`${app.deps.config.publicUrl}/reset/`);
    expect(mail?.messageId).toMatch(/^<[0-9a-f-]{36}@overfold>$/);
  });

  it.each([
    ['an unknown address', async () => 'nobody@marram.example'],
    ['a deactivated user', async () => (await buildUser(app.deps.dataSource, { isActive: false })).email],
  ])('answers 202 in the same way to %s and queues nothing', async (_name, address) => {
    const response = await requestReset(await address());
    expect({ status: response.status, text: response.text }).toEqual({ status: 202, text: '' });
    expect(await mails()).toEqual([]);
  });

  it('refuses two addresses in one', async () => {
    expect(errorOf(await requestReset('ines@marram.example, eve@evil.example')).status).toBe(400);
    expect(await mails()).toEqual([]);
  });

  it('answers 429 after five requests for one address, and still serves another', async () => {
    for (let i = 0; i < 5; i++) expect((await requestReset(user.email)).status).toBe(202);
    expect(errorOf(await requestReset(user.email))).toEqual({ status: 429, code: 'TOO_MANY_REQUESTS' });
    expect((await requestReset('other@marram.example')).status).toBe(202);
  });
});

describe('POST /passwords', () => {
  it('sets the password once, and ends the sessions opened with the old one', async () => {
    const session = await app.as(user);
    const token = await resetToken();
    expect((await setPassword(token)).status).toBe(204);
    expect((await signIn(newPassword)).status).toBe(200);
    expect(errorOf(await signIn(defaultPassword)).code).toBe('BAD_CREDENTIALS');
    expect(errorOf(await session.get('/session')).status).toBe(401);
  });

  it('answers 410 LINK_USED the second time', async () => {
    const token = await resetToken();
    await setPassword(token);
    expect(errorOf(await setPassword(token, 'another-good-password-3'))).toEqual({ status: 410, code: 'LINK_USED' });
    expect((await signIn(newPassword)).status).toBe(200);
  });

  it('gives one of two requests at the same moment the password', async () => {
    const token = await resetToken();
    const answers = await Promise.all([setPassword(token), setPassword(token, 'another-good-password-3')]);
    expect(answers.map(({ status }) => status).sort()).toEqual([204, 410]);
  });

  it('answers 410 LINK_EXPIRED an hour after the request', async () => {
    const token = await resetToken();
    app.deps.clock.advance({ minutes: 61 });
    expect(errorOf(await setPassword(token))).toEqual({ status: 410, code: 'LINK_EXPIRED' });
  });

  it('makes older open links worthless', async () => {
    const older = await resetToken();
    const newer = await resetToken();
    expect((await setPassword(newer)).status).toBe(204);
    expect(errorOf(await setPassword(older))).toEqual({ status: 410, code: 'LINK_USED' });
  });

  it.each([
    ['a token that was never given out', async () => 'x'.repeat(43), 410, 'LINK_UNKNOWN'],
    ['an access token', async () => (await app.openSession(user)).token, 400, 'INVALID_INPUT'],
    ['a renewal token', async () => (await app.openSession(user)).renewalToken, 410, 'LINK_UNKNOWN'],
  ])('refuses %s', async (_name, make, status, code) => {
    expect(errorOf(await setPassword(await make()))).toEqual({ status, code });
  });

  it('refuses the link of a user who was deactivated meanwhile', async () => {
    const token = await resetToken();
    await app.deps.dataSource.manager.update(User, { id: user.id }, { isActive: false });
    expect(errorOf(await setPassword(token)).code).toBe('LINK_UNKNOWN');
  });

  it.each([
    ['9 characters', 'kT9#vq2!L', 'INVALID_INPUT'],
    ['201 characters', 'aB3-'.repeat(50) + 'x', 'INVALID_INPUT'],
    ['one of the commonest', 'password123', 'PASSWORD_TOO_COMMON'],
    ['the own address', 'ines@marram.example', 'PASSWORD_TOO_COMMON'],
  ])('refuses a password of %s and leaves the link usable', async (_name, password, code) => {
    const token = await resetToken();
    const response = await setPassword(token, password);
    expect(errorOf(response)).toEqual({ status: 400, code });
    expect(response.body.error.details[0].path).toBe('body.password');
    expect((await setPassword(token)).status).toBe(204);
  });

  it.each([
    ['200 characters', `${'correct-pony-'.repeat(15)}12345`],
    ['other scripts', '振動計測の記録帳と鉛筆'],
    ['spaces at both ends', ' quiet harbour lantern '],
  ])('takes a password of %s as it is', async (_name, password) => {
    await setPassword(await resetToken(), password);
    expect((await signIn(password)).status).toBe(200);
    expect((await signIn(password.trim().slice(0, -1))).status).toBe(401);
  });

  it('stores only the hash of the token', async () => {
    const token = await resetToken();
    const link = await app.deps.dataSource.manager.findOneByOrFail(OneTimeLink, { userId: user.id });
    expect(JSON.stringify(link)).not.toContain(token);
  });
});

describe('PUT /me/password', () => {
  const change = async (client: Awaited<ReturnType<TestApp['as']>>, currentPassword: string, next = newPassword) =>
    client.put('/me/password').send({ currentPassword, newPassword: next });

  it('changes the password, ends the other sessions and keeps this one', async () => {
    const here = await app.as(user);
    const elsewhere = await app.as(user);
    expect((await change(here, defaultPassword)).status).toBe(204);
    expect((await here.get('/session')).status).toBe(200);
    expect(errorOf(await elsewhere.get('/session')).status).toBe(401);
    expect((await signIn(newPassword)).status).toBe(200);
  });

  it('answers 422 WRONG_PASSWORD without the current one', async () => {
    const response = await change(await app.as(user), 'wrong-password-here');
    expect(errorOf(response)).toEqual({ status: 422, code: 'WRONG_PASSWORD' });
    expect(response.body.error.details[0].path).toBe('body.currentPassword');
    expect((await signIn(defaultPassword)).status).toBe(200);
  });

  it('answers 429 after ten wrong tries', async () => {
    const client = await app.as(user);
    for (let i = 0; i < 10; i++) expect((await change(client, 'wrong-password-here')).status).toBe(422);
    expect(errorOf(await change(client, defaultPassword))).toEqual({ status: 429, code: 'TOO_MANY_REQUESTS' });
  });

  it('refuses a common new password', async () => {
    const response = await change(await app.as(user), defaultPassword, 'qwertyuiop123');
    expect(errorOf(response)).toEqual({ status: 400, code: 'PASSWORD_TOO_COMMON' });
  });
});
