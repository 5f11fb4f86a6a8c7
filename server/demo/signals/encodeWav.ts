import wavefile from 'wavefile';

const fullScale = { '16': 2 ** 15, '24': 2 ** 23 } as const;

/** PCM file of samples within ±1; the channels have the same length. */
export function encodeWav(channels: Float64Array[], sampleRateHz: number, bits: keyof typeof fullScale = '24'): Buffer {
  const scale = fullScale[bits];
  const whole = channels.map((samples) =>
    samples.map((value) => Math.max(-scale, Math.min(scale - 1, Math.round(value * scale)))),
  );
  const file = new wavefile.WaveFile();
  file.fromScratch(whole.length, sampleRateHz, bits, whole.length === 1 ? (whole[0] as Float64Array) : whole);
  return Buffer.from(file.toBuffer());
}
