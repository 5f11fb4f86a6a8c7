import { describe, expect, it } from 'vitest';
import { markdownReport } from './markdownReport.js';
import { textReport } from './textReport.js';

const table = { title: 'Figures', columns: ['what', 'share'], rows: [['a|b', '3 of 4']], notes: ['Why.'] };

describe('reports', () => {
  it('pads columns for the terminal', () => {
    expect(textReport([table])).toBe('Figures\n  what  share\n  a|b   3 of 4\n  Why.');
  });

  it('escapes bars in tables for the documents', () => {
    expect(markdownReport([table])).toBe('## Figures\n\n| what | share |\n| --- | --- |\n| a\\|b | 3 of 4 |\n\nWhy.\n');
  });
});
