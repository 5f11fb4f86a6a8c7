import type { Page } from 'playwright-core';

export type DemoRole = 'Analyst' | 'Reviewer' | 'QA manager' | 'Administrator';

/** Signs in with one of the accounts that the demo's sign-in page offers. */
export async function signInAs(page: Page, role: DemoRole): Promise<void> {
  await page.goto('/sign-in');
  await page.getByRole('button', { name: role }).click();
  await page.waitForURL((url) => url.pathname === '/');
}
