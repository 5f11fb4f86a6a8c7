import { randomUUID } from 'node:crypto';
import { LessThan, type EntityManager } from 'typeorm';
import type { SignIn } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { Session, User } from '../entities/index.js';
import { UnauthenticatedError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { findLiveSession } from '../repositories/sessionRepository.js';
import { AccessTokens } from '../security/AccessTokens.js';
import { RenewalTokens } from '../security/RenewalTokens.js';
import { hashSecret } from '../security/secretTokens.js';
import { addAuditEntry } from './audit.js';

/** How long the token before still renews: two tabs ask at the same moment, or an answer got lost. */
const renewalGraceMs = 30_000;

export interface IssuedSession {
  actor: Actor;
  token: string;
  expiresAt: Date;
  renewalToken: string;
  sessionExpiresAt: Date;
}

type Renewal = { session: Session; renewalToken: string } | 'missing' | 'expired' | 'reused';

export class SessionService {
  private readonly accessTokens: AccessTokens;
  private readonly renewalTokens: RenewalTokens;

  constructor(private readonly deps: Pick<AppDependencies, 'config' | 'dataSource' | 'logger' | 'now' | 'passwords'>) {
    const { config, now } = deps;
    this.accessTokens = new AccessTokens(config.JWT_SECRET, config.ACCESS_TOKEN_MINUTES, now);
    this.renewalTokens = new RenewalTokens(config.JWT_SECRET);
  }

  /** @throws UnauthenticatedError, the same one and after the same time for every reason */
  async signIn({ email, password }: SignIn): Promise<IssuedSession> {
    const { dataSource, config, logger, now } = this.deps;
    const user = await dataSource.manager.findOneBy(User, { email });
    const isRight = await this.deps.passwords.matches(password, user?.isActive ? user.passwordHash : null);
    if (!user || !isRight) {
      logger.warn({ userId: user?.id, event: 'signInRefused' }, 'sign-in refused');
      throw new UnauthenticatedError('BAD_CREDENTIALS', 'E-mail address or password is wrong.');
    }
    return dataSource.transaction(async (manager) => {
      const id = randomUUID();
      const at = now();
      const renewalToken = this.renewalTokens.first(id);
      const session = manager.create(Session, {
        id,
        userId: user.id,
        renewalHash: hashSecret(renewalToken),
        previousRenewalHash: null,
        rotatedAt: null,
        lastUsedAt: at,
        expiresAt: new Date(at.getTime() + config.SESSION_ABSOLUTE_DAYS * 86_400_000),
        revokedAt: null,
      });
      // Nobody can use these any more; without this the table would only grow.
      await manager.delete(Session, { userId: user.id, expiresAt: LessThan(at) });
      await manager.insert(Session, session);
      await manager.update(User, { id: user.id }, { lastSeenAt: at });
      await addAuditEntry(manager, {
        actor: { userId: user.id, name: user.name },
        entityType: 'session',
        entityId: id,
        action: 'signedIn',
        text: 'signed in',
      });
      return this.issue(manager, session, renewalToken);
    });
  }

  /** @throws UnauthenticatedError when the token is none, has been used before, or its session is over */
  async renew(presentedToken: string | undefined): Promise<IssuedSession> {
    const sessionId = presentedToken && this.renewalTokens.sessionIdOf(presentedToken);
    if (!presentedToken || !sessionId) throw new UnauthenticatedError();
    const outcome = await this.deps.dataSource.transaction((manager) =>
      this.rotate(manager, sessionId, presentedToken),
    );
    // Thrown outside the transaction: what a reuse has ended must stay ended.
    if (outcome === 'expired') {
      throw new UnauthenticatedError('SESSION_EXPIRED', 'The session has expired. Sign in again.');
    }
    if (outcome === 'missing' || outcome === 'reused') throw new UnauthenticatedError();
    return this.issue(this.deps.dataSource.manager, outcome.session, outcome.renewalToken);
  }

  async signOut(actor: Actor): Promise<void> {
    await this.deps.dataSource.transaction(async (manager) => {
      await manager.update(Session, { id: actor.sessionId }, { revokedAt: this.deps.now() });
      await addAuditEntry(manager, {
        actor,
        entityType: 'session',
        entityId: actor.sessionId,
        action: 'signedOut',
        text: 'signed out',
      });
    });
  }

  private async rotate(manager: EntityManager, sessionId: string, presentedToken: string): Promise<Renewal> {
    const session = await manager.findOne(Session, {
      where: { id: sessionId },
      lock: { mode: 'pessimistic_write' },
    });
    if (!session || session.revokedAt) return 'missing';
    const at = this.deps.now();
    const idleMs = at.getTime() - session.lastUsedAt.getTime();
    if (session.expiresAt <= at || idleMs > this.deps.config.SESSION_IDLE_HOURS * 3_600_000) return 'expired';

    const presentedHash = hashSecret(presentedToken);
    const renewalToken = this.renewalTokens.next(sessionId, presentedToken);
    if (presentedHash === session.renewalHash) {
      const rotation = {
        renewalHash: hashSecret(renewalToken),
        previousRenewalHash: presentedHash,
        rotatedAt: at,
        lastUsedAt: at,
      };
      await manager.update(Session, { id: sessionId }, rotation);
      return { session: Object.assign(session, rotation), renewalToken };
    }
    const isInGrace = session.rotatedAt !== null && at.getTime() - session.rotatedAt.getTime() <= renewalGraceMs;
    if (presentedHash === session.previousRenewalHash && isInGrace) return { session, renewalToken };

    await manager.update(Session, { id: sessionId }, { revokedAt: at });
    await addAuditEntry(manager, {
      actor: null,
      entityType: 'session',
      entityId: sessionId,
      action: 'endedByReuse',
      text: 'ended: a renewal token was used a second time',
      details: { userId: session.userId },
    });
    this.deps.logger.warn({ userId: session.userId, event: 'renewalReused' }, 'session ended: renewal token reused');
    return 'reused';
  }

  private async issue(manager: EntityManager, session: Session, renewalToken: string): Promise<IssuedSession> {
    const live = await findLiveSession(manager, session.id, session.userId);
    if (!live) throw new UnauthenticatedError();
    const { token, expiresAt } = this.accessTokens.issue(session.userId, session.id);
    return { actor: live.actor, token, expiresAt, renewalToken, sessionExpiresAt: session.expiresAt };
  }
}
