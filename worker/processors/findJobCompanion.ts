import type { DataSource } from 'typeorm';
import { asksForCompanion } from '../../shared/screening/chooseCompanion.js';
import type { Batch, Capture } from '../../server/entities/index.js';
import { companionBasis } from '../../server/repositories/companionBasis.js';
import { findCompanions, type PairableRow } from '../../server/repositories/companionRepository.js';
import { failedCompanionNote } from '../../server/repositories/failedCompanionNote.js';
import type { UsedCompanion } from '../../server/repositories/saveScreening.js';

export interface JobCompanion {
  /** To be fetched and compared; null: the capture is screened alone. */
  file: PairableRow | null;
  /** What the result is to be stored with. */
  used: UsedCompanion | null;
  /** Why there is nothing to compare although the sheet asks for it. */
  note: string | null;
}

/** The companion that a capture is screened with now. One whose own screening failed is not opened, only said. */
export async function findJobCompanion(dataSource: DataSource, batch: Batch, capture: Capture): Promise<JobCompanion> {
  const alone = { file: null, used: null, note: null };
  if (!asksForCompanion({ ...batch.acquisition, ...capture.acquisition })) return alone;
  const [found] = await findCompanions(dataSource, batch, capture.id);
  if (!found?.companion) return { ...alone, note: found?.note ?? null };
  const { companion } = found;
  const { id } = companion;
  if (companion.state === 'failed') {
    return { file: null, used: { id, basis: null }, note: failedCompanionNote(companion) };
  }
  const used = { id, basis: companionBasis(companion) };
  // It may be the companion's file that takes the worker down: the capture must not fail with it.
  if (capture.faultCount > 0) {
    const note = `The companion ${companion.fileName} was not compared: screening the two together stopped without a result.`;
    return { file: null, used, note };
  }
  return { file: companion, used, note: null };
}
