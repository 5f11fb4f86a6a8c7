import type { ProjectDto } from '../../shared/schemas/project.js';
import type { Actor } from '../policies/Actor.js';
import { rolesInProject } from '../policies/projectPolicy.js';
import type { ProjectWithCounts } from '../repositories/projectRepository.js';

export function presentProject(project: ProjectWithCounts, actor: Actor): ProjectDto {
  return {
    id: project.id,
    name: project.name,
    description: project.description,
    isArchived: project.isArchived,
    createdAt: project.createdAt.toISOString(),
    roles: rolesInProject(actor, project.id),
    counts: {
      batches: project.batchCount,
      captures: project.captureCount,
      awaitingReview: project.awaitingReviewCount,
    },
  };
}
