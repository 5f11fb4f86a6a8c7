import type { DataSource } from 'typeorm';
import type { ProjectRole } from '../../../shared/schemas/account.js';
import { Membership, type User } from '../../../server/entities/index.js';
import { buildUser, type UserOverrides } from './buildUser.js';

/** A new user who is a member of the project. */
export async function buildMember(
  dataSource: DataSource,
  projectId: string,
  roles: ProjectRole[],
  overrides: UserOverrides = {},
): Promise<User> {
  const user = await buildUser(dataSource, overrides);
  await dataSource.manager.insert(Membership, { projectId, userId: user.id, roles });
  return user;
}
