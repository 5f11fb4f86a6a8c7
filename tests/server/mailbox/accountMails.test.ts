import { describe, expect, it } from 'vitest';
import { escapeHtml } from '../../../server/mailbox/escapeHtml.js';
import { invitationMail } from '../../../server/mailbox/invitationMail.js';
import { passwordResetMail } from '../../../server/mailbox/passwordResetMail.js';

const url = 'https://overfold.example/invitation/abc-DEF_123';
const hostile = '<img src=x onerror=alert(1)> {{7*7}} <%= 1 %> "quoted" & more';

describe('escapeHtml', () => {
  it('replaces the five characters that mean something in HTML', () => {
    expect(escapeHtml(`<a href="x" title='y'>&</a>`)).toBe(
      '&lt;a href=&quot;x&quot; title=&#39;y&#39;&gt;&amp;&lt;/a&gt;',
    );
  });
});

describe('invitationMail', () => {
  it('carries names, link and validity in text and HTML', () => {
    const mail = invitationMail({ recipientName: 'Ines', invitedByName: 'Ove', url, daysValid: 7 });
    expect(mail.subject).toBe('Your invitation to Overfold');
    for (const body of [mail.text, mail.html]) {
      expect(body).toContain('Ines');
      expect(body).toContain('Ove has invited you');
      expect(body).toContain(url);
      expect(body).toContain('7 days');
    }
  });

  it('shows hostile names literally', () => {
    const mail = invitationMail({ recipientName: hostile, invitedByName: hostile, url, daysValid: 7 });
    expect(mail.text).toContain(hostile);
    expect(mail.html).not.toContain('<img');
    expect(mail.html).toContain('&lt;img src=x onerror=alert(1)&gt; {{7*7}} &lt;%= 1 %&gt;');
  });

  it('fetches nothing from outside', () => {
    const { html } = invitationMail({ recipientName: 'Ines', invitedByName: 'Ove', url, daysValid: 7 });
    expect(html).not.toMatch(/<(img|link|script|iframe)|src=|@import|url\(/);
  });
});

describe('passwordResetMail', () => {
  it('carries link and validity in text and HTML', () => {
    const mail = passwordResetMail({ recipientName: 'Ines', url, minutesValid: 60 });
    for (const body of [mail.text, mail.html]) {
      expect(body).toContain(url);
      expect(body).toContain('60 minutes');
      expect(body).toContain('If it was not you');
    }
  });
});
