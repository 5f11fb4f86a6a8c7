import type { MailContent } from './MailContent.js';
import { mailHtml, mailText } from './mailLayout.js';

export interface InvitationMailData {
  recipientName: string;
  invitedByName: string;
  url: string;
  daysValid: number;
}

export function invitationMail({ recipientName, invitedByName, url, daysValid }: InvitationMailData): MailContent {
  const content = {
    heading: `Hello ${recipientName}`,
    paragraphs: [
      `${invitedByName} has invited you to Overfold, where your team screens recorded captures for aliasing.`,
      'Choose a password to open your account.',
    ],
    action: { label: 'Choose a password', url },
    closing: [`The link works once and for ${daysValid} days. If you did not expect it, leave this e-mail alone.`],
  };
  return { subject: 'Your invitation to Overfold', text: mailText(content), html: mailHtml(content) };
}
