import type { z } from 'zod';
import type { reviewQuerySchema } from '../../shared/schemas/capture.js';
import type { StartPage } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import type { Actor } from '../policies/Actor.js';
import { findCaptures, captureOrders } from '../repositories/captureRepository.js';
import { countWaiting } from '../repositories/countWaiting.js';
import { cutPage, pageCursor } from '../repositories/pageCursor.js';

const isDecidedBy = { no: false, yes: true, all: undefined } as const;

/** What waits for a person, over all projects they are a member of. */
export class ReviewService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource'>) {}

  async list(actor: Actor, query: z.output<typeof reviewQuerySchema>) {
    const own = actor.memberships.map(({ projectId }) => projectId);
    const rows = await findCaptures(this.deps.dataSource, {
      order: query.sort,
      after: pageCursor.decode(query.cursor, query.sort, captureOrders[query.sort].kind),
      limit: query.limit + 1,
      // A foreign project's id finds nothing, just as one that doesn't exist.
      projectIds: query.projectId === undefined ? own : own.filter((id) => id === query.projectId),
      batchId: query.batchId,
      state: 'screened',
      verdict: query.verdict,
      findingKind: query.findingKind,
      isDecided: isDecidedBy[query.decided],
      clearToBelowHz: query.clearToBelowHz,
      search: query.search,
    });
    return cutPage(rows, query.limit, query.sort);
  }

  countWaiting(actor: Actor): Promise<StartPage> {
    return countWaiting(
      this.deps.dataSource,
      actor.memberships.map(({ projectId }) => projectId),
    );
  }
}
