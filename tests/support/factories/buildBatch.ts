import type { DataSource } from 'typeorm';
import { Batch } from '../../../server/entities/index.js';

/** A stored batch that still takes files. */
export function buildBatch(dataSource: DataSource, projectId: string, overrides: Partial<Batch> = {}): Promise<Batch> {
  const { manager } = dataSource;
  return manager.save(manager.create(Batch, { projectId, name: 'Pump hall 2', ...overrides }));
}
