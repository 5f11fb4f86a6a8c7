import { randomUUID } from 'node:crypto';
import { writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { Test } from 'supertest';
import { projectRoles } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../../server/AppDependencies.js';
import { Batch, Capture, MailMessage, type User } from '../../server/entities/index.js';
import { queueMail } from '../../server/mailbox/queueMail.js';
import { newStorageKey } from '../../server/storage/newStorageKey.js';
import type { Asker, MatrixFixture, MatrixRow } from '../server/authorizationMatrix.js';
import { buildMember } from './factories/buildMember.js';
import { buildProject } from './factories/buildProject.js';
import { buildUser } from './factories/buildUser.js';
import type { TestClient } from './testApp.js';

export type MatrixUsers = Record<Exclude<Asker, 'nobody'>, User>;

async function storeFile(deps: AppDependencies): Promise<string> {
  const key = newStorageKey();
  const temporaryPath = path.join(deps.storage.temporaryDir, randomUUID());
  await deps.storage.check();
  await writeFile(temporaryPath, 'time;value\n0;1\n');
  await deps.storage.save(key, temporaryPath);
  return key;
}

async function buildCaptures(deps: AppDependencies, projectId: string, createdById: string) {
  const { manager } = deps.dataSource;
  const batch = await manager.save(manager.create(Batch, { projectId, name: 'Hall 1', createdById }));
  const common = { batchId: batch.id, projectId, format: 'csv', sizeBytes: 15, sha256: '0'.repeat(64) } as const;
  const screened = await manager.save(
    manager.create(Capture, {
      ...common,
      fileName: 'screened.csv',
      storageKey: await storeFile(deps),
      state: 'screened',
      verdict: 'clear',
      screenedAt: new Date(),
    }),
  );
  const failed = await manager.save(
    manager.create(Capture, {
      ...common,
      fileName: 'failed.csv',
      storageKey: newStorageKey(),
      state: 'failed',
      failureCode: 'RAGGED',
      failureMessage: 'Line 3 has too few columns.',
    }),
  );
  return { batchId: batch.id, screenedCaptureId: screened.id, failedCaptureId: failed.id };
}

async function buildFailedMail(deps: AppDependencies): Promise<string> {
  const { manager } = deps.dataSource;
  const dedupeKey = randomUUID();
  await queueMail(manager, {
    dedupeKey,
    kind: 'invitation',
    recipient: 'a@x.example',
    subject: 'S',
    text: 'T',
    html: 'H',
  });
  await manager.update(MailMessage, { dedupeKey }, { state: 'failed' });
  return (await manager.findOneByOrFail(MailMessage, { dedupeKey })).id;
}

/** Two projects, a user for each asker, and one of everything that the rows of the matrix speak of. */
export async function buildMatrixFixture(
  deps: AppDependencies,
): Promise<{ users: MatrixUsers; fixture: MatrixFixture }> {
  const { dataSource } = deps;
  const project = await buildProject(dataSource);
  const foreign = await buildProject(dataSource);
  const users: MatrixUsers = {
    stranger: await buildUser(dataSource),
    foreign: await buildMember(dataSource, foreign.id, [...projectRoles]),
    analyst: await buildMember(dataSource, project.id, ['analyst']),
    reviewer: await buildMember(dataSource, project.id, ['reviewer']),
    qaManager: await buildMember(dataSource, project.id, ['qaManager']),
    admin: await buildUser(dataSource, { isAdmin: true }),
  };
  const fixture = {
    projectId: project.id,
    ...(await buildCaptures(deps, project.id, users.analyst.id)),
    analystId: users.analyst.id,
    otherUserId: (await buildUser(dataSource)).id,
    invitedUserId: (await buildUser(dataSource, { password: null })).id,
    failedMailId: await buildFailedMail(deps),
  };
  return { users, fixture };
}

/** One request of the matrix, by whoever the client is signed in as. */
export function sendMatrixRow(client: TestClient, row: MatrixRow, fixture: MatrixFixture): Test {
  let test = client[row.method](row.url(fixture));
  for (const [name, content] of Object.entries(row.files ?? {}))
    test = test.attach('files', Buffer.from(content), name);
  return row.files ? test : test.send(row.body);
}
