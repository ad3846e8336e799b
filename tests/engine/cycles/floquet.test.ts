import { describe, expect, it } from 'vitest';

import { periodicEigenvalues } from '@/engine/cycles/floquet';
import { eigenvalues } from '@/engine/linalg/eigenvalues';

/** Well conditioned maps near the identity, from a fixed seed. */
function randomMaps(N: number, n: number): Float64Array {
  let seed = 7;
  const random = (): number => {
    seed = (seed * 48271) % 2147483647;
    return seed / 2147483647 - 0.5;
  };
  const maps = new Float64Array(N * n * n);
  for (let k = 0; k < N; k += 1)
    for (let i = 0; i < n; i += 1)
      for (let j = 0; j < n; j += 1) maps[(k * n + i) * n + j] = (i === j ? 1 : 0) + 0.5 * random();
  return maps;
}

function product(maps: Float64Array, N: number, n: number): Float64Array {
  let whole = Float64Array.from({ length: n * n }, (_, e) => (e % (n + 1) === 0 ? 1 : 0));
  for (let k = 0; k < N; k += 1) {
    const next = new Float64Array(n * n);
    for (let i = 0; i < n; i += 1)
      for (let j = 0; j < n; j += 1)
        for (let l = 0; l < n; l += 1) next[i * n + j]! += maps[(k * n + i) * n + l]! * whole[l * n + j]!;
    whole = next;
  }
  return whole;
}

describe('eigenvalues of a product of maps', () => {
  it.each([2, 3, 5, 8])('are those of the product, n = %i', (n) => {
    const N = 6;
    const maps = randomMaps(N, n);
    const { nontrivial } = periodicEigenvalues(maps, N, n);
    const { re, im } = eigenvalues(product(maps, N, n), n);
    const expected = Array.from(re, (value, k) => ({ re: value, im: im[k]! })).sort(
      (a, b) => Math.hypot(b.re, b.im) - Math.hypot(a.re, a.im) || b.im - a.im,
    );
    const size = Math.hypot(expected[0]!.re, expected[0]!.im);
    nontrivial.forEach((value, k) => {
      expect(Math.hypot(value.re - expected[k]!.re, value.im - expected[k]!.im) / size).toBeLessThan(1e-8);
    });
  });

  it('keep their relative accuracy over 200 orders of magnitude', () => {
    const [N, n] = [100, 3];
    // Triangular, so that the eigenvalues of the product are the products of the diagonals.
    const maps = new Float64Array(N * n * n);
    for (let k = 0; k < N; k += 1) {
      maps.set([10, 1, -2, 0, 1, 3, 0, 0, 0.1], k * n * n);
    }
    const { logModuli } = periodicEigenvalues(maps, N, n);
    expect(logModuli[0]).toBeCloseTo(N * Math.log(10), 9);
    expect(logModuli[1]).toBeCloseTo(0, 9);
    expect(logModuli[2]).toBeCloseTo(-N * Math.log(10), 9);
  });
});
