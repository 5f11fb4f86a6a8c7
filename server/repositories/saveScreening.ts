import type { EntityManager } from 'typeorm';
import type { ChannelScreen, Verdict } from '../../shared/schemas/screening.js';
import type { MeasurementRecord } from '../../shared/screening/MeasurementRecord.js';
import { AuditEntry, Capture, ChannelResult, FindingRow, Spectrum } from '../entities/index.js';
import type { SpectrumKind } from '../entities/Spectrum.js';

export interface ScreenedSpectrum {
  kind: SpectrumKind;
  resolutionHz: number;
  segments: number;
  /** One-sided linear densities, bin k at k·resolutionHz. */
  densityMean: Float32Array;
  densityMedian: Float32Array | null;
}

export interface ScreenedChannel {
  record: MeasurementRecord;
  screen: ChannelScreen;
  spectra: ScreenedSpectrum[];
}

export interface ScreeningResult {
  verdict: Verdict;
  foldScore: number | null;
  clearToHz: number | null;
  headline: string | null;
  channels: ScreenedChannel[];
}

/** What the screening was given to compare with. */
export interface UsedCompanion {
  id: string;
  /** `companionBasis`; null where it was not opened. */
  basis: string | null;
}

interface SaveScreening {
  captureId: string;
  /** The attempt that made this result: a newer one on the row makes the write void. */
  attempt: number;
  engineVersion: string;
  thresholdsVersion: number | null;
  result: ScreeningResult;
  companion?: UsedCompanion | null;
  /** Why a companion that was asked for was not compared. */
  companionNote?: string | null;
}

const toBytes = (values: Float32Array): Buffer => Buffer.from(values.buffer, values.byteOffset, values.byteLength);

/** Columns of the capture's row that follow from its channels. */
function summarise({ result, engineVersion, thresholdsVersion, companion, companionNote }: SaveScreening) {
  const first = result.channels[0]?.screen;
  return {
    state: 'screened' as const,
    progress: 1,
    screenedAt: new Date(),
    failureCode: null,
    failureMessage: null,
    failureLine: null,
    faultCount: 0,
    verdict: result.verdict,
    foldScore: result.foldScore,
    clearToHz: result.clearToHz,
    headline: result.headline,
    sampleRateHz: first?.sampleRateHz ?? null,
    durationS: first?.durationS ?? null,
    channelCount: result.channels.length,
    engineVersion,
    thresholdsVersion,
    companionId: companion?.id ?? null,
    companionBasis: companion?.basis ?? null,
    companionNote: companionNote ?? null,
  };
}

async function insertChannel(manager: EntityManager, captureId: string, channel: ScreenedChannel): Promise<void> {
  const { record, screen, spectra } = channel;
  const row = await manager.save(
    manager.create(ChannelResult, {
      captureId,
      channelIndex: screen.channel,
      measurement: record,
      screen,
      verdict: screen.verdict,
    }),
  );
  await manager.insert(
    Spectrum,
    spectra.map((spectrum) => ({
      channelResultId: row.id,
      kind: spectrum.kind,
      resolutionHz: spectrum.resolutionHz,
      segments: spectrum.segments,
      densityMean: toBytes(spectrum.densityMean),
      densityMedian: spectrum.densityMedian && toBytes(spectrum.densityMedian),
    })),
  );
  await insertFindings(manager, captureId, screen);
}

/** One row a finding, in the channel's order. */
export async function insertFindings(manager: EntityManager, captureId: string, screen: ChannelScreen): Promise<void> {
  const rows = screen.findings.map((finding, position) =>
    manager.create(FindingRow, {
      captureId,
      channelIndex: screen.channel,
      position,
      kind: finding.kind,
      severity: finding.severity,
      confidence: finding.confidence,
      frequencyHz: finding.frequencyHz ?? null,
      finding,
    }),
  );
  await manager.save(rows);
}

/**
 * Replaces everything that is known of a capture by one screening's result. To be called inside a transaction; twice
 * with the same result leaves the same rows.
 * @returns false, with nothing written, when a newer attempt or another end has overtaken this one
 */
export async function saveScreening(manager: EntityManager, save: SaveScreening): Promise<boolean> {
  const { captureId, attempt, result } = save;
  const taken = await manager.update(Capture, { id: captureId, attempt, state: 'screening' }, summarise(save));
  if (taken.affected !== 1) return false;
  await manager.delete(FindingRow, { captureId });
  await manager.delete(ChannelResult, { captureId });
  for (const channel of result.channels) await insertChannel(manager, captureId, channel);
  const { projectId } = await manager.findOneOrFail(Capture, { where: { id: captureId }, select: { projectId: true } });
  await manager.insert(AuditEntry, {
    projectId,
    entityType: 'capture',
    entityId: captureId,
    action: 'screened',
    text: `screened: ${result.verdict}`,
    details: { engineVersion: save.engineVersion, thresholdsVersion: save.thresholdsVersion, attempt } as object,
  });
  return true;
}
