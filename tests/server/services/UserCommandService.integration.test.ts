import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry, User } from '../../../server/entities/index.js';
import { UserCommandService } from '../../../server/services/UserCommandService.js';
import { buildUser } from '../../support/factories/buildUser.js';
import { errorOf } from '../../support/errorOf.js';
import { linkTokenIn } from '../../support/linkTokenIn.js';
import { createTestApp, type TestApp } from '../../support/testApp.js';

const email = 'ove@marram.example';
const password = 'marsh-lantern-key-74';
let app: TestApp;
let service: UserCommandService;

beforeEach(async () => {
  app = await createTestApp();
  service = new UserCommandService(app.deps);
});
afterEach(() => app.close());

const signIn = () => app.anonymous.post('/session').send({ email, password });

describe('UserCommandService', () => {
  it('finds no user on a new installation', async () => {
    expect(await service.list()).toEqual([]);
  });

  it('adds an administrator who signs in with the password given', async () => {
    await service.addWithPassword({ email, name: 'Ove', isAdmin: true }, password);
    const response = await signIn();
    expect(response.status).toBe(200);
    expect(response.body.user.isAdmin).toBe(true);
    const entry = await app.deps.dataSource.manager.findOneByOrFail(AuditEntry, { entityType: 'user' });
    expect(entry).toMatchObject({ action: 'added', actorId: null });
  });

  it('adds a user who chooses a password at the address given', async () => {
    const url = await service.addWithInvitation({ email, name: 'Ove', isAdmin: false });
    expect(url.startsWith(`${app.deps.config.publicUrl}/invitation/`)).toBe(true);
    const token = linkTokenIn(url, '/invitation/');
    expect((await app.anonymous.post('/passwords').send({ token, password })).status).toBe(204);
    expect((await signIn()).status).toBe(200);
  });

  it('makes invitations that end after seven days', async () => {
    const token = linkTokenIn(await service.addWithInvitation({ email, name: 'Ove', isAdmin: false }), '/invitation/');
    app.deps.clock.advance({ days: 7, minutes: 1 });
    expect(errorOf(await app.anonymous.post('/passwords').send({ token, password }))).toEqual({
      status: 410,
      code: 'LINK_EXPIRED',
    });
  });

  it.each([
    ['short', 'INVALID_INPUT'],
    ['password123', 'PASSWORD_TOO_COMMON'],
  ])('refuses the password %s and adds nobody', async (weak, code) => {
    await expect(service.addWithPassword({ email, name: 'Ove', isAdmin: true }, weak)).rejects.toMatchObject({ code });
    expect(await app.deps.dataSource.manager.count(User)).toBe(0);
  });

  it('refuses an address in use', async () => {
    await buildUser(app.deps.dataSource, { email });
    await expect(service.addWithInvitation({ email, name: 'Ove', isAdmin: false })).rejects.toMatchObject({
      code: 'EMAIL_TAKEN',
    });
  });

  it('deactivates a user and ends their sessions', async () => {
    const client = await app.as(await buildUser(app.deps.dataSource, { email }));
    expect((await client.get('/session')).status).toBe(200);
    await service.deactivate(email);
    expect(errorOf(await client.get('/session')).status).toBe(401);
    await expect(service.deactivate('nobody@marram.example')).rejects.toMatchObject({ code: 'NOT_FOUND' });
  });
});
