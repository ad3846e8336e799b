/**
 * Seeded uniform numbers in [0, 1): mulberry32 (T. Ettinger, public domain, from memory), period 2^32.
 * For sample points of identity tests, where repeatability counts and quality does not.
 */
export function seededRandom(seed: number): () => number {
  let state = seed | 0;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let z = Math.imul(state ^ (state >>> 15), 1 | state);
    z = (z + Math.imul(z ^ (z >>> 7), 61 | z)) ^ z;
    return ((z ^ (z >>> 14)) >>> 0) / 4294967296;
  };
}
