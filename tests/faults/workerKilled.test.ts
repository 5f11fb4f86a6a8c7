import { afterEach, describe, expect, it } from 'vitest';
import { Batch, Capture, ChannelResult, FindingRow, Spectrum } from '../../server/entities/index.js';
import { faultProjects } from '../support/faultProjects.js';
import { startSystem, type SystemUnderTest } from '../support/systemUnderTest.js';
import { waitUntil } from '../support/waitUntil.js';

const captureCount = 8;
let system: SystemUnderTest | null = null;

afterEach(async () => {
  await system?.stop();
  system = null;
});

const openCount = (running: SystemUnderTest): Promise<number> =>
  running.dataSource.manager
    .createQueryBuilder(Capture, 'capture')
    .where(`capture.state NOT IN ('screened', 'failed')`)
    .getCount();

async function batchIsDone(running: SystemUnderTest): Promise<void> {
  await waitUntil(
    'the batch is in review',
    async () => (await running.dataSource.manager.findOneByOrFail(Batch, {})).state === 'review',
    { limitMs: 150_000, describe: () => Promise.resolve(running.logs()) },
  );
}

/** What a reader of the results would notice if anything had been done twice or not at all. */
async function readResults(running: SystemUnderTest) {
  const { manager } = running.dataSource;
  const captures = await manager.find(Capture, { order: { fileName: 'ASC' } });
  return {
    captures: captures.map(({ fileName, state, verdict, failureCode }) => ({ fileName, state, verdict, failureCode })),
    channels: await manager.count(ChannelResult),
    spectra: await manager.count(Spectrum),
    findings: await manager.count(FindingRow),
  };
}

describe('a worker killed in the middle of a batch', () => {
  it('leaves nothing that the next worker does not finish, once, with one mail to each recipient', async () => {
    const undisturbed = await startSystem(faultProjects(captureCount));
    system = undisturbed;
    await batchIsDone(undisturbed);
    const expected = await readResults(undisturbed);
    await undisturbed.stop();
    expect(expected.captures.filter(({ state }) => state === 'screened')).toHaveLength(captureCount);
    expect(expected.captures.filter(({ failureCode }) => failureCode === 'NON_NUMERIC')).toHaveLength(1);

    const running = await startSystem(faultProjects(captureCount), { hasWorker: false });
    system = running;
    for (let kill = 0; kill < 2; kill += 1) {
      const worker = running.startWorker();
      const openBefore = await openCount(running);
      await waitUntil('a capture is being screened and some are left', async () => {
        const isBusy = await running.dataSource.manager.existsBy(Capture, { state: 'screening' });
        return isBusy && (kill === 0 || (await openCount(running)) < openBefore);
      });
      await worker.kill();
      expect(await openCount(running)).toBeGreaterThan(0);
    }
    running.startWorker();
    await batchIsDone(running);

    expect(await readResults(running)).toEqual(expected);
    await waitUntil('the mails are there', async () => (await running.mails()).length >= 3);
    // Time enough for a second one to be sent, if anything meant to.
    await new Promise((resolve) => setTimeout(resolve, 2_000));
    const recipients = (await running.mails()).map(({ to }) =>
      [to ?? []]
        .flat()
        .map(({ text }) => text)
        .join(),
    );
    expect(recipients.sort()).toEqual(['ines@marram.example', 'ove@marram.example', 'yara@marram.example']);
  });
});
