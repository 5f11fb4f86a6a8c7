/** Noise between −1 and 1, the same for the same seed, so that a figure never changes (linear congruential generator). */
export function seededNoise(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return state / 0x8000_0000 - 1;
  };
}
