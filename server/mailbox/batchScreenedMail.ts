import { cautionText } from '../../shared/constants/cautions.js';
import type { VerdictCounts } from '../../shared/schemas/batch.js';
import { escapeHtml } from './escapeHtml.js';
import type { MailContent } from './MailContent.js';
import { mailHtml } from './mailLayout.js';

export interface FlaggedCapture {
  fileName: string;
  /** A verdict, or `failed`. */
  outcome: string;
  reason: string;
  url: string;
}

export interface BatchScreenedMailData {
  recipientName: string;
  projectName: string;
  batchName: string;
  counts: VerdictCounts;
  flagged: FlaggedCapture[];
  /** Flagged captures beyond those listed. */
  moreFlagged: number;
  url: string;
}

const countedOutcomes = ['folded', 'unproven', 'limited', 'clear', 'failed'] as const;

const summary = ({ counts }: BatchScreenedMailData): string =>
  countedOutcomes.map((outcome) => `${counts[outcome]} ${outcome}`).join(', ');

const total = ({ counts }: BatchScreenedMailData): number =>
  countedOutcomes.reduce((sum, outcome) => sum + counts[outcome], 0);

function text(data: BatchScreenedMailData): string {
  const flagged = data.flagged.map(
    ({ fileName, outcome, reason, url }) => `- ${fileName}: ${outcome}. ${reason}\n  ${url}`,
  );
  const more = data.moreFlagged > 0 ? [`… and ${data.moreFlagged} more on the batch page.`] : [];
  return `${[
    `Hello ${data.recipientName}`,
    `The batch "${data.batchName}" of ${data.projectName} has been screened: ${total(data)} captures.`,
    summary(data),
    flagged.length > 0 ? `Captures to look at:\n\n${[...flagged, ...more].join('\n')}` : 'No capture was flagged.',
    `Open the batch:\n${data.url}`,
    cautionText,
  ].join('\n\n')}\n`;
}

function html(data: BatchScreenedMailData): string {
  const cell = 'padding:6px 12px 6px 0;vertical-align:top;border-top:1px solid #d9d2c0;font-size:14px';
  const rows = data.flagged
    .map(
      ({ fileName, outcome, reason, url }) =>
        `<tr><td style="${cell}"><a href="${escapeHtml(url)}" style="color:#1c2a44">${escapeHtml(fileName)}</a></td>` +
        `<td style="${cell}">${escapeHtml(outcome)}</td><td style="${cell}">${escapeHtml(reason)}</td></tr>`,
    )
    .join('');
  const table = rows
    ? `<table style="border-collapse:collapse;margin:0 0 16px"><thead><tr>${['Capture', 'Outcome', 'Reason']
        .map((title) => `<th scope="col" style="text-align:left;padding:0 12px 6px 0;font-size:14px">${title}</th>`)
        .join('')}</tr></thead><tbody>${rows}</tbody></table>`
    : '';
  return mailHtml({
    heading: `${data.batchName}: screened`,
    paragraphs: [
      `Hello ${data.recipientName}`,
      `The batch "${data.batchName}" of ${data.projectName} has been screened: ${total(data)} captures.`,
      summary(data),
      rows ? 'Captures to look at:' : 'No capture was flagged.',
    ],
    detailHtml: table,
    action: { label: 'Open the batch', url: data.url },
    closing: [...(data.moreFlagged > 0 ? [`… and ${data.moreFlagged} more on the batch page.`] : []), cautionText],
  });
}

/** Tells a QA manager or uploader what came out of a batch. */
export function batchScreenedMail(data: BatchScreenedMailData): MailContent {
  const flaggedCount = data.counts.folded + data.counts.unproven + data.counts.limited + data.counts.failed;
  return {
    subject: `${data.batchName}: screened, ${flaggedCount} of ${total(data)} to look at`,
    text: text(data),
    html: html(data),
  };
}
