import { describe, expect, it } from 'vitest';
import { batchScreenedMail, type BatchScreenedMailData } from '../../../server/mailbox/batchScreenedMail.js';
import { cautionText } from '../../../shared/constants/cautions.js';

const data = (overrides: Partial<BatchScreenedMailData> = {}): BatchScreenedMailData => ({
  recipientName: 'Quentin Marsh',
  projectName: 'Ferrow Quay',
  batchName: 'Pump hall 2',
  counts: { clear: 4, limited: 1, folded: 2, unproven: 0, failed: 1, pending: 0 },
  flagged: [
    { fileName: 'pump-1.wav', outcome: 'folded', reason: '72 Hz is folded.', url: 'https://o.example/captures/1' },
  ],
  moreFlagged: 3,
  url: 'https://o.example/batches/7',
  ...overrides,
});

describe('batchScreenedMail', () => {
  it('says in both forms how many captures came out how, which to look at and why, and carries the cautions', () => {
    const { subject, text, html } = batchScreenedMail(data());
    expect(subject).toBe('Pump hall 2: screened, 4 of 8 to look at');
    for (const form of [text, html]) {
      expect(form).toContain('2 folded, 0 unproven, 1 limited, 4 clear, 1 failed');
      expect(form).toContain('pump-1.wav');
      expect(form).toContain('72 Hz is folded.');
      expect(form).toContain('https://o.example/captures/1');
      expect(form).toContain('https://o.example/batches/7');
      expect(form).toContain('3 more');
      expect(form).toContain(cautionText);
    }
  });

  it('says so when nothing was flagged', () => {
    const { text, html } = batchScreenedMail(data({ flagged: [], moreFlagged: 0 }));
    expect(text).toContain('No capture was flagged.');
    expect(html).toContain('No capture was flagged.');
    expect(html).not.toContain('<table');
  });

  it('leaves hostile names as text', () => {
    const hostile = '<img src=x onerror=alert(1)>{{7*7}}';
    const { html } = batchScreenedMail(
      data({
        batchName: hostile,
        projectName: hostile,
        flagged: [{ fileName: hostile, outcome: 'folded', reason: hostile, url: 'https://o.example/captures/1' }],
      }),
    );
    expect(html).not.toContain('<img');
    expect(html).toContain('{{7*7}}');
  });
});
