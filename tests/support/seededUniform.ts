/** Numbers in [0, 1), the same for the same seed (Park & Miller 1988). */
export function seededUniform(seed: number): () => number {
  let state = (seed * 48271) % 2147483647 || 1;
  return () => {
    state = (state * 48271) % 2147483647;
    return (state - 1) / 2147483646;
  };
}
