import type { EntityManager } from 'typeorm';
import { IsNull, MoreThan } from 'typeorm';
import { OneTimeLink, type User } from '../entities/index.js';
import type { OneTimeLinkKind } from '../entities/OneTimeLink.js';
import { GoneError } from '../errors/index.js';
import { hashSecret, randomSecret } from '../security/secretTokens.js';

export const invitationDaysValid = 7;
export const resetMinutesValid = 60;

const lifetimesMs: Record<OneTimeLinkKind, number> = {
  invitation: invitationDaysValid * 86_400_000,
  passwordReset: resetMinutesValid * 60_000,
};
const pagePaths: Record<OneTimeLinkKind, string> = { invitation: '/invitation/', passwordReset: '/reset/' };

/** Makes a link; only the hash of its token is stored, so the address is known here and never again. */
export async function createOneTimeLink(
  manager: EntityManager,
  { user, kind, publicUrl, at }: { user: Pick<User, 'id'>; kind: OneTimeLinkKind; publicUrl: string; at: Date },
): Promise<{ linkId: string; url: string }> {
  const token = randomSecret();
  const link = await manager.save(
    OneTimeLink,
    manager.create(OneTimeLink, {
      userId: user.id,
      kind,
      tokenHash: hashSecret(token),
      expiresAt: new Date(at.getTime() + lifetimesMs[kind]),
      usedAt: null,
    }),
  );
  return { linkId: link.id, url: `${publicUrl}${pagePaths[kind]}${token}` };
}

/**
 * The link a token belongs to, with its user. @param lock holds the row until the transaction ends
 * @throws GoneError saying why the link buys nothing any more
 */
export async function findUsableLink(
  manager: EntityManager,
  token: string,
  at: Date,
  { lock = false }: { lock?: boolean } = {},
): Promise<OneTimeLink> {
  const tokenHash = hashSecret(token);
  if (lock) {
    await manager.findOne(OneTimeLink, { where: { tokenHash }, lock: { mode: 'pessimistic_write' } });
  }
  const link = await manager.findOne(OneTimeLink, { where: { tokenHash }, relations: { user: true } });
  if (!link || !link.user.isActive) {
    throw new GoneError('LINK_UNKNOWN', 'This link is not valid. Ask for a new one.');
  }
  if (link.usedAt) {
    throw new GoneError('LINK_USED', 'This link has been used already. Sign in, or ask for a new password.');
  }
  if (link.expiresAt <= at) throw new GoneError('LINK_EXPIRED', 'This link has expired. Ask for a new one.');
  return link;
}

/** A new password makes every link of the user that is still open worthless. */
export async function closeOpenLinks(manager: EntityManager, userId: string, at: Date): Promise<void> {
  await manager.update(OneTimeLink, { userId, usedAt: IsNull(), expiresAt: MoreThan(at) }, { usedAt: at });
}
