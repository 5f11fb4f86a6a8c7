import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import {
  AuditEntry,
  type Batch,
  Capture,
  ChannelResult,
  FindingRow,
  Spectrum,
} from '../../../server/entities/index.js';
import { failCapture } from '../../../server/repositories/failCapture.js';
import { saveScreening } from '../../../server/repositories/saveScreening.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildCapture } from '../../support/factories/buildCapture.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { buildFinding, buildScreening } from '../../support/factories/buildScreening.js';
import { createTestDependencies, type TestDependencies } from '../../support/testDependencies.js';

let deps: TestDependencies;
let batch: Batch;
let capture: Capture;

beforeEach(async () => {
  deps = await createTestDependencies();
  batch = await buildBatch(deps.dataSource, (await buildProject(deps.dataSource)).id);
  capture = await buildCapture(deps.dataSource, batch, { state: 'screening', attempt: 2, faultCount: 1 });
});
afterEach(() => deps.release());

const save = (
  attempt = 2,
  result = buildScreening({ findings: [buildFinding(), buildFinding({ kind: 'clipping' })] }),
) =>
  deps.dataSource.transaction((manager) =>
    saveScreening(manager, { captureId: capture.id, attempt, engineVersion: '1.0.0', thresholdsVersion: 1, result }),
  );
const counts = async (): Promise<number[]> => {
  const { manager } = deps.dataSource;
  return [await manager.count(ChannelResult), await manager.count(Spectrum), await manager.count(FindingRow)];
};
const reload = (): Promise<Capture> => deps.dataSource.manager.findOneByOrFail(Capture, { id: capture.id });

describe('saveScreening', () => {
  it('writes result, spectra and findings, and ends the capture', async () => {
    expect(await save()).toBe(true);
    expect(await counts()).toEqual([1, 1, 2]);
    expect(await reload()).toMatchObject({
      state: 'screened',
      verdict: 'folded',
      foldScore: 0.97,
      clearToHz: 1200,
      sampleRateHz: 6000,
      durationS: 10,
      channelCount: 1,
      faultCount: 0,
      thresholdsVersion: 1,
    });
  });

  it('stores spectra as little-endian float32 that read back bit for bit', async () => {
    await save();
    const [spectrum] = await deps.dataSource.manager.find(Spectrum);
    expect(spectrum?.densityMean.byteLength).toBe(4 * 3001);
    expect(spectrum?.densityMean.readFloatLE(4 * 72)).toBe(Math.fround(1e-2));
  });

  it('leaves the same rows when the same screening is run again', async () => {
    await save();
    await deps.dataSource.manager.update(Capture, { id: capture.id }, { state: 'screening' });
    expect(await save()).toBe(true);
    expect(await counts()).toEqual([1, 1, 2]);
  });

  it('writes nothing for an attempt that a newer one has overtaken', async () => {
    await deps.dataSource.manager.update(Capture, { id: capture.id }, { attempt: 3 });
    expect(await save(2)).toBe(false);
    expect(await counts()).toEqual([0, 0, 0]);
    expect(await deps.dataSource.manager.countBy(AuditEntry, { entityId: capture.id })).toBe(0);
    expect(await save(3)).toBe(true);
  });

  it('lets exactly one of two workers with the same attempt write', async () => {
    const answers = await Promise.all([save(), save()]);
    expect(answers.sort()).toEqual([false, true]);
    expect(await counts()).toEqual([1, 1, 2]);
  });

  it('leaves nothing of a result that breaks half way', async () => {
    const result = buildScreening();
    const [channel] = result.channels;
    if (channel) result.channels.push(channel);
    await expect(save(2, result)).rejects.toThrow(/unique/i);
    expect(await counts()).toEqual([0, 0, 0]);
    expect(await reload()).toMatchObject({ state: 'screening' });
  });
});

describe('failCapture', () => {
  const failure = { code: 'RAGGED', message: 'Line 7 has 3 cells instead of 2.', line: 7 };
  const fail = (attempt: number) => failCapture(deps.dataSource, { captureId: capture.id, attempt }, failure);

  it('ends the capture with its reason, once', async () => {
    expect(await fail(2)).toBe(true);
    expect(await fail(2)).toBe(false);
    expect(await reload()).toMatchObject({ state: 'failed', failureCode: 'RAGGED', failureLine: 7 });
    expect(await deps.dataSource.manager.countBy(AuditEntry, { entityId: capture.id, action: 'failed' })).toBe(1);
  });

  it('does not touch a capture that a newer attempt holds', async () => {
    expect(await fail(1)).toBe(false);
    expect(await reload()).toMatchObject({ state: 'screening', failureCode: null });
  });
});
