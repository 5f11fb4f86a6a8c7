import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AuditEntry, Batch, Capture, MailMessage, type Project, type User } from '../../../server/entities/index.js';
import { finishBatch, finishDueBatches } from '../../../server/queues/finishBatch.js';
import { lockBatch } from '../../../server/repositories/batchRepository.js';
import { sendToScreening } from '../../../server/repositories/sendToScreening.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildCapture } from '../../support/factories/buildCapture.js';
import { buildMember } from '../../support/factories/buildMember.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { buildScreenedCapture } from '../../support/factories/buildScreenedCapture.js';
import { createTestDependencies, type TestDependencies } from '../../support/testDependencies.js';

let deps: TestDependencies;
let project: Project;
let batch: Batch;
let uploader: User;

beforeEach(async () => {
  deps = await createTestDependencies();
  project = await buildProject(deps.dataSource);
  uploader = await buildMember(deps.dataSource, project.id, ['analyst'], { email: 'ines@marram.example' });
  await buildMember(deps.dataSource, project.id, ['qaManager'], { email: 'quentin@marram.example' });
  await buildMember(deps.dataSource, project.id, ['qaManager'], { email: 'gone@marram.example', isActive: false });
  await buildMember(deps.dataSource, project.id, ['reviewer'], { email: 'ruth@marram.example' });
  batch = await buildBatch(deps.dataSource, project.id, { state: 'screening', completedAt: new Date() });
});
afterEach(() => deps.release());

const finish = (): Promise<boolean> => finishBatch(deps.dataSource, deps.config, batch.id);
const screened = () =>
  buildScreenedCapture(deps.dataSource, batch, { capture: { uploadedById: uploader.id, fileName: 'pump <1>.wav' } });
const reload = (): Promise<Batch> => deps.dataSource.manager.findOneByOrFail(Batch, { id: batch.id });
const mails = (): Promise<MailMessage[]> => deps.dataSource.manager.find(MailMessage, { order: { recipient: 'ASC' } });

describe('finishBatch', () => {
  it('moves the batch to review and writes one mail to each active QA manager and uploader', async () => {
    const { id } = await screened();
    await buildCapture(deps.dataSource, batch, {
      state: 'failed',
      failureCode: 'NOT_WAV',
      failureMessage: 'The file is text.',
      uploadedById: uploader.id,
    });
    expect(await finish()).toBe(true);
    expect(await reload()).toMatchObject({ state: 'review' });
    const written = await mails();
    expect(written.map(({ recipient }) => recipient)).toEqual(['ines@marram.example', 'quentin@marram.example']);
    expect(written[0]?.text).toContain('1 folded');
    expect(written[0]?.text).toContain('1 failed');
    expect(written[0]?.text).toContain(`${deps.config.publicUrl}/captures/${id}`);
    expect(written[0]?.html).toContain('pump &lt;1&gt;.wav');
  });

  it('with many callers at once finishes once and writes each mail once', async () => {
    await screened();
    const answers = await Promise.all(Array.from({ length: 12 }, finish));
    expect(answers.filter(Boolean)).toHaveLength(1);
    expect(await mails()).toHaveLength(2);
    expect(await deps.dataSource.manager.countBy(AuditEntry, { entityId: batch.id, action: 'screened' })).toBe(1);
  });

  it.each(['received', 'queued', 'screening'] as const)('waits while a capture is %s', async (state) => {
    await screened();
    await buildCapture(deps.dataSource, batch, { state });
    expect(await finish()).toBe(false);
    expect(await mails()).toEqual([]);
  });

  it('waits while the batch still takes files', async () => {
    await screened();
    await deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'receiving', completedAt: null });
    expect(await finish()).toBe(false);
  });

  it('does not write a second mail when the batch ends once more after a retry', async () => {
    const capture = await screened();
    await finish();
    const first = await reload();
    await deps.dataSource.manager.update(Batch, { id: batch.id }, { state: 'screening' });
    expect(await finish()).toBe(true);
    expect(await mails()).toHaveLength(2);
    expect((await reload()).screenedAt).toEqual(first.screenedAt);
    expect(capture.state).toBe('screened');
  });

  it('does not end a batch whose capture is being sent back at the same time', async () => {
    const capture = await screened();
    let finishing: Promise<boolean> | undefined;
    await deps.dataSource.transaction(async (manager) => {
      await lockBatch(manager, batch.id);
      finishing = finish();
      // The other transaction is waiting for the lock before this one goes on.
      await expect
        .poll(() => deps.dataSource.query(`SELECT 1 FROM pg_stat_activity WHERE wait_event_type = 'Lock'`))
        .toHaveLength(1);
      await sendToScreening(manager, capture.id);
    });
    expect(await finishing).toBe(false);
    expect(await reload()).toMatchObject({ state: 'screening' });
    await deps.dataSource.manager.update(Capture, { id: capture.id }, { state: 'screened' });
    expect(await finish()).toBe(true);
  });
});

describe('finishDueBatches', () => {
  it('ends batches whose last capture ended while nobody looked, and no others', async () => {
    await screened();
    const open = await buildBatch(deps.dataSource, project.id, { state: 'screening', completedAt: new Date() });
    await buildCapture(deps.dataSource, open, { state: 'queued' });
    await finishDueBatches(deps.dataSource, deps.config);
    expect(await reload()).toMatchObject({ state: 'review' });
    expect(await deps.dataSource.manager.findOneBy(Batch, { id: open.id })).toMatchObject({ state: 'screening' });
  });
});
