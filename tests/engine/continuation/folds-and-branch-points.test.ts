import { describe, expect, it } from 'vitest';

import { pointsOf, runSweep } from './run-sweep';

describe('strong Allee effect under harvest (closed form)', () => {
  const result = runSweep(
    {
      equations: ["x' = r*x*(1-x/K)*(x/A-1) - q*E*x"],
      parameters: { r: 0.9, K: 12, A: 3, q: 0.2, E: 1.2 },
      init: { x: 8 },
      nonnegative: true,
    },
    { parameter: 'E', from: 0, to: 4 },
  );
  it('folds at E = r (K-A)^2/(4 A K q), x = (K+A)/2', () => {
    expect(result.specialPoints).toHaveLength(1);
    const [fold] = pointsOf(result, 'fold');
    expect(Math.abs(fold.parameter - 2.53125)).toBeLessThan(1e-10);
    expect(Math.abs(fold.state[0] - 7.5)).toBeLessThan(1e-7);
  });
  it('attracts on the upper arm, repels on the lower, and extinction attracts throughout', () => {
    const arms = result.branches.find((branch) => branch.absent.length === 0);
    const extinct = result.branches.find((branch) => branch.absent.includes('x'));
    if (!arms || !extinct) throw new Error('two branches are expected');
    arms.parameters.forEach((E, k) => {
      const x = arms.states[k];
      const root = Math.sqrt(Math.max(0, 81 / 4 - (0.2 * E * 36) / 0.9));
      expect(Math.abs(Math.abs(x - 7.5) - root)).toBeLessThan(1e-6);
      if (root > 1e-3) expect(arms.attracts[k]).toBe(x > 7.5 ? 1 : 0);
    });
    expect([...extinct.attracts]).not.toContain(0);
    expect([...extinct.states].every((x) => x === 0)).toBe(true);
    // f'(0) = -r - q E.
    extinct.parameters.forEach((E, k) => expect(extinct.leading[k]).toBeCloseTo(-0.9 - 0.2 * E, 12));
  });
});

describe('spruce budworm (Ludwig, Jones & Holling 1978): k = 2x^3/(x^2-1), r = 2x^3/(1+x^2)^2', () => {
  it.each([
    [6, 0.6171611624217678, 0.5910954862945774],
    [10, 0.5595250124456357, 0.3839707316274608],
    [20, 0.5270894556699132, 0.1979997937490933],
  ])('k = %s', (k, upper, lower) => {
    const result = runSweep(
      {
        equations: ["x' = r*x*(1-x/k) - x^2/(1+x^2)"],
        parameters: { r: 0.5, k },
        init: { x: 1 },
        nonnegative: true,
      },
      { parameter: 'r', from: 0.1, to: 0.8 },
    );
    const folds = pointsOf(result, 'fold');
    expect(folds).toHaveLength(2);
    expect(Math.abs(folds[0].parameter - lower)).toBeLessThan(1e-11);
    expect(Math.abs(folds[1].parameter - upper)).toBeLessThan(1e-11);
    for (const { state } of folds)
      expect(Math.abs((2 * state[0] ** 3) / (state[0] ** 2 - 1) - k)).toBeLessThan(1e-5);
    expect(result.specialPoints).toHaveLength(2);
  });
});

