import { randomUUID } from 'node:crypto';
import type { DataSource } from 'typeorm';
import { User } from '../../../server/entities/index.js';
import { PasswordHasher } from '../../../server/security/PasswordHasher.js';

export interface UserOverrides {
  email?: string;
  name?: string;
  isAdmin?: boolean;
  isActive?: boolean;
  /** Null: invited, not accepted. */
  password?: string | null;
}

export const defaultPassword = 'amber-otter-ladder-19';

/** A stored user who can sign in with `defaultPassword`. */
export async function buildUser(dataSource: DataSource, overrides: UserOverrides = {}): Promise<User> {
  const { password = defaultPassword, ...rest } = overrides;
  const passwordHash = password === null ? null : await new PasswordHasher(4).hash(password);
  const mark = randomUUID().slice(0, 8);
  return dataSource.manager.save(
    User,
    dataSource.manager.create(User, {
      email: `user-${mark}@marram.example`,
      name: `User ${mark}`,
      ...rest,
      passwordHash,
    }),
  );
}
