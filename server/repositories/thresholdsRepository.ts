import type { EntityManager } from 'typeorm';
import { ThresholdsVersion } from '../entities/index.js';

/** The thresholds in force: a project has a first version from its creation on. */
export function findCurrentThresholds(manager: EntityManager, projectId: string): Promise<ThresholdsVersion> {
  return manager.findOneOrFail(ThresholdsVersion, { where: { projectId }, order: { version: 'DESC' } });
}

/** All versions, newest first, with their authors. */
export function findThresholdsHistory(manager: EntityManager, projectId: string): Promise<ThresholdsVersion[]> {
  return manager.find(ThresholdsVersion, {
    where: { projectId },
    order: { version: 'DESC' },
    relations: { author: true },
  });
}
