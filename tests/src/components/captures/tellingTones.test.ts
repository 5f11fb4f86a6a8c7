import type { Tone } from '@shared/schemas/screening.js';
import { describe, expect, it } from 'vitest';
import { tellingTones } from '@/components/captures/tellingTones';

const tone = (frequencyHz: number, levelDb: number, explanation: Tone['explanation'] = 'harmonic'): Tone => ({
  frequencyHz,
  uncertaintyHz: 0.01,
  levelDb,
  standsOutDb: 20,
  explanation,
  confidence: 0.9,
});

describe('tellingTones', () => {
  it('keeps a short list as it is', () => {
    const tones = [tone(20, -10), tone(10, -20)];
    expect(tellingTones(tones)).toEqual(tones);
  });

  it('keeps folded tones however weak, then the strongest, by frequency', () => {
    const tones = [tone(10, -10), tone(20, -50), tone(30, -30), tone(40, -90, 'foldedOrder'), tone(50, -20)];
    expect(tellingTones(tones, 3).map(({ frequencyHz }) => frequencyHz)).toEqual([10, 40, 50]);
  });
});
