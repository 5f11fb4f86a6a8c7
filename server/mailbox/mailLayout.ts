import { escapeHtml } from './escapeHtml.js';

export interface MailParagraphs {
  heading: string;
  paragraphs: string[];
  /** Ready HTML between paragraphs and action; whoever makes it escapes what it holds. */
  detailHtml?: string;
  /** One thing to do, as a link. */
  action?: { label: string; url: string };
  closing?: string[];
}

const ink = '#1c2a44';

/** Plain HTML that every mail reader shows: no outside images, no fonts, no style sheet. All text is escaped. */
export function mailHtml({ heading, paragraphs, detailHtml = '', action, closing = [] }: MailParagraphs): string {
  const paragraph = (text: string): string => `<p style="margin:0 0 16px">${escapeHtml(text)}</p>`;
  const link = action
    ? `<p style="margin:0 0 16px"><a href="${escapeHtml(action.url)}" style="color:${ink};font-weight:bold">${escapeHtml(action.label)}</a><br><span style="font-size:13px">${escapeHtml(action.url)}</span></p>`
    : '';
  return [
    '<!doctype html><html lang="en"><head><meta charset="utf-8"></head>',
    `<body style="margin:0;background:#faf7f0;color:${ink};font-family:Roboto,Arial,sans-serif;font-size:16px;line-height:1.5">`,
    '<div style="max-width:560px;margin:0 auto;padding:32px 24px">',
    `<h1 style="font-size:20px;margin:0 0 16px">${escapeHtml(heading)}</h1>`,
    ...paragraphs.map(paragraph),
    detailHtml,
    link,
    ...closing.map(paragraph),
    '</div></body></html>',
  ].join('');
}

/** The same as plain text. */
export function mailText({ heading, paragraphs, action, closing = [] }: MailParagraphs): string {
  const link = action ? [`${action.label}:\n${action.url}`] : [];
  return `${[heading, ...paragraphs, ...link, ...closing].join('\n\n')}\n`;
}
