import { describe, expect, it } from 'vitest';
import { classifyMailError } from '../../../worker/mail/classifyMailError.js';

// RFC 5321 section 4.2.1: 4yz transient negative, 5yz permanent negative completion.
describe('classifyMailError', () => {
  it('takes a 5xx answer as final', () => {
    expect(classifyMailError({ responseCode: 550, command: 'RCPT TO' })).toBe('refused');
  });
  it('tries again after a 4xx answer, even to DATA', () => {
    expect(classifyMailError({ responseCode: 451, command: 'DATA' })).toBe('retry');
  });
  it('tries again when the server could not be reached', () => {
    expect(classifyMailError({ code: 'ECONNREFUSED', command: 'CONN' })).toBe('retry');
  });
  it('leaves open whether a message arrived when the link broke after DATA', () => {
    expect(classifyMailError({ code: 'ECONNRESET', command: 'DATA' })).toBe('unknown');
  });
  it('tries again after an error of no known shape', () => {
    expect(classifyMailError('broken')).toBe('retry');
  });
});
