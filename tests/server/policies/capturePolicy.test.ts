import { describe, expect, it } from 'vitest';
import type { Actor } from '../../../server/policies/Actor.js';
import { refuseDecision, refuseEdit, type CaptureStanding } from '../../../server/policies/capturePolicy.js';
import type { ProjectRole } from '../../../shared/schemas/account.js';
import { batchStates } from '../../../shared/schemas/batch.js';
import { captureStates } from '../../../shared/schemas/capture.js';

const actorWith = (roles: ProjectRole[], overrides: Partial<Actor> = {}): Actor => ({
  userId: 'ruth',
  email: 'ruth@marram.example',
  name: 'Ruth Aldane',
  isAdmin: false,
  sessionId: 'session',
  memberships: roles.length > 0 ? [{ projectId: 'quay', projectName: 'Ferrow Quay', roles }] : [],
  ...overrides,
});
const standing = (overrides: Partial<CaptureStanding> = {}): CaptureStanding => ({
  projectId: 'quay',
  state: 'screened',
  uploadedById: 'ines',
  batchState: 'review',
  ...overrides,
});
const open = { independentReview: false };
const independent = { independentReview: true };

describe('refuseDecision', () => {
  it('lets a reviewer decide on a screened capture', () => {
    expect(refuseDecision(actorWith(['reviewer']), standing(), open)).toBeNull();
  });

  it.each([
    ['an analyst', actorWith(['analyst'])],
    ['a QA manager', actorWith(['qaManager'])],
    ['an administrator who is no member', actorWith([], { isAdmin: true })],
  ])('refuses %s', (_who, actor) => {
    expect(refuseDecision(actor, standing(), open)).toMatchObject({ status: 403, code: 'FORBIDDEN' });
  });

  it('refuses the uploader exactly where independent review is asked for', () => {
    const own = standing({ uploadedById: 'ruth' });
    const actor = actorWith(['analyst', 'reviewer']);
    expect(refuseDecision(actor, own, independent)).toMatchObject({ status: 403, code: 'INDEPENDENT_REVIEW' });
    expect(refuseDecision(actor, own, open)).toBeNull();
    expect(refuseDecision(actor, standing(), independent)).toBeNull();
  });

  it('follows a table of batch and capture states', () => {
    const answers = batchStates.flatMap((batchState) =>
      captureStates.map((state) => {
        const refusal = refuseDecision(actorWith(['reviewer']), standing({ batchState, state }), open);
        return [batchState, state, refusal?.code ?? 'allowed'];
      }),
    );
    const expected = batchStates.flatMap((batchState) =>
      captureStates.map((state) => {
        if (batchState === 'released' || batchState === 'withdrawn') return [batchState, state, 'BATCH_CLOSED'];
        return [batchState, state, state === 'screened' ? 'allowed' : 'NOT_SCREENED'];
      }),
    );
    expect(answers).toEqual(expected);
  });
});

describe('refuseEdit', () => {
  it('lets an analyst edit until the batch is closed', () => {
    const answers = batchStates.map((batchState) => [
      batchState,
      refuseEdit(actorWith(['analyst']), standing({ batchState }))?.code ?? 'allowed',
    ]);
    expect(Object.fromEntries(answers)).toEqual({
      receiving: 'allowed',
      screening: 'allowed',
      review: 'allowed',
      released: 'BATCH_CLOSED',
      withdrawn: 'BATCH_CLOSED',
    });
  });

  it('refuses a reviewer', () => {
    expect(refuseEdit(actorWith(['reviewer']), standing())).toMatchObject({ status: 403, code: 'FORBIDDEN' });
  });
});
