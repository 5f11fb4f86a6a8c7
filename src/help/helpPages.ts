import type { FindingKind } from '@shared/schemas/screening.js';
import { edgePages } from './pages/edgePages';
import { foldPages } from './pages/foldPages';
import { rateAndStampPages } from './pages/rateAndStampPages';
import { recordingPages } from './pages/recordingPages';
import type { HelpPage } from './HelpPage';

/** One page a finding kind: a kind without a page does not compile. */
export const helpPages: Record<FindingKind, HelpPage> = {
  ...foldPages,
  ...edgePages,
  ...recordingPages,
  ...rateAndStampPages,
};

/** The kinds as the overview lists them. */
export const helpGroups: { title: string; pages: HelpPage[] }[] = [
  { title: 'Tones, orders and sweeps', pages: Object.values(foldPages) },
  { title: 'Band edge', pages: Object.values(edgePages) },
  { title: 'The recording itself', pages: Object.values(recordingPages) },
  { title: 'Rate, time stamps and companion', pages: Object.values(rateAndStampPages) },
];
