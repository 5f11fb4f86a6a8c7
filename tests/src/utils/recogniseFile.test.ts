import { describe, expect, it } from 'vitest';
import { recogniseBytes } from '@/utils/recogniseFile';

/** A mono 16-bit WAV header as RIFF/WAVE lays it out, followed by silence. */
function wavBytes(sampleRateHz: number, frames: number): Uint8Array {
  const bytes = new Uint8Array(44 + frames * 2);
  const view = new DataView(bytes.buffer);
  const text = (at: number, value: string): void => bytes.set(new TextEncoder().encode(value), at);
  text(0, 'RIFF');
  view.setUint32(4, bytes.length - 8, true);
  text(8, 'WAVEfmt ');
  view.setUint32(16, 16, true);
  view.setUint16(20, 1, true);
  view.setUint16(22, 1, true);
  view.setUint32(24, sampleRateHz, true);
  view.setUint32(28, sampleRateHz * 2, true);
  view.setUint16(32, 2, true);
  view.setUint16(34, 16, true);
  text(36, 'data');
  view.setUint32(40, frames * 2, true);
  return bytes;
}

describe('recogniseBytes', () => {
  it('reads rate, channels and duration of a WAV header', () => {
    const bytes = wavBytes(8000, 4000);
    expect(recogniseBytes(bytes, { name: 'a.wav', size: bytes.length })).toEqual({
      format: 'wav',
      sampleRateHz: 8000,
      channelCount: 1,
      durationS: 0.5,
    });
  });

  it('recognises the columns of a CSV', () => {
    const rows = Array.from({ length: 20 }, (_, index) => `${index / 100},${Math.sin(index)},${index}`);
    const bytes = new TextEncoder().encode(['time,a,b', ...rows].join('\n'));
    expect(recogniseBytes(bytes, { name: 'a.csv', size: bytes.length })).toMatchObject({
      format: 'csv',
      channelCount: 2,
    });
  });

  it('refuses an empty file', () => {
    expect(recogniseBytes(new Uint8Array(), { name: 'a.wav', size: 0 })).toMatchObject({
      format: 'refused',
      code: 'EMPTY_FILE',
    });
  });
});
