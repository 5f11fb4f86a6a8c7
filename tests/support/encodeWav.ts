/** A 16-bit PCM WAV file of one or more channels with values in −1 … 1. */
export function encodeWav(channels: Float64Array[], sampleRateHz: number): Buffer {
  const frames = channels[0]?.length ?? 0;
  const frameBytes = 2 * channels.length;
  const data = Buffer.alloc(44 + frameBytes * frames);
  data.write('RIFF', 0, 'latin1');
  data.writeUInt32LE(36 + frameBytes * frames, 4);
  data.write('WAVEfmt ', 8, 'latin1');
  data.writeUInt32LE(16, 16);
  data.writeUInt16LE(1, 20);
  data.writeUInt16LE(channels.length, 22);
  data.writeUInt32LE(sampleRateHz, 24);
  data.writeUInt32LE(sampleRateHz * frameBytes, 28);
  data.writeUInt16LE(frameBytes, 32);
  data.writeUInt16LE(16, 34);
  data.write('data', 36, 'latin1');
  data.writeUInt32LE(frameBytes * frames, 40);
  channels.forEach((samples, c) =>
    samples.forEach((value, n) => {
      const code = Math.max(-32768, Math.min(32767, Math.round(32767 * value)));
      data.writeInt16LE(code, 44 + frameBytes * n + 2 * c);
    }),
  );
  return data;
}
