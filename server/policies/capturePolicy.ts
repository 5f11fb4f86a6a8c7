import type { BatchState } from '../../shared/schemas/batch.js';
import type { CaptureState } from '../../shared/schemas/capture.js';
import { ConflictError, ForbiddenError, type AppError } from '../errors/index.js';
import type { Actor } from './Actor.js';
import { hasProjectRole } from './projectPolicy.js';

export interface CaptureStanding {
  projectId: string;
  state: CaptureState;
  uploadedById: string | null;
  batchState: BatchState;
}

const isClosed = (state: BatchState): boolean => state === 'released' || state === 'withdrawn';

const closedRefusal = (state: BatchState): AppError =>
  new ConflictError('BATCH_CLOSED', `The batch is ${state}: nothing in it may be changed any more.`);

/** Why the actor may not decide on a capture now; null when they may. Whether they may see it is checked before. */
export function refuseDecision(
  actor: Actor,
  capture: CaptureStanding,
  { independentReview }: { independentReview: boolean },
): AppError | null {
  if (!hasProjectRole(actor, capture.projectId, 'reviewer')) {
    return new ForbiddenError('FORBIDDEN', 'Only a reviewer of this project may decide. Ask an administrator.');
  }
  if (independentReview && capture.uploadedById === actor.userId) {
    return new ForbiddenError(
      'INDEPENDENT_REVIEW',
      'This project asks for independent review: you uploaded this capture, so another reviewer must decide.',
    );
  }
  if (isClosed(capture.batchState)) return closedRefusal(capture.batchState);
  if (capture.state !== 'screened') {
    return new ConflictError(
      'NOT_SCREENED',
      capture.state === 'failed'
        ? 'This capture could not be screened. Retry it or replace its file before deciding.'
        : 'This capture is still being screened. Decide when that is done.',
    );
  }
  return null;
}

/** Why the actor may not change sheet or file of a capture, or screen it again. */
export function refuseEdit(
  actor: Actor,
  { projectId, batchState }: Pick<CaptureStanding, 'projectId' | 'batchState'>,
): AppError | null {
  if (!hasProjectRole(actor, projectId, 'analyst')) {
    return new ForbiddenError('FORBIDDEN', 'Only an analyst of this project may do this. Ask an administrator.');
  }
  return isClosed(batchState) ? closedRefusal(batchState) : null;
}