describe('normal forms (textbook)', () => {
  it('pitchfork: both arms are one branch, nothing is followed twice', () => {
    const result = runSweep(
      { equations: ["x' = mu*x - x^3"], parameters: { mu: -0.5 } },
      { parameter: 'mu', from: -1, to: 1 },
    );
    expect(result.specialPoints.map((point) => point.kind)).toEqual(['pitchfork']);
    expect(Math.abs(result.specialPoints[0].parameter)).toBeLessThan(1e-10);
    expect(result.branches).toHaveLength(2);
    const arms = result.branches.find((branch) => Math.abs(branch.states[0]) > 0.5);
    if (!arms) throw new Error('the arms are missing');
    arms.parameters.forEach((mu, k) => expect(Math.abs(arms.states[k] ** 2 - mu)).toBeLessThan(1e-9));
    expect(arms.states[0] * arms.states[arms.states.length - 1]).toBeLessThan(0);
  });
  it('transcritical: x = mu', () => {
    const result = runSweep(
      { equations: ["x' = mu*x - x^2"], parameters: { mu: -0.5 } },
      { parameter: 'mu', from: -1, to: 1 },
    );
    expect(result.specialPoints.map((point) => point.kind)).toEqual(['transcritical']);
    expect(Math.abs(result.specialPoints[0].parameter)).toBeLessThan(1e-10);
    expect(result.branches).toHaveLength(2);
    const other = result.branches.find((branch) => branch.states[0] !== 0);
    other?.parameters.forEach((mu, k) => expect(Math.abs(other.states[k] - mu)).toBeLessThan(1e-9));
    expect(other).toBeDefined();
  });
  it('pitchfork in two dimensions: v = u^2, u^2 = mu/2', () => {
    const result = runSweep(
      { equations: ["u' = mu*u - u^3 - u*v", "v' = -v + u^2"], parameters: { mu: -0.5 } },
      { parameter: 'mu', from: -1, to: 1 },
    );
    expect(result.specialPoints.map((point) => point.kind)).toEqual(['pitchfork']);
    const arms = result.branches[1];
    arms.parameters.forEach((mu, k) => {
      const [u, v] = arms.states.slice(2 * k, 2 * k + 2);
      expect(Math.abs(u * u - mu / 2)).toBeLessThan(1e-9);
      expect(Math.abs(v - u * u)).toBeLessThan(1e-9);
    });
  });
  it('a perturbed pitchfork has a fold and no branch point: h = 2 (mu/3)^(3/2)', () => {
    const h = 1e-3;
    const result = runSweep(
      { equations: ["x' = h + mu*x - x^3"], parameters: { mu: -0.5, h } },
      { parameter: 'mu', from: -1, to: 1 },
    );
    expect(result.specialPoints.map((point) => point.kind)).toEqual(['fold']);
    expect(Math.abs(result.specialPoints[0].parameter - 3 * (h / 2) ** (2 / 3))).toBeLessThan(1e-10);
  });
  it('a closed branch is found from inside the range, closes on itself and has two folds', () => {
    const result = runSweep(
      { equations: ["u' = p^2 + u^2 - 1"], parameters: { p: 0 } },
      { parameter: 'p', from: -2, to: 2 },
    );
    expect(result.branches).toHaveLength(1);
    expect(result.branches[0].endEnd.reason).toBe('closed on itself');
    expect(
      result.specialPoints.map((point) => [point.kind, Math.round(point.parameter * 1e10) / 1e10]),
    ).toEqual([
      ['fold', -1],
      ['fold', 1],
    ]);
  });
});

describe('two crossings within one step', () => {
  it('of a pair: mu = d^2 - (p - c)^2 crosses at c +- d', () => {
    const growth = '(1e-6 - (p-0.3)^2)';
    const result = runSweep(
      {
        equations: [`x' = ${growth}*x - y - x*(x^2+y^2)`, `y' = x + ${growth}*y - y*(x^2+y^2)`],
        parameters: { p: 0 },
      },
      { parameter: 'p', from: -1, to: 1 },
    );
    const values = pointsOf(result, 'Hopf').map((point) => point.parameter);
    expect(values).toHaveLength(2);
    expect(Math.abs(values[0] - 0.299)).toBeLessThan(1e-10);
    expect(Math.abs(values[1] - 0.301)).toBeLessThan(1e-10);
  });
  it('of a real eigenvalue', () => {
    const result = runSweep(
      { equations: ["x' = ((p-0.3)^2 - 1e-6)*x - x^3"], parameters: { p: 0 } },
      { parameter: 'p', from: -1, to: 1 },
    );
    const values = pointsOf(result, 'pitchfork').map((point) => point.parameter);
    expect(values).toHaveLength(2);
    expect(Math.abs(values[0] - 0.299)).toBeLessThan(1e-10);
    expect(Math.abs(values[1] - 0.301)).toBeLessThan(1e-10);
  });
});

describe('the quadratic coefficient of a fold', () => {
  // x' = b + s x^2 has it exactly s at x = b = 0, in units of the scale of x.
  it.each([1, -1])('has the sign of the curvature %i, and is told beside the point', (s) => {
    const result = runSweep(
      { equations: [`x' = b + ${s}*x^2`], parameters: { b: -s }, init: { x: 1 } },
      { parameter: 'b', from: -1, to: 1 },
    );
    const fold = result.specialPoints.find((one) => one.kind === 'fold');
    expect(Math.sign(fold?.foldCoefficient ?? NaN)).toBe(s);
  });
});
