import type { MemberDto } from '../../shared/schemas/project.js';
import type { Membership } from '../entities/index.js';

/** @param membership with its user loaded */
export function presentMember({ user, roles }: Membership): MemberDto {
  return { userId: user.id, name: user.name, email: user.email, isActive: user.isActive, roles };
}
