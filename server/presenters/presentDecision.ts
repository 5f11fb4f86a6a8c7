import type { DecisionDto } from '../../shared/schemas/decision.js';
import type { Decision } from '../entities/index.js';

/** @param decision loaded with `decidedBy` */
export function presentDecision(decision: Decision): DecisionDto {
  return {
    id: decision.id,
    decision: decision.decision,
    limitHz: decision.limitHz,
    reason: decision.reason,
    decidedBy: { id: decision.decidedById, name: decision.decidedBy.name },
    decidedAt: decision.createdAt.toISOString(),
    version: decision.version,
  };
}
