import { writeFileSync } from 'node:fs';
import wavefile from 'wavefile';

/** Bit depths that the library writes: integers as they are, '32f' and '64' as floating point. */
export type WavBitDepth = '8' | '12' | '16' | '20' | '24' | '32' | '32f' | '64';

/** Writes a WAV with a library that shares no code with the readers, so that reading it back checks them from outside. */
export function writeWav(
  path: string,
  channels: number[][],
  { sampleRateHz, bitDepth, container = 'RIFF' }: { sampleRateHz: number; bitDepth: WavBitDepth; container?: string },
): void {
  const file = new wavefile.WaveFile();
  const samples = channels.length === 1 ? (channels[0] ?? []) : channels;
  file.fromScratch(channels.length, sampleRateHz, bitDepth, samples, { container });
  writeFileSync(path, file.toBuffer());
}
