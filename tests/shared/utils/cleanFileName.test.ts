import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cleanFileName } from '../../../shared/utils/cleanFileName.js';

describe('cleanFileName', () => {
  it.each([
    ['pump.wav', 'pump.wav'],
    ['hall 2/pump 1.wav', 'hall 2/pump 1.wav'],
    ['../../etc/passwd', 'etc/passwd'],
    ['..\\..\\windows\\win.ini', 'windows/win.ini'],
    ['C:\\data\\a.wav', 'data/a.wav'],
    ['//server/share/a.wav', 'server/share/a.wav'],
    ['a/./b//c.wav', 'a/b/c.wav'],
    [' spaced .wav ', 'spaced .wav'],
    ['line\r\nbreak.wav', 'linebreak.wav'],
    ['abc\u202egnp.wav', 'abcgnp.wav'],
    ['\ufeffbom.wav', 'bom.wav'],
    ['u\u0308ber.wav', '\u00fcber.wav'],
    ['振動.csv', '振動.csv'],
  ])('makes %j into %j', (raw, clean) => {
    expect(cleanFileName(raw)).toBe(clean);
  });

  it.each(['', '   ', '..', '../..', '/', '\u0000', `${'a'.repeat(256)}.wav`, 'abc/'.repeat(300) + 'a.wav'])(
    'leaves nothing of %j',
    (raw) => {
      expect(cleanFileName(raw)).toBeNull();
    },
  );

  it('never leaves a way up, a drive or a control character, and cleaning twice changes nothing', () => {
    fc.assert(
      fc.property(fc.string({ unit: 'binary', maxLength: 60 }), (raw) => {
        const clean = cleanFileName(raw);
        if (clean === null) return;
        expect(clean.split('/').some((part) => part === '' || part === '.' || part === '..')).toBe(false);
        expect([...clean].every((character) => character >= ' ' && character !== '\\')).toBe(true);
        expect(cleanFileName(clean)).toBe(clean);
      }),
    );
  });
});
