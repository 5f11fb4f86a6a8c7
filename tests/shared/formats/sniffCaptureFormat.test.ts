import { describe, expect, it } from 'vitest';
import { CaptureError } from '../../../shared/formats/CaptureError.js';
import { sniffCaptureFormat } from '../../../shared/formats/sniffCaptureFormat.js';

const latin = (text: string): Uint8Array => Uint8Array.from(text, (character) => character.charCodeAt(0));

function codeOf(bytes: Uint8Array, name?: string): string {
  try {
    return sniffCaptureFormat(bytes, name);
  } catch (error) {
    if (error instanceof CaptureError) return error.code;
    throw error;
  }
}

describe('sniffCaptureFormat', () => {
  it.each(['RIFF', 'RIFX', 'RF64', 'BW64'])('takes %s with WAVE for a WAV', (form) => {
    expect(codeOf(latin(`${form}\x00\x00\x00\x00WAVEfmt `))).toBe('wav');
  });

  it('refuses a RIFF file that holds something else', () => {
    expect(codeOf(latin('RIFF\x00\x00\x00\x00AVI LIST'))).toBe('NOT_WAV');
  });

  it('takes text for a table, with a byte-order mark of UTF-16 too', () => {
    expect(codeOf(latin('time,a\n0,1\n'))).toBe('csv');
    expect(codeOf(latin('\xff\xfet\x00,\x00'))).toBe('csv');
  });

  it.each([
    ['ZIP', 'PK\x03\x04'],
    ['gzip', '\x1f\x8b\x08'],
    ['FLAC', 'fLaC\x00'],
    ['MP3', 'ID3\x04'],
    ['AIFF', 'FORM\x00\x00\x00\x00AIFF'],
    ['AU', '.snd\x00'],
    ['unknown bytes', 'abc\x00\x01'],
  ])('refuses %s as BINARY, and as NOT_WAV under the name of a recording', (_kind, content) => {
    expect(codeOf(latin(content))).toBe('BINARY');
    expect(codeOf(latin(content), 'a.wav')).toBe('NOT_WAV');
  });

  it('refuses a web page and says what to do', () => {
    expect(codeOf(latin('<!DOCTYPE html><html>'))).toBe('NOT_CSV');
    expect(() => sniffCaptureFormat(latin('<html>'))).toThrow(/Download the capture itself/);
  });

  it('refuses an empty file', () => {
    expect(codeOf(new Uint8Array())).toBe('EMPTY_FILE');
  });

  it('refuses content that the name contradicts', () => {
    expect(codeOf(latin('time,a\n0,1\n'), 'a.wav')).toBe('NOT_WAV');
    expect(codeOf(latin('RIFF\x00\x00\x00\x00WAVEfmt '), 'a.csv')).toBe('NOT_CSV');
    expect(codeOf(latin('time,a\n0,1\n'), 'a.csv')).toBe('csv');
  });
});
