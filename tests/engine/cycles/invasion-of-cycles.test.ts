import { describe, expect, it } from 'vitest';

import { textbook } from '../../support/equations';
import { cyclesOf, multiplier } from './run-cycles';

/**
 * A saturating predator-prey pair on its cycle and a third population that neither of them feels, with
 * per capita growth c*x - d: on the pair's cycle its Floquet exponent is c*mean(x) - d, and by the
 * predator's balance its mean saturating intake is m/e; own derivation.
 */
const PAIR = ["x' = x*(1-x/K) - x*y/(1+x)", "y' = x*y/(1+x) - m*y"];

describe('a population that a cycle keeps out', () => {
  it('has the multiplier that its mean growth rate says', () => {
    const system = textbook([...PAIR, "z' = z*(x/(1+x) - d - z)"], { K: 4, m: 0.4, d: 0.5 });
    const result = cyclesOf(system, 'K', [3, 5], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(1, 1, 0)],
    });
    const [branch] = result.branches;
    if (!branch) throw new Error(result.message);
    for (let k = 0; k < branch.parameters.length; k += 1) {
      // Mean of x/(1+x) over the cycle is m exactly.
      const expected = Math.exp((0.4 - 0.5) * branch.periods[k]!);
      const found = [1, 2].map((j) => multiplier(branch, k, j).re);
      expect(Math.min(...found.map((value) => Math.abs(value / expected - 1)))).toBeLessThan(1e-6);
      expect(branch.highest[k * 3 + 2]).toBe(0);
    }
  });

  it('invades where that multiplier passes 1, and the branch with it is entered', () => {
    // z feels the pair's predator: growth c*x - d; along d the exponent is mean(c x) - d.
    const system = textbook([...PAIR, "z' = z*(x/(1+x) - d - z)"], { K: 4, m: 0.4, d: 0.5 });
    const result = cyclesOf(system, 'd', [0.3, 0.5], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(1, 1, 0)],
    });
    const [point] = result.specialPoints;
    expect(point?.kind).toBe('branch point of cycles');
    expect(point?.parameter).toBeCloseTo(0.4, 7);
    expect(result.branches).toHaveLength(2);
    const [, invaded] = result.branches;
    const last = invaded!.parameters.length - 1;
    expect(invaded!.parameters[last]).toBeCloseTo(0.3, 10);
    // On the cycle with z, the mean of z is the mean of x/(1+x) less d: 0.4 - 0.3.
    expect(invaded!.mean[last * 3 + 2]).toBeCloseTo(0.1, 6);
    expect(invaded!.attracts[last]).toBe(1);
  });
});
