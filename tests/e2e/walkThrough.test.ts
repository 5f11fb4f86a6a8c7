import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { pumpHallTwo } from '../../server/demo/batches/pumpHallTwo.js';
import { SeededRandom } from '../../server/demo/signals/SeededRandom.js';
import { browserProjects } from '../support/browserProjects.js';
import { everyBatchIsScreened } from '../support/everyBatchIsScreened.js';
import { startSystem, type SystemUnderTest } from '../support/systemUnderTest.js';
import { signInAs } from './signInAs.js';
import { WatchedBrowser, type WatchedPage } from './WatchedBrowser.js';

let system: SystemUnderTest;
let browser: WatchedBrowser;
let visit: WatchedPage;

beforeAll(async () => {
  system = await startSystem(browserProjects);
  browser = await WatchedBrowser.launch(system.url);
  await everyBatchIsScreened(system);
});

afterAll(async () => {
  await browser?.close();
  await system?.stop();
});

afterEach(async () => {
  await visit.close();
});

/** A file of the demo's signals with other random numbers: bytes that this installation has not seen. */
function freshFile(fileName: string, name: string) {
  const capture = pumpHallTwo.captures.find((entry) => entry.fileName === fileName);
  if (!capture) throw new Error(`The demo has no ${fileName}.`);
  return { name, mimeType: 'audio/wav', buffer: capture.make(new SeededRandom(4711)) };
}

