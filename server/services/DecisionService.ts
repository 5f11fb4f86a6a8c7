import type { EntityManager } from 'typeorm';
import type { PutDecision } from '../../shared/schemas/decision.js';
import type { AppDependencies } from '../AppDependencies.js';
import { Capture, Decision } from '../entities/index.js';
import { ConflictError, NotFoundError, UnprocessableError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { refuseDecision } from '../policies/capturePolicy.js';
import { requireProjectReader } from '../policies/requireProjectAccess.js';
import { findCurrentThresholds } from '../repositories/thresholdsRepository.js';
import { addAuditEntry } from './audit.js';

const verbs: Record<PutDecision['decision'], string> = {
  accept: 'accepted',
  acceptTo: 'accepted up to',
  retake: 'asked for a retake',
  exclude: 'excluded',
};

const describe = ({ decision, limitHz, reason }: PutDecision): string =>
  `${verbs[decision]}${limitHz === undefined ? '' : ` ${limitHz} Hz`}: ${reason}`;

/** Raises the version only from the one the reviewer saw: of several at once exactly one finds its row. */
async function takeVersion(manager: EntityManager, captureId: string, seen: number | undefined): Promise<number> {
  const [rows] = await manager.query<[{ version: number }[], number]>(
    `UPDATE captures c SET decision_version = decision_version + 1
      WHERE c.id = $1 AND c.state = 'screened' AND c.decision_version = coalesce($2::int, c.decision_version)
        AND EXISTS (SELECT 1 FROM batches b WHERE b.id = c.batch_id AND b.state NOT IN ('released', 'withdrawn'))
      RETURNING c.decision_version AS version`,
    [captureId, seen ?? null],
  );
  const version = rows[0]?.version;
  if (version !== undefined) return version;
  throw new ConflictError(
    'DECISION_CHANGED',
    'Somebody else has decided on this capture, or it has changed, since you looked. Load it again.',
  );
}

export class DecisionService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource'>) {}

  /** Adds a decision; earlier ones are kept, the newest is in force. */
  async decide(actor: Actor, captureId: string, put: PutDecision): Promise<void> {
    await this.deps.dataSource.transaction(async (manager) => {
      const capture = await manager.findOne(Capture, { where: { id: captureId }, relations: { batch: true } });
      if (!capture) throw new NotFoundError();
      requireProjectReader(actor, capture.projectId);
      const thresholds = await findCurrentThresholds(manager, capture.projectId);
      const refusal = refuseDecision(actor, { ...capture, batchState: capture.batch.state }, thresholds.values);
      if (refusal) throw refusal;
      const foldingHz = capture.sampleRateHz === null ? Infinity : capture.sampleRateHz / 2;
      if (put.limitHz !== undefined && put.limitHz > foldingHz) {
        throw new UnprocessableError(
          'LIMIT_ABOVE_FOLDING',
          `The limit lies above the folding frequency of this capture (${foldingHz} Hz). Choose a lower one.`,
          { details: [{ path: 'body.limitHz', message: `At most ${foldingHz} Hz.` }] },
        );
      }
      const version = await takeVersion(manager, captureId, put.version);
      await manager.insert(Decision, {
        captureId,
        version,
        decision: put.decision,
        limitHz: put.limitHz ?? null,
        reason: put.reason,
        decidedById: actor.userId,
      });
      await addAuditEntry(manager, {
        actor,
        projectId: capture.projectId,
        entityType: 'capture',
        entityId: captureId,
        action: 'decided',
        text: describe(put),
        details: { version, decision: put.decision, limitHz: put.limitHz ?? null, verdict: capture.verdict },
      });
    });
  }
}
