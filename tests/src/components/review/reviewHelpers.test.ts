import { describe, expect, it } from 'vitest';
import { decisionText } from '@/components/review/decisionText';
import { proposeLimit } from '@/components/review/proposeLimit';
import { reviewKeyAction } from '@/components/review/reviewKeyAction';

describe('proposeLimit', () => {
  it.each([
    [1234, '1200'],
    [319.9, '310'],
    [0.0567, '0.056'],
    [1000, '1000'],
  ])('rounds %s Hz down to %s', (clearToHz, limit) => expect(proposeLimit(clearToHz)).toBe(limit));

  it.each([null, 0, -3])('proposes nothing for %s', (clearToHz) => expect(proposeLimit(clearToHz)).toBe(''));
});

describe('decisionText', () => {
  it('names the limit of a limited acceptance', () => {
    expect(decisionText({ decision: 'acceptTo', limitHz: 310 })).toBe('Accepted up to 310 Hz');
  });

  it('says a decision without a limit in words', () => {
    expect(decisionText({ decision: 'retake', limitHz: null })).toBe('Retake asked');
  });
});

describe('reviewKeyAction', () => {
  it('reads letters when they are on', () => expect(reviewKeyAction('d', true)).toBe('decide'));

  it('ignores letters but not arrows when letters are off', () => {
    expect(reviewKeyAction('d', false)).toBeNull();
    expect(reviewKeyAction('ArrowDown', false)).toBe('next');
  });

  it('ignores other keys', () => expect(reviewKeyAction('x', true)).toBeNull());
});
