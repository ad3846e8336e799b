import { describe, expect, it } from 'vitest';

import { textbook } from '../../support/equations';
import { cyclesOf, onlyBranch } from './run-cycles';

const CLASSIC = ["x' = r*x - a*x*y", "y' = a*x*y - m*y"];

describe('branches of cycles end with a reason', () => {
  // Homoclinic explosion of the Lorenz equations at r = 13.926557 (Sparrow 1982, from memory).
  it('at a homoclinic orbit, from the subcritical Hopf point of the Lorenz equations', () => {
    const system = textbook(
      ["x' = s*(y-x)", "y' = x*(r-z) - y", "z' = x*y - b*z"],
      { r: 20, s: 10, b: 8 / 3 },
      false,
    );
    const result = cyclesOf(system, 'r', [5, 30], { starts: [Float64Array.of(1, 1, 20)] });
    expect(result.branches).toHaveLength(2);
    for (const branch of result.branches) {
      // r = s (s + b + 3)/(s - b - 1) = 470/19, exact.
      expect(branch.parameters[0]).toBeCloseTo(470 / 19, 8);
      expect(branch.endEnd.reason).toBe('approaches a homoclinic orbit');
      expect(branch.parameters.at(-1)).toBeCloseTo(13.926557, 5);
      expect([...branch.attracts].slice(1).every((one) => one === 0)).toBe(true);
    }
  });

  it('at the Hopf point at the other end of a bubble of cycles', () => {
    // r' = r (mu (1 - mu) - r^2): cycles of radius sqrt(mu (1 - mu)) between mu = 0 and 1.
    const grow = '(mu*(1-mu) - x^2 - y^2)';
    const system = textbook([`x' = x*${grow} - y`, `y' = y*${grow} + x`], { mu: 0.5 }, false);
    const branch = onlyBranch(cyclesOf(system, 'mu', [-0.5, 1.5]));
    expect(branch.endEnd.reason).toBe('shrank to a Hopf point');
    expect(
      Math.min(Math.abs(branch.parameters.at(-1)! - 1), Math.abs(branch.parameters.at(-1)!)),
    ).toBeLessThan(1e-3);
  });

  it('on a closed loop of cycles that no Hopf point begins', () => {
    // Radius rho with (rho - 2)^2 + (mu - 1)^2 = 1/4: an isola.
    const r = 'sqrt(x^2+y^2)';
    const grow = `(1/4 - (${r}-2)^2 - (mu-1)^2)`;
    const system = textbook([`x' = x*${grow} - y`, `y' = y*${grow} + x`], { mu: 1 }, false);
    const result = cyclesOf(system, 'mu', [0, 2], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(2.4, 0)],
      horizon: 60,
    });
    const branch = onlyBranch(result);
    expect(branch.startEnd.reason === 'closed on itself' || branch.endEnd.reason === 'closed on itself').toBe(
      true,
    );
    expect(result.specialPoints.map((one) => one.parameter).sort()).toEqual([
      expect.closeTo(0.5, 7),
      expect.closeTo(1.5, 7),
    ]);
  });

  it('where a whole family of cycles lies at one value: the classic neutral pair', () => {
    const system = textbook(CLASSIC, { r: 1, a: 1, m: 1 });
    const result = cyclesOf(system, 'm', [0.5, 2], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(0.5, 1)],
      horizon: 40,
    });
    expect(result.branches.every((one) => /family/.test(one.endEnd.message))).toBe(true);
    expect(result.specialPoints).toHaveLength(0);
  });

  it('without a branch where the trajectory rests or there is no Hopf point', () => {
    const system = textbook(["x' = x*(1 - x/K)"], { K: 2 });
    expect(cyclesOf(system, 'K', [1, 3]).message).toMatch(/No Hopf point/);
    const rests = cyclesOf(system, 'K', [1, 3], { beginFrom: 'trajectory', horizon: 20 });
    expect(rests.message).toMatch(/rests/);
    expect(rests.status).toBe('complete');
  });

  it('refuses a parameter that is none and a range without length', () => {
    const system = textbook(CLASSIC, { r: 1, a: 1, m: 1 });
    expect(cyclesOf(system, 'q', [0, 1]).status).toBe('failed');
    expect(cyclesOf(system, 'm', [1, 1]).message).toMatch(/two different/);
  });
});
