/** Numbers that look drawn and are the same for the same seed: mulberry32, 32 bits of state. */
export function drawFrom(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 4_294_967_296;
  };
}

export type Draw = ReturnType<typeof drawFrom>;

export function pick<One>(draw: Draw, from: readonly One[]): One {
  const one = from[Math.floor(draw() * from.length)];
  if (one === undefined) throw new Error('There is nothing to pick from.');
  return one;
}