describe('the way through the product', () => {
  it('lets an analyst upload a batch, follow its screening and read the evidence', async () => {
    visit = await browser.open();
    const { page, complaints } = visit;
    await signInAs(page, 'Analyst');
    await page.getByRole('navigation', { name: 'Main' }).getByRole('link', { name: 'Projects' }).click();
    await page.getByRole('link', { name: 'Ferrow Quay, pump halls' }).click();
    await page.getByRole('link', { name: 'New batch' }).click();

    await page.getByLabel('Name of the batch').fill('Evening round');
    const [chooser] = await Promise.all([
      page.waitForEvent('filechooser'),
      page.getByRole('button', { name: 'Choose files' }).click(),
    ]);
    await chooser.setFiles([
      freshFile('pump-8/filter-in.wav', 'evening-1.wav'),
      freshFile('pump-6/drive-end.wav', 'evening-2.wav'),
      { name: 'letter.wav', mimeType: 'audio/wav', buffer: Buffer.from('%PDF-1.7 this is no recording') },
    ]);
    const row = (name: string) => page.getByRole('row').filter({ hasText: name });
    await row('evening-1.wav')
      .getByText(/2048 Hz/)
      .waitFor();
    await row('letter.wav').getByText('Refused').waitFor();
    await page.getByRole('button', { name: /Upload and screen 2/ }).click();

    await page.waitForURL(/\/batches\//);
    await page.getByRole('heading', { name: 'Evening round' }).waitFor();
    await page.getByText('In review', { exact: true }).waitFor({ timeout: 90_000 });
    await row('evening-1.wav').getByText('Clear', { exact: true }).waitFor();
    await row('evening-2.wav').getByText('Folded', { exact: true }).waitFor();

    await page.getByRole('link', { name: 'evening-2.wav' }).click();
    await page.getByRole('heading', { name: 'evening-2.wav' }).waitFor();
    await page.getByText('A recording cannot prove the absence of aliasing by itself').waitFor();
    const chart = page.getByRole('img', { name: /folding frequency/i });
    await chart.waitFor();
    await page.getByRole('button', { name: 'Numbers' }).click();
    await page.getByRole('columnheader', { name: 'Density in dB' }).waitFor();
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'CSV', exact: true }).click(),
    ]);
    expect(download.suggestedFilename()).toMatch(/\.csv$/);
    // An analyst is no reviewer: the panel says so instead of offering what would be refused.
    await page.getByText('Only a reviewer of this project may decide').waitFor();
    expect(await page.getByRole('button', { name: 'Save the decision' }).count()).toBe(0);
    expect(complaints).toEqual([]);
  });

  it('sends the QA manager one summary of a batch, and shows it among the caught mail', async () => {
    visit = await browser.open();
    const { page, complaints } = visit;
    await signInAs(page, 'QA manager');
    await page.getByRole('link', { name: 'Caught mail' }).click();
    const messages = page.getByRole('list', { name: 'Messages' }).getByRole('button');
    await messages.filter({ hasText: 'after the change of loggers' }).filter({ hasText: 'yara@' }).click();
    await page.getByText('pump-6/drive-end.wav').first().waitFor();

    const summaries = (await system.mails()).filter(({ subject }) => subject?.includes('after the change of loggers'));
    const recipients = summaries.map(({ to }) =>
      [to ?? []]
        .flat()
        .map(({ text }) => text)
        .join(),
    );
    expect(recipients.sort()).toEqual(['ines@marram.example', 'ove@marram.example', 'yara@marram.example']);
    expect(complaints).toEqual([]);
  });

  it('lets a reviewer decide, with reason, name and time kept after a reload', async () => {
    visit = await browser.open();
    const { page, complaints } = visit;
    await signInAs(page, 'Reviewer');
    await page.getByRole('link', { name: 'Review', exact: true }).click();
    await page.getByRole('button', { name: 'Decide on pump-6/gearbox.wav' }).click();
    const panel = page.getByRole('complementary', { name: 'Decide' });
    await panel.getByLabel('Ask for a retake').check();
    await panel.getByLabel('Reason').fill('The tooth mesh folds into the band.');
    await panel.getByRole('button', { name: 'Save the decision' }).click();
    await panel.waitFor({ state: 'detached' });
    await page.getByRole('button', { name: 'Decide on pump-6/gearbox.wav' }).waitFor({ state: 'detached' });

    await page.goto('/review?decided=yes');
    await page.getByRole('link', { name: 'pump-6/gearbox.wav' }).click();
    await page.getByText('Retake asked').first().waitFor();
    await page.getByText('The tooth mesh folds into the band.').first().waitFor();
    await page.reload();
    await page.getByText('Retake asked').first().waitFor();
    await page.getByText('Tomas Helder').first().waitFor();
    expect(complaints).toEqual([]);
  });

  it('lets an administrator change the thresholds of a project and see who did it', async () => {
    visit = await browser.open();
    const { page, complaints } = visit;
    await signInAs(page, 'Administrator');
    await page.getByRole('link', { name: 'Users' }).click();
    await page.getByRole('cell', { name: 'ines@marram.example' }).waitFor();
    await page.getByRole('link', { name: 'Projects' }).click();
    await page.getByRole('link', { name: 'Ferrow Quay, pump halls' }).click();
    await page.getByRole('link', { name: 'Settings' }).click();
    await page.getByRole('navigation', { name: 'Settings' }).getByRole('link', { name: 'Thresholds' }).click();
    await page.getByLabel('Required protection', { exact: true }).fill('46');
    await page.getByLabel('Why this change?').fill('The client asks for 46 dB.');
    await page.getByRole('button', { name: /Save/ }).click();
    await page.getByText('The client asks for 46 dB.').waitFor();
    expect(complaints).toEqual([]);
  });

  it('shows a page that is not there to whoever is no member of the project', async () => {
    const project = await system.dataSource.query<{ id: string }[]>(
      `SELECT id FROM projects WHERE name = 'Somebody else’s project'`,
    );
    visit = await browser.open();
    const { page } = visit;
    await signInAs(page, 'Analyst');
    await page.goto(`/projects/${project[0]?.id}`);
    await page
      .getByText(/not (there|found)|no such|cannot be found|can’t be found/i)
      .first()
      .waitFor();
    expect(await page.getByText('Somebody else’s project').count()).toBe(0);
  });

  it('ends a session for good: the pages behind it ask for a new sign-in', async () => {
    visit = await browser.open();
    const { page } = visit;
    await signInAs(page, 'Reviewer');
    await page.getByRole('button', { name: 'Tomas Helder' }).click();
    await page.getByRole('button', { name: 'Sign out', exact: true }).click();
    await page.waitForURL(/\/sign-in/);
    await page.goto('/review');
    await page.waitForURL(/\/sign-in\?next=/);
  });
});
