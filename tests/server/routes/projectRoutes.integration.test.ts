import { randomUUID } from 'node:crypto';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { AuditEntry, Membership, Project, ThresholdsVersion, type User } from '../../../server/entities/index.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { buildUser } from '../../support/factories/buildUser.js';
import { errorOf } from '../../support/errorOf.js';
import { createTestApp, type TestApp, type TestClient } from '../../support/testApp.js';

let app: TestApp;
let admin: User;
let adminClient: TestClient;
let project: Project;
let analyst: User;
let analystClient: TestClient;

beforeEach(async () => {
  app = await createTestApp();
  const { dataSource } = app.deps;
  admin = await buildUser(dataSource, { isAdmin: true, name: 'Ove Brandt' });
  adminClient = await app.as(admin);
  project = await buildProject(dataSource, { name: 'Ferrow Quay' });
  analyst = await buildMember(dataSource, project.id, ['analyst'], { name: 'Ines Corvane' });
  analystClient = await app.as(analyst);
});
afterEach(() => app.close());

const audit = () =>
  app.deps.dataSource.manager.find(AuditEntry, { where: { entityType: 'project' }, order: { createdAt: 'ASC' } });

describe('GET /projects', () => {
  it('lists the own projects with the own roles, and nothing of others', async () => {
    const foreign = await buildProject(app.deps.dataSource);
    const response = await analystClient.get('/projects');
    expect(response.status).toBe(200);
    expect(response.body.items).toEqual([
      expect.objectContaining({
        id: project.id,
        name: 'Ferrow Quay',
        roles: ['analyst'],
        counts: { batches: 0, captures: 0, awaitingReview: 0 },
      }),
    ]);
    expect(response.text).not.toContain(foreign.id);
  });

  it('lists all projects to an administrator, with no roles where they are no member', async () => {
    await buildProject(app.deps.dataSource, { name: 'Another' });
    const { body } = await adminClient.get('/projects');
    expect(body.items.map(({ name, roles }: { name: string; roles: string[] }) => [name, roles])).toEqual([
      ['Another', []],
      ['Ferrow Quay', []],
    ]);
  });

  it('lists nothing to a user without membership', async () => {
    const stranger = await app.as(await buildUser(app.deps.dataSource));
    expect((await stranger.get('/projects')).body).toEqual({ items: [] });
  });
});

describe('POST /projects', () => {
  it('creates a project with its creator as member with all roles and the default thresholds', async () => {
    const created = await adminClient.post('/projects').send({ name: ' Pump halls ', description: 'Stage 2' });
    expect(created.status).toBe(201);
    expect(created.body).toMatchObject({
      name: 'Pump halls',
      description: 'Stage 2',
      isArchived: false,
      roles: ['analyst', 'reviewer', 'qaManager'],
    });
    const thresholds = await adminClient.get(`/projects/${created.body.id}/thresholds`);
    expect(thresholds.body.current).toMatchObject({ version: 1, values: defaultThresholds });
    expect((await audit()).at(-1)).toMatchObject({ action: 'created', projectId: created.body.id, actorId: admin.id });
  });

  it('answers 409 PROJECT_NAME_TAKEN and leaves nothing half made', async () => {
    const response = await adminClient.post('/projects').send({ name: 'Ferrow Quay' });
    expect(errorOf(response)).toEqual({ status: 409, code: 'PROJECT_NAME_TAKEN' });
    expect(await app.deps.dataSource.manager.count(Project)).toBe(1);
    expect(await app.deps.dataSource.manager.count(ThresholdsVersion)).toBe(1);
  });

  it.each(['id', 'isArchived', 'roles', 'createdAt'])('refuses to set %s', async (field) => {
    const response = await adminClient.post('/projects').send({ name: 'Pump halls', [field]: 'x' });
    expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
    expect(response.body.error.details).toEqual([
      { path: `body.${field}`, message: 'This name is not known here. Leave it out.' },
    ]);
  });
});

describe('PATCH /projects/:projectId', () => {
  it('changes what is named and leaves the rest', async () => {
    const response = await adminClient.patch(`/projects/${project.id}`).send({ isArchived: true });
    expect(response.status).toBe(200);
    expect(response.body).toMatchObject({ name: 'Ferrow Quay', isArchived: true });
    expect((await audit()).at(-1)).toMatchObject({
      action: 'updated',
      details: { before: { isArchived: false }, after: { isArchived: true } },
    });
  });

  it('answers 409 when the new name belongs to another project, and takes the own name again', async () => {
    await buildProject(app.deps.dataSource, { name: 'Pump halls' });
    const change = (name: string) => adminClient.patch(`/projects/${project.id}`).send({ name });
    expect(errorOf(await change('Pump halls'))).toEqual({ status: 409, code: 'PROJECT_NAME_TAKEN' });
    expect((await change('Ferrow Quay')).status).toBe(200);
  });
});

