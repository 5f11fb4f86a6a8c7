import type { DataSource, EntityManager } from 'typeorm';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { BatchState } from '../../shared/schemas/batch.js';
import type { CaptureFormat, CaptureState } from '../../shared/schemas/capture.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import type { DecisionKind } from '../../shared/schemas/decision.js';
import type { FindingKind, Verdict } from '../../shared/schemas/screening.js';
import { escapeLikePattern } from './escapeLikePattern.js';
import type { CursorKey, PagePosition } from './pageCursor.js';

export interface CaptureListRow extends PagePosition {
  batchId: string;
  batchName: string;
  projectId: string;
  projectName: string;
  fileName: string;
  format: CaptureFormat;
  sizeBytes: string;
  sha256: string;
  state: CaptureState;
  progress: number;
  verdict: Verdict | null;
  foldScore: number | null;
  clearToHz: number | null;
  sampleRateHz: number | null;
  durationS: number | null;
  channelCount: number | null;
  logger: string | null;
  position: string | null;
  headline: string | null;
  failureCode: string | null;
  failureMessage: string | null;
  failureLine: number | null;
  duplicateOfId: string | null;
  uploadedById: string | null;
  uploadedByName: string | null;
  createdAt: Date;
  screenedAt: Date | null;
  decisionId: string | null;
  decision: DecisionKind | null;
  limitHz: number | null;
  reason: string | null;
  decidedById: string | null;
  decidedByName: string | null;
  decidedAt: Date | null;
  decisionVersion: number;
}

interface CaptureOrder {
  /** Fixed SQL; nothing a user sends ever comes here. Missing values get a place, since a cursor can't hold null. */
  expression: string;
  cast: string;
  kind: CursorKey;
  isDescending: boolean;
}

/** A capture without a clear-to frequency can't be trusted at any: it comes first where the lowest does. */
export const captureOrders = {
  newest: { expression: 'c.created_at', cast: 'timestamptz', kind: 'time', isDescending: true },
  oldest: { expression: 'c.created_at', cast: 'timestamptz', kind: 'time', isDescending: false },
  foldScore: { expression: 'coalesce(c.fold_score, -1)', cast: 'float8', kind: 'number', isDescending: true },
  clearTo: { expression: 'coalesce(c.clear_to_hz, -1)', cast: 'float8', kind: 'number', isDescending: false },
  fileName: { expression: 'lower(c.file_name) COLLATE "C"', cast: 'text', kind: 'text', isDescending: false },
} as const satisfies Record<string, CaptureOrder>;
export type CaptureOrderName = keyof typeof captureOrders;

export interface CaptureFilter {
  order: CaptureOrderName;
  after?: PagePosition | null;
  limit: number;
  id?: string | undefined;
  projectIds?: string[] | undefined;
  batchId?: string | undefined;
  state?: CaptureState | undefined;
  verdict?: Verdict | undefined;
  findingKind?: FindingKind | undefined;
  isDecided?: boolean | undefined;
  clearToBelowHz?: number | undefined;
  /** Part of the file's, batch's or logger's name. */
  search?: string | undefined;
}

function conditions(filter: CaptureFilter, bind: (value: unknown) => string): string[] {
  const found: string[] = [];
  const add = (value: unknown, write: (place: string) => string): void => {
    if (value !== undefined && value !== null) found.push(write(bind(value)));
  };
  const { expression, cast, isDescending } = captureOrders[filter.order];
  add(filter.id, (at) => `c.id = ${at}`);
  add(filter.projectIds, (at) => `c.project_id = ANY(${at}::uuid[])`);
  add(filter.batchId, (at) => `c.batch_id = ${at}`);
  add(filter.state, (at) => `c.state = ${at}`);
  // A verdict belongs to a finished screening; a capture being screened again shows none.
  add(filter.verdict, (at) => `c.state = 'screened' AND c.verdict = ${at}`);
  add(filter.findingKind, (at) => `EXISTS (SELECT 1 FROM findings f WHERE f.capture_id = c.id AND f.kind = ${at})`);
  // Written out, so that the planner finds the partial indexes of the review lists.
  if (filter.isDecided !== undefined) found.push(`c.decision_version ${filter.isDecided ? '>' : '='} 0`);
  add(filter.clearToBelowHz, (at) => `c.clear_to_hz < ${at}`);
  add(filter.search && `%${escapeLikePattern(filter.search)}%`, (at) => {
    const logger = `coalesce(c.acquisition->>'logger', b.acquisition->>'logger')`;
    return `(c.file_name ILIKE ${at} OR b.name ILIKE ${at} OR ${logger} ILIKE ${at})`;
  });
  if (filter.after) {
    const place = `(${bind(filter.after.key)}::${cast}, ${bind(filter.after.id)}::uuid)`;
    found.push(`(${expression}, c.id) ${isDescending ? '<' : '>'} ${place}`);
  }
  return found;
}

