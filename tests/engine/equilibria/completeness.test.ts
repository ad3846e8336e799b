import { describe, expect, it } from 'vitest';

import { solveLinear } from '@/engine/linalg/solve';

import { equilibriaOf, textbook } from '../../support/equations';

/** Uniform numbers from a seed (Park & Miller's minimal standard generator). */
function uniform(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48_271) % 2_147_483_647;
    return state / 2_147_483_647;
  };
}

/** All feasible equilibria of u_i' = u_i (r_i - sum_j a_ij u_j), by solving a linear system for every subset. */
function bySubsets(r: readonly number[], a: readonly (readonly number[])[]): number[][] {
  const n = r.length;
  const found: number[][] = [];
  for (let mask = 0; mask < 2 ** n; mask += 1) {
    const present = r.map((_, i) => i).filter((i) => (mask >> i) % 2 === 1);
    const m = present.length;
    const A = Float64Array.from(present.flatMap((i) => present.map((j) => a[i][j])));
    const x =
      m === 0
        ? new Float64Array(0)
        : solveLinear(
            A,
            Float64Array.from(present, (i) => r[i]),
            m,
          );
    if (x === null || x.some((value) => value <= 1e-9)) continue;
    const state = r.map(() => 0);
    present.forEach((i, k) => (state[i] = x[k]));
    found.push(state);
  }
  return found;
}

describe('searches find every equilibrium of random communities (Lotka-Volterra, solved exactly)', () => {
  it.each([3, 4, 5, 6])('%s species', (n) => {
    for (let seed = 1; seed <= 12; seed += 1) {
      const next = uniform(97 * seed + n);
      const r = Array.from({ length: n }, () => 0.2 + next());
      const a = r.map((_, i) => r.map((_x, j) => (i === j ? 0.5 + next() : 1.2 * next() - 0.2)));
      const equations = r.map(
        (growth, i) => `u${i}' = u${i}*(${growth} - (${a[i].map((w, j) => `(${w})*u${j}`).join(' + ')}))`,
      );
      const starts = [new Float64Array(n).fill(1)];
      const found = equilibriaOf(textbook(equations), { starts });
      const expected = bySubsets(r, a);
      expect(found.equilibria.length, `seed ${seed}`).toBe(expected.length);
      for (const state of expected) {
        const gap = Math.min(
          ...found.equilibria.map((e) =>
            Math.max(...state.map((x, i) => Math.abs(e.state[i] - x) / (1 + x))),
          ),
        );
        expect(gap, `seed ${seed}`).toBeLessThan(1e-9);
      }
    }
  });

  it('finds the states of a saturating consumer of prey with an Allee effect', () => {
    // x = m/(a (e - m h)) at coexistence, where it lies between A and K; besides, prey alone at 0, A and K.
    const equations = ["x' = r*x*(1-x/K)*(x/A-1) - a*x*y/(1+a*h*x)", "y' = e*a*x*y/(1+a*h*x) - m*y"];
    const parameters = { r: 1, K: 10, A: 1, a: 1, h: 0.2, e: 0.6, m: 1 };
    const x = 1 / (0.6 - 0.2);
    const found = equilibriaOf(textbook(equations, parameters));
    expect(found.equilibria).toHaveLength(4);
    expect(found.equilibria[0].state[0]).toBeCloseTo(x, 10);
    expect(equilibriaOf(textbook(equations, { ...parameters, m: 0.3 })).equilibria).toHaveLength(3);
  });

  it('finds all 81 states of four bistable patches without coupling', () => {
    const patches = ['p', 'q', 'r', 's'];
    const equations = patches.map((x) => `${x}' = c + ${x}*(1-${x})*(${x}-0.5)`);
    // c = 0.01 keeps three roots in each patch, so 3^4 in all.
    expect(
      equilibriaOf(textbook(equations, { c: 0.01 }, false), { box: patches.map(() => ({ from: -1, to: 2 })) })
        .equilibria,
    ).toHaveLength(81);
  });
});
