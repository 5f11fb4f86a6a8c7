import type { DataSource, EntityManager } from 'typeorm';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import {
  asksForCompanion,
  chooseCompanion,
  type CompanionChoice,
  type PairableCapture,
} from '../../shared/screening/chooseCompanion.js';
import type { Batch } from '../entities/index.js';

/** A capture with what choosing and reading a companion need. */
export interface PairableRow extends PairableCapture {
  sha256: string;
  sizeBytes: number;
  storageKey: string;
  csvLayout: CsvLayout | null;
  failureMessage: string | null;
  companionId: string | null;
  companionBasis: string | null;
  companionNote: string | null;
}

export type ChosenCompanion = CompanionChoice<PairableRow> & { capture: PairableRow };

const columns = `c.id, c.file_name AS "fileName", b.acquisition || c.acquisition AS sheet, c.sample_rate_hz AS "sampleRateHz",
  c.state, c.sha256, c.size_bytes::float8 AS "sizeBytes", c.storage_key AS "storageKey", c.csv_layout AS "csvLayout",
  c.failure_message AS "failureMessage", c.companion_id AS "companionId", c.companion_basis AS "companionBasis",
  c.companion_note AS "companionNote"`;

const lastPart = `regexp_replace(c.file_name, '^.*/', '')`;

const findOfBatch = (source: DataSource | EntityManager, batchId: string): Promise<PairableRow[]> =>
  source.query(
    `SELECT ${columns} FROM captures c JOIN batches b ON b.id = c.batch_id WHERE c.batch_id = $1
      ORDER BY c.created_at, c.id`,
    [batchId],
  );

/** Captures of the same project, and of no other, in other batches under one of these names, with or without their folder. */
const findElsewhere = (
  source: DataSource | EntityManager,
  { id, projectId }: Pick<Batch, 'id' | 'projectId'>,
  names: string[],
): Promise<PairableRow[]> =>
  source.query(
    `SELECT ${columns} FROM captures c JOIN batches b ON b.id = c.batch_id
      WHERE c.project_id = $1 AND c.batch_id <> $2 AND (c.file_name = ANY($3) OR ${lastPart} = ANY($3))
      ORDER BY c.created_at, c.id`,
    [projectId, id, names],
  );

/**
 * The companions of captures of one batch, as sheets, names and rates now say.
 * @param captureId only for this one; else for all whose sheet asks for a companion or that were given one
 */
export async function findCompanions(
  source: DataSource | EntityManager,
  batch: Pick<Batch, 'id' | 'projectId'>,
  captureId?: string,
): Promise<ChosenCompanion[]> {
  const rows = await findOfBatch(source, batch.id);
  const asking = rows.filter(
    ({ id, sheet, companionBasis, companionNote }) =>
      (captureId === undefined || id === captureId) &&
      (asksForCompanion(sheet) || companionBasis !== null || companionNote !== null),
  );
  const here = new Set(rows.map(({ fileName }) => fileName));
  const names = new Set(asking.flatMap(({ sheet }) => (sheet.companion ? [sheet.companion] : [])));
  const missing = [...names].filter((name) => !here.has(name));
  const elsewhere = missing.length > 0 ? await findElsewhere(source, batch, missing) : [];
  return asking.map((capture) => ({
    capture,
    ...chooseCompanion(capture, { batch: rows, elsewhere, usedId: capture.companionId }),
  }));
}

/**
 * Other batches, not closed, in which a screened capture rests on one of these captures, or waits for one of that name.
 */
export async function findBatchesPairedWith(
  source: DataSource | EntityManager,
  captureIds: string[],
): Promise<string[]> {
  const rows = await source.query<{ id: string }[]>(
    `WITH given AS (SELECT c.id, c.batch_id, c.project_id, c.file_name, ${lastPart} AS last_part
                      FROM captures c WHERE c.id = ANY($1::uuid[]))
     SELECT b.id FROM batches b WHERE b.state NOT IN ('released', 'withdrawn') AND b.id IN (
       SELECT c.batch_id FROM captures c JOIN given g ON c.companion_id = g.id AND c.batch_id <> g.batch_id
       UNION
       SELECT c.batch_id FROM captures c JOIN batches own ON own.id = c.batch_id
         JOIN given g ON g.project_id = c.project_id AND g.batch_id <> c.batch_id
        WHERE c.companion_note IS NOT NULL
          AND coalesce(c.acquisition->>'companion', own.acquisition->>'companion') IN (g.file_name, g.last_part))`,
    [captureIds],
  );
  return rows.map(({ id }) => id);
}

/** Batches, not closed, with a capture whose companion is missing or lies in another batch. */
export async function findBatchesWithDistantPairs(source: DataSource | EntityManager): Promise<string[]> {
  const rows = await source.query<{ id: string }[]>(
    `SELECT b.id FROM batches b WHERE b.state NOT IN ('released', 'withdrawn') AND EXISTS (
       SELECT 1 FROM captures c LEFT JOIN captures k ON k.id = c.companion_id
        WHERE c.batch_id = b.id AND (c.companion_note IS NOT NULL OR k.batch_id <> c.batch_id))`,
  );
  return rows.map(({ id }) => id);
}