/** Columns of a list's row; `c` is a capture with its sort key. */
const listColumns = `
  c.id, c.key, c.batch_id AS "batchId", b.name AS "batchName", c.project_id AS "projectId", p.name AS "projectName",
  c.file_name AS "fileName", c.format, c.size_bytes AS "sizeBytes", c.sha256, c.state, c.progress, c.verdict,
  c.fold_score AS "foldScore", c.clear_to_hz AS "clearToHz", c.sample_rate_hz AS "sampleRateHz",
  c.duration_s AS "durationS", c.channel_count AS "channelCount",
  coalesce(c.acquisition->>'logger', b.acquisition->>'logger') AS logger,
  coalesce(c.acquisition->>'position', b.acquisition->>'position') AS position,
  c.headline, c.failure_code AS "failureCode", c.failure_message AS "failureMessage", c.failure_line AS "failureLine",
  c.duplicate_of_id AS "duplicateOfId", c.uploaded_by_id AS "uploadedById", u.name AS "uploadedByName",
  c.created_at AS "createdAt", c.screened_at AS "screenedAt", d.id AS "decisionId", d.decision, d.limit_hz AS "limitHz",
  d.reason, d.decided_by_id AS "decidedById", du.name AS "decidedByName", d.created_at AS "decidedAt",
  c.decision_version AS "decisionVersion"`;

const listJoins = `
  JOIN batches b ON b.id = c.batch_id
  JOIN projects p ON p.id = c.project_id
  LEFT JOIN users u ON u.id = c.uploaded_by_id
  LEFT JOIN decisions d ON d.capture_id = c.id AND d.version = c.decision_version
  LEFT JOIN users du ON du.id = d.decided_by_id`;

/**
 * Captures as rows of a list, with batch, project, people and the decision in force, in one statement: the page is cut
 * first, so that only its rows are joined.
 */
export function findCaptures(source: DataSource | EntityManager, filter: CaptureFilter): Promise<CaptureListRow[]> {
  const parameters: unknown[] = [];
  const bind = (value: unknown): string => `$${parameters.push(value)}`;
  const { expression, isDescending } = captureOrders[filter.order];
  const where = conditions(filter, bind).join(' AND ');
  const direction = isDescending ? 'DESC' : 'ASC';
  const orderBy = `ORDER BY ${expression} ${direction}, c.id ${direction}`;
  return source.query(
    `WITH page AS (
       SELECT c.*, (${expression})::text AS key FROM captures c
       ${filter.search ? 'JOIN batches b ON b.id = c.batch_id' : ''}
       ${where === '' ? '' : `WHERE ${where}`}
       ${orderBy} LIMIT ${bind(filter.limit)})
     SELECT ${listColumns} FROM page c ${listJoins} ${orderBy}`,
    parameters,
  );
}

/** One capture's row of a list with what its page and its policies need besides. */
export interface CaptureDetailRow extends CaptureListRow {
  batchState: BatchState;
  batchAcquisition: AcquisitionSheet;
  acquisition: AcquisitionSheet;
  csvLayout: CsvLayout | null;
  engineVersion: string | null;
  thresholdsVersion: number | null;
  /** Of the version it was judged with; null before. */
  guardStart: number | null;
  independentReview: boolean;
  companionId: string | null;
  companionFileName: string | null;
  companionRateHz: number | null;
  companionNote: string | null;
}

export async function findCaptureDetail(
  source: DataSource | EntityManager,
  captureId: string,
): Promise<CaptureDetailRow | null> {
  const [row] = await source.query<CaptureDetailRow[]>(
    `SELECT ${listColumns}, b.state AS "batchState", b.acquisition AS "batchAcquisition", c.acquisition,
            c.csv_layout AS "csvLayout", c.engine_version AS "engineVersion",
            c.thresholds_version AS "thresholdsVersion", (used.values->>'guardStart')::float8 AS "guardStart",
            coalesce((current.values->>'independentReview')::boolean, false) AS "independentReview",
            k.id AS "companionId", k.file_name AS "companionFileName", k.sample_rate_hz AS "companionRateHz",
            c.companion_note AS "companionNote"
       FROM (SELECT *, '' AS key FROM captures WHERE id = $1) c ${listJoins}
       LEFT JOIN captures k ON k.id = c.companion_id AND k.project_id = c.project_id
       LEFT JOIN thresholds_versions used ON used.project_id = c.project_id AND used.version = c.thresholds_version
       LEFT JOIN LATERAL (SELECT values FROM thresholds_versions t WHERE t.project_id = c.project_id
                           ORDER BY version DESC LIMIT 1) current ON true`,
    [captureId],
  );
  return row ?? null;
}
