/** Deterministic numbers in (-1, 1): a linear congruential generator is enough for test matrices. */
export function makeNumbers(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
    return (state / 2 ** 32) * 2 - 1;
  };
}

export function randomMatrix(n: number, seed: number): Float64Array {
  const next = makeNumbers(seed);
  return Float64Array.from({ length: n * n }, next);
}

export function multiply(a: Float64Array, x: ArrayLike<number>, n: number): Float64Array {
  return Float64Array.from({ length: n }, (_, i) => {
    let sum = 0;
    for (let j = 0; j < n; j += 1) sum += a[i * n + j] * x[j];
    return sum;
  });
}
