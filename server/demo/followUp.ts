import { setTimeout as pause } from 'node:timers/promises';
import { demoAccounts } from './demoAccounts.js';
import { demoProjects } from './demoProjects.js';
import { DemoReviewer } from './DemoReviewer.js';

const pauseMs = 3_000;
const limitMs = 15 * 60_000;

/** Runs beside a demo installation until its batches have been screened and the planned decisions are made. */
async function followUp(apiUrl: string): Promise<void> {
  const account = demoAccounts.find(({ role }) => role === 'Reviewer');
  if (!account) throw new Error('The demo has no reviewer.');
  const reviewer = new DemoReviewer(apiUrl);
  await reviewer.signIn(account.email, account.password);
  const batches = demoProjects.flatMap((project) => project.batches);
  const endMs = Date.now() + limitMs;
  while ((await reviewer.decide(batches)) && Date.now() < endMs) await pause(pauseMs);
}

followUp(`http://127.0.0.1:${process.env.PORT ?? '4400'}/api/v1`).catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
