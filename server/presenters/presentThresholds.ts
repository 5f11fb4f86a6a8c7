import {
  thresholdsSchema,
  type ThresholdsResponse,
  type ThresholdsVersionDto,
} from '../../shared/schemas/thresholds.js';
import type { ThresholdsVersion } from '../entities/index.js';

function presentVersion(version: ThresholdsVersion): ThresholdsVersionDto {
  return {
    version: version.version,
    // A version stored before a threshold existed gets that threshold's default, as the judge does.
    values: thresholdsSchema.parse(version.values),
    authorName: version.author?.name ?? null,
    reason: version.reason,
    createdAt: version.createdAt.toISOString(),
  };
}

/** @param history newest first, not empty: a project has a first version from its creation on */
export function presentThresholds(history: [ThresholdsVersion, ...ThresholdsVersion[]]): ThresholdsResponse {
  return { current: presentVersion(history[0]), history: history.map(presentVersion) };
}
