import type { MailContent } from './MailContent.js';
import { mailHtml, mailText } from './mailLayout.js';

export interface PasswordResetMailData {
  recipientName: string;
  url: string;
  minutesValid: number;
}

export function passwordResetMail({ recipientName, url, minutesValid }: PasswordResetMailData): MailContent {
  const content = {
    heading: `Hello ${recipientName}`,
    paragraphs: ['Somebody asked for a new password for your Overfold account.'],
    action: { label: 'Choose a new password', url },
    closing: [
      `The link works once and for ${minutesValid} minutes. It signs you out everywhere else.`,
      'If it was not you, leave this e-mail alone: your password stays as it is.',
    ],
  };
  return { subject: 'A new password for Overfold', text: mailText(content), html: mailHtml(content) };
}
