import type { PairableRow } from './companionRepository.js';

/** Why a companion that could not be screened itself was not compared, and what to do. */
export const failedCompanionNote = ({ fileName, failureMessage }: PairableRow): string =>
  `The companion ${fileName} could not be screened itself: ${failureMessage ?? 'for an unknown reason.'} Retry or replace it; this capture is then screened again.`;
