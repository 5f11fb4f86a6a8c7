import { randomUUID } from 'node:crypto';
import type { DataSource } from 'typeorm';
import { defaultThresholds, type Thresholds } from '../../../shared/schemas/thresholds.js';
import { Project, ThresholdsVersion } from '../../../server/entities/index.js';

export interface ProjectOverrides {
  name?: string;
  description?: string;
  isArchived?: boolean;
  thresholds?: Partial<Thresholds>;
}

/** A stored project with its first thresholds and no members. */
export async function buildProject(dataSource: DataSource, overrides: ProjectOverrides = {}): Promise<Project> {
  const { thresholds, ...rest } = overrides;
  const { manager } = dataSource;
  const project = await manager.save(
    Project,
    manager.create(Project, { name: `Project ${randomUUID().slice(0, 8)}`, ...rest }),
  );
  await manager.insert(ThresholdsVersion, {
    projectId: project.id,
    version: 1,
    values: { ...defaultThresholds, ...thresholds },
    authorId: null,
    reason: 'Initial values',
  });
  return project;
}
