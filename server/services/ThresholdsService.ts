import type { EntityManager } from 'typeorm';
import { thresholdsSchema, type ChangeThresholds, type PartialThresholds } from '../../shared/schemas/thresholds.js';
import type { AppDependencies } from '../AppDependencies.js';
import { Project, ThresholdsVersion } from '../entities/index.js';
import { NotFoundError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { requireProjectAdministrator, requireProjectReader } from '../policies/requireProjectAccess.js';
import { findCurrentThresholds, findThresholdsHistory } from '../repositories/thresholdsRepository.js';
import { addAuditEntry } from './audit.js';

type History = [ThresholdsVersion, ...ThresholdsVersion[]];

/** Scripts may send bare values, and need not say why. */
function splitReason({ values, reason, ...bare }: ChangeThresholds): { values: PartialThresholds; reason: string } {
  return { values: values ?? bare, reason: reason ?? 'changed through the API' };
}

export class ThresholdsService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource'>) {}

  async read(actor: Actor, projectId: string): Promise<History> {
    requireProjectReader(actor, projectId);
    return this.loadHistory(this.deps.dataSource.manager, projectId);
  }

  /** Adds a version. Results name the version they were judged with; those already there stay as they are. */
  async change(actor: Actor, projectId: string, change: ChangeThresholds): Promise<History> {
    requireProjectAdministrator(actor, projectId);
    const { values, reason } = splitReason(change);
    return this.deps.dataSource.transaction(async (manager) => {
      // Two administrators at once: the second waits here and then builds on the first one's version.
      const project = await manager.findOne(Project, {
        where: { id: projectId },
        lock: { mode: 'pessimistic_write' },
      });
      if (!project) throw new NotFoundError();
      const current = await findCurrentThresholds(manager, projectId);
      const version = current.version + 1;
      await manager.insert(ThresholdsVersion, {
        projectId,
        version,
        values: thresholdsSchema.parse({ ...current.values, ...values }),
        authorId: actor.userId,
        reason,
      });
      await addAuditEntry(manager, {
        actor,
        projectId,
        entityType: 'project',
        entityId: projectId,
        action: 'changedThresholds',
        text: `set thresholds version ${version}: ${reason}`,
        details: { version, values },
      });
      return this.loadHistory(manager, projectId);
    });
  }

  private async loadHistory(manager: EntityManager, projectId: string): Promise<History> {
    const [newest, ...older] = await findThresholdsHistory(manager, projectId);
    if (!newest) throw new NotFoundError();
    return [newest, ...older];
  }
}