describe('members of a project', () => {
  const put = (userId: string, roles: unknown, client = adminClient) =>
    client.put(`/projects/${project.id}/members/${userId}`).send({ roles });

  it('lists members by name with their roles', async () => {
    await buildMember(app.deps.dataSource, project.id, ['reviewer', 'qaManager'], { name: 'Abel' });
    const { body } = await analystClient.get(`/projects/${project.id}/members`);
    expect(body.items.map(({ name, roles }: { name: string; roles: string[] }) => [name, roles])).toEqual([
      ['Abel', ['reviewer', 'qaManager']],
      ['Ines Corvane', ['analyst']],
    ]);
  });

  it('adds a member who can read the project on the next request', async () => {
    const user = await buildUser(app.deps.dataSource, { name: 'Tomas' });
    const client = await app.as(user);
    expect(errorOf(await client.get(`/projects/${project.id}`)).status).toBe(404);
    const added = await put(user.id, ['reviewer', 'reviewer']);
    expect(added.status).toBe(200);
    expect(added.body).toMatchObject({ userId: user.id, name: 'Tomas', roles: ['reviewer'], isActive: true });
    expect((await client.get(`/projects/${project.id}`)).body.roles).toEqual(['reviewer']);
  });

  it('replaces the roles of a member', async () => {
    await put(analyst.id, ['qaManager']);
    expect((await analystClient.get(`/projects/${project.id}`)).body.roles).toEqual(['qaManager']);
    expect((await audit()).at(-1)).toMatchObject({
      action: 'changedMember',
      details: { userId: analyst.id, before: ['analyst'], after: ['qaManager'] },
    });
  });

  it('removes a member, who learns nothing of the project from then on', async () => {
    const path = `/projects/${project.id}/members/${analyst.id}`;
    expect((await adminClient.delete(path)).status).toBe(204);
    expect(errorOf(await analystClient.get(`/projects/${project.id}`)).status).toBe(404);
    expect(errorOf(await adminClient.delete(path))).toEqual({ status: 404, code: 'NOT_FOUND' });
  });

  it('leaves one membership when two administrators add the same user at once', async () => {
    const user = await buildUser(app.deps.dataSource);
    const answers = await Promise.all([put(user.id, ['analyst']), put(user.id, ['reviewer'])]);
    expect(answers.map(({ status }) => status)).toEqual([200, 200]);
    expect(await app.deps.dataSource.manager.countBy(Membership, { userId: user.id })).toBe(1);
  });

  it.each([
    ['no role', []],
    ['an unknown role', ['owner']],
    ['four roles', ['analyst', 'reviewer', 'qaManager', 'analyst']],
    ['a text', 'analyst'],
  ])('refuses %s', async (_name, roles) => {
    expect(errorOf(await put(analyst.id, roles))).toEqual({ status: 400, code: 'INVALID_INPUT' });
  });

  it('answers 404 for an unknown user and 409 for one who is not active', async () => {
    expect(errorOf(await put(randomUUID(), ['analyst']))).toEqual({ status: 404, code: 'NOT_FOUND' });
    const inactive = await buildUser(app.deps.dataSource, { isActive: false });
    expect(errorOf(await put(inactive.id, ['analyst']))).toEqual({ status: 409, code: 'USER_INACTIVE' });
  });
});

describe('thresholds of a project', () => {
  const path = () => `/projects/${project.id}/thresholds`;
  const put = (body: object) => adminClient.put(path()).send(body);

  it('adds a version with its reason and author, and keeps the ones before', async () => {
    const values = { ...defaultThresholds, requiredProtectionDb: 50 };
    const response = await put({ values, reason: 'Stricter for stage 2' });
    expect(response.status).toBe(200);
    expect(response.body.current).toMatchObject({
      version: 2,
      values,
      reason: 'Stricter for stage 2',
      authorName: 'Ove Brandt',
    });
    expect(response.body.history.map(({ version }: { version: number }) => version)).toEqual([2, 1]);
    expect((await analystClient.get(path())).body).toEqual(response.body);
  });

  it('takes bare values from scripts, and keeps those that are left out', async () => {
    await put({ values: { requiredProtectionDb: 50 }, reason: 'Stricter' });
    const response = await put({ guardStart: 0.85 });
    expect(response.body.current).toMatchObject({
      version: 3,
      reason: 'changed through the API',
      values: { ...defaultThresholds, requiredProtectionDb: 50, guardStart: 0.85 },
    });
  });

  it.each([
    ['a value out of range', { values: { guardStart: 5 }, reason: 'Too much' }, 'body.values.guardStart'],
    ['a bare value out of range', { guardStart: 5 }, 'body.guardStart'],
    ['a text for a number', { values: { minSkirtDb: '20' }, reason: 'As text' }, 'body.values.minSkirtDb'],
    ['a missing value', { values: { minSkirtDb: null }, reason: 'As null' }, 'body.values.minSkirtDb'],
    ['an unknown threshold', { values: { loudness: 3 }, reason: 'Unknown' }, 'body.values.loudness'],
    ['values without a reason', { values: { minSkirtDb: 21 } }, 'body.reason'],
    ['bare values beside the others', { values: {}, reason: 'Mixed', minSkirtDb: 21 }, 'body.minSkirtDb'],
    ['nothing at all', {}, 'body.values'],
    ['a reason of two letters', { values: {}, reason: 'no' }, 'body.reason'],
  ])('refuses %s and says where', async (_name, body, where) => {
    const response = await put(body);
    expect(errorOf(response)).toEqual({ status: 400, code: 'INVALID_INPUT' });
    expect(response.body.error.details.map(({ path: at }: { path: string }) => at)).toContain(where);
    expect(await app.deps.dataSource.manager.count(ThresholdsVersion)).toBe(1);
  });

  it('numbers the versions of two changes at the same moment one after the other, without losing either', async () => {
    await Promise.all([put({ guardStart: 0.7 }), put({ minSkirtDb: 33 })]);
    const { body } = await adminClient.get(path());
    expect(body.history.map(({ version }: { version: number }) => version)).toEqual([3, 2, 1]);
    expect(body.current.values).toMatchObject({ guardStart: 0.7, minSkirtDb: 33 });
  });

  it('fills in the default where a stored version lacks a threshold that came later', async () => {
    await app.deps.dataSource.query(`update thresholds_versions set values = values - 'minDurationS'`);
    const response = await analystClient.get(path());
    expect(response.body.current.values.minDurationS).toBe(defaultThresholds.minDurationS);
  });
});
