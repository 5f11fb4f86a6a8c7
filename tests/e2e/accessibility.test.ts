import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { Capture } from '../../server/entities/index.js';
import { browserProjects } from '../support/browserProjects.js';
import { everyBatchIsScreened } from '../support/everyBatchIsScreened.js';
import { startSystem, type SystemUnderTest } from '../support/systemUnderTest.js';
import { signInAs } from './signInAs.js';
import { findAccessibilityViolations, WatchedBrowser } from './WatchedBrowser.js';

let system: SystemUnderTest;
let browser: WatchedBrowser;

beforeAll(async () => {
  system = await startSystem(browserProjects);
  browser = await WatchedBrowser.launch(system.url);
  await everyBatchIsScreened(system);
});

afterAll(async () => {
  await browser?.close();
  await system?.stop();
});

/** Every page that an administrator with all roles reaches, with the ids of this installation. */
async function mainPages(): Promise<string[]> {
  const { manager } = system.dataSource;
  const folded = await manager.findOneByOrFail(Capture, { fileName: 'pump-6/drive-end.wav' });
  const failed = await manager.findOneByOrFail(Capture, { state: 'failed' });
  const project = `/projects/${folded.projectId}`;
  return [
    '/',
    '/projects',
    project,
    `${project}/batches/new`,
    `${project}/settings/general`,
    `${project}/settings/thresholds`,
    `${project}/settings/members`,
    `/batches/${folded.batchId}`,
    `/captures/${folded.id}`,
    `/captures/${failed.id}`,
    '/review',
    '/admin/users',
    '/admin/mail',
    '/demo/mail',
    '/account',
    '/help',
    '/help/clearTo',
    '/help/no-such-page',
    '/no-such-page',
  ];
}

describe.each([
  { colorScheme: 'light', width: 1280 },
  { colorScheme: 'dark', width: 1280 },
  { colorScheme: 'light', width: 320 },
] as const)('pages with the $colorScheme theme, $width px wide', ({ colorScheme, width }) => {
  it('have no accessibility violation, no console error and no request to another host', async () => {
    const { page, complaints, close } = await browser.open({ colorScheme, width });
    const found: Record<string, string[]> = {};
    const examine = async (path: string): Promise<void> => {
      await page.getByRole('heading', { level: 1 }).first().waitFor();
      // What is still loading says so.
      await page.waitForFunction(() => !document.querySelector('[role="status"] [role="progressbar"]'));
      const violations = await findAccessibilityViolations(page);
      if (violations.length > 0) found[path] = violations;
      const scrollsSideways = await page.evaluate(
        () => document.documentElement.scrollWidth > document.documentElement.clientWidth,
      );
      if (scrollsSideways) found[path] = [...(found[path] ?? []), 'the page scrolls sideways'];
    };

    for (const path of ['/sign-in', '/forgot', '/help', '/help/foldedTone', '/help/thresholds']) {
      await page.goto(path);
      await examine(path);
    }
    await signInAs(page, 'Administrator');
    for (const path of await mainPages()) {
      await page.goto(path);
      await examine(path);
    }
    await close();
    expect(found).toEqual({});
    expect(complaints).toEqual([]);
  });
});
