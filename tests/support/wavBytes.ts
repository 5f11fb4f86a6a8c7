/** A 16-bit mono WAV file with a tone; another `seed` gives other bytes. */
export function wavBytes({ frames = 1000, sampleRateHz = 6000, seed = 1 } = {}): Buffer {
  const bytes = Buffer.alloc(44 + 2 * frames);
  bytes.write('RIFF', 0);
  bytes.writeUInt32LE(36 + 2 * frames, 4);
  bytes.write('WAVEfmt ', 8);
  bytes.writeUInt32LE(16, 16);
  bytes.writeUInt16LE(1, 20);
  bytes.writeUInt16LE(1, 22);
  bytes.writeUInt32LE(sampleRateHz, 24);
  bytes.writeUInt32LE(2 * sampleRateHz, 28);
  bytes.writeUInt16LE(2, 32);
  bytes.writeUInt16LE(16, 34);
  bytes.write('data', 36);
  bytes.writeUInt32LE(2 * frames, 40);
  for (let n = 0; n < frames; n += 1) {
    bytes.writeInt16LE(Math.round(9000 * Math.sin((2 * Math.PI * n * (100 + seed)) / sampleRateHz)), 44 + 2 * n);
  }
  return bytes;
}
