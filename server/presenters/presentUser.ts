import type { UserDto } from '../../shared/schemas/account.js';
import type { User } from '../entities/index.js';

export function presentUser(user: User): UserDto {
  return {
    id: user.id,
    email: user.email,
    name: user.name,
    isAdmin: user.isAdmin,
    isActive: user.isActive,
    hasPassword: user.passwordHash !== null,
    createdAt: user.createdAt.toISOString(),
    lastSeenAt: user.lastSeenAt?.toISOString() ?? null,
  };
}
