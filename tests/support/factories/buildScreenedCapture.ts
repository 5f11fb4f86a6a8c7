import type { DataSource } from 'typeorm';
import { Capture, type Batch } from '../../../server/entities/index.js';
import { saveScreening } from '../../../server/repositories/saveScreening.js';
import type { ChannelScreen } from '../../../shared/schemas/screening.js';
import { buildCapture } from './buildCapture.js';
import { buildScreening } from './buildScreening.js';

/** A capture with results, saved the way the worker saves them. */
export async function buildScreenedCapture(
  dataSource: DataSource,
  batch: Pick<Batch, 'id' | 'projectId'>,
  { capture: overrides = {}, screen = {} }: { capture?: Partial<Capture>; screen?: Partial<ChannelScreen> } = {},
): Promise<Capture> {
  const capture = await buildCapture(dataSource, batch, { state: 'screening', attempt: 1, ...overrides });
  const isSaved = await dataSource.transaction((manager) =>
    saveScreening(manager, {
      captureId: capture.id,
      attempt: capture.attempt,
      engineVersion: '1.0.0',
      thresholdsVersion: 1,
      result: buildScreening(screen),
    }),
  );
  if (!isSaved) throw new Error('The capture to screen was not in the state that its attempt needs.');
  return dataSource.manager.findOneByOrFail(Capture, { id: capture.id });
}
