import { describe, expect, it } from 'vitest';

import { pointsOf, runSweep } from './run-sweep';

const SATURATING = ["x' = r*x*(1-x/K) - a*x*y/(1+a*h*x)", "y' = e*a*x*y/(1+a*h*x) - m*y"];

describe('saturating predator and self-regulated prey (Rosenzweig & MacArthur 1963; closed forms re-derived)', () => {
  it.each([
    [{ r: 1, a: 1, h: 1, e: 1, m: 0.4 }, -0.29982158785219526, 0.08571428571428572],
    [{ r: 0.8, a: 1.2, h: 0.6, e: 0.7, m: 0.35 }, -0.25112906849143424, 0.046523076923076924],
  ])('%j', (rates, l1, speed) => {
    const { r, a, h, e, m } = rates;
    const result = runSweep(
      { equations: SATURATING, parameters: { ...rates, K: 1 }, init: { x: 0.5, y: 0.5 }, nonnegative: true },
      { parameter: 'K', from: 0.2, to: 4 },
    );
    expect(result.status).toBe('complete');
    const x = m / (a * (e - m * h));
    const [invasion, ...others] = pointsOf(result, 'transcritical');
    expect(others).toHaveLength(0);
    expect(Math.abs(invasion.parameter - x)).toBeLessThan(1e-10);
    expect(invasion.invades).toEqual(['y']);
    expect(invasion.state[1]).toBe(0);
    const [hopf, ...more] = pointsOf(result, 'Hopf');
    expect(more).toHaveLength(0);
    expect(Math.abs(hopf.parameter - (e + m * h) / (a * h * (e - m * h)))).toBeLessThan(1e-10);
    const omega = Math.sqrt((m * r) / (1 + 2 * a * h * x));
    expect(Math.abs((hopf.hopf?.omega ?? 0) - omega)).toBeLessThan(1e-10);
    expect(hopf.hopf?.criticality).toBe('supercritical');
    expect(Math.abs((hopf.hopf?.l1 ?? 0) / l1 - 1)).toBeLessThan(1e-8);
    expect(Math.abs((hopf.hopf?.crossingSpeed ?? 0) - speed)).toBeLessThan(1e-7);
    expect(hopf.meaning).toMatch(/attracting cycles/);
    expect(hopf.accuracy).toBeLessThan(1e-10);
    // The equilibrium attracts just before and repels just after.
    const branch = result.branches[hopf.branch];
    const sides = [branch.attracts[hopf.index], branch.attracts[hopf.index + 1]];
    expect(sides.sort()).toEqual([0, 1]);
    const [low, high] = [branch.parameters[hopf.index], branch.parameters[hopf.index + 1]];
    expect((low - hopf.parameter) * (high - hopf.parameter)).toBeLessThanOrEqual(0);
  });
});

describe('Brusselator (Prigogine & Lefever; l1 by hand at A = 1: -1/2)', () => {
  it.each([
    [1, -0.5],
    [2, -1 / 6],
  ])('A = %s', (A, l1) => {
    const result = runSweep(
      {
        equations: ["x' = A + x^2*y - (B+1)*x", "y' = B*x - x^2*y"],
        parameters: { A, B: 1 },
        init: { x: 1, y: 1 },
        nonnegative: true,
      },
      { parameter: 'B', from: 0.5, to: 8 },
    );
    const [hopf] = pointsOf(result, 'Hopf');
    expect(Math.abs(hopf.parameter - (1 + A * A))).toBeLessThan(1e-10);
    expect(Math.abs((hopf.hopf?.omega ?? 0) - A)).toBeLessThan(1e-10);
    expect(Math.abs((hopf.hopf?.l1 ?? 0) - l1)).toBeLessThan(1e-9);
    expect(result.specialPoints).toHaveLength(1);
  });
});

describe('Lorenz 1963, with the onset s(s+b+3)/(s-b-1) = 470/19 (Sparrow 1982)', () => {
  const result = runSweep(
    {
      equations: ["x' = s*(y-x)", "y' = x*(r-z) - y", "z' = x*y - b*z"],
      parameters: { s: 10, r: 0.5, b: 8 / 3 },
      init: { x: 1, y: 1, z: 1 },
    },
    { parameter: 'r', from: 0.2, to: 30 },
  );
  it('has one pitchfork at r = 1', () => {
    const forks = pointsOf(result, 'pitchfork');
    expect(forks).toHaveLength(1);
    expect(Math.abs(forks[0].parameter - 1)).toBeLessThan(1e-9);
    expect(pointsOf(result, 'fold')).toHaveLength(0);
  });
  it('has a subcritical Hopf point on either wing', () => {
    const hopfs = pointsOf(result, 'Hopf');
    expect(hopfs).toHaveLength(2);
    for (const point of hopfs) {
      expect(Math.abs(point.parameter - 470 / 19)).toBeLessThan(1e-9);
      expect(Math.abs((point.hopf?.omega ?? 0) - 9.624530063715756)).toBeLessThan(1e-9);
      expect(Math.abs((point.hopf?.l1 ?? 0) / 0.00026551897258367144 - 1)).toBeLessThan(1e-6);
      expect(point.hopf?.criticality).toBe('subcritical');
      expect(point.meaning).toMatch(/repelling cycles/);
    }
  });
  it('ends both branches exactly at the ends of the range', () => {
    const ends = result.branches.flatMap((b) => [b.parameters[0], b.parameters[b.parameters.length - 1]]);
    expect(ends.sort((a, b) => a - b)).toEqual([0.2, 30, 30, 30]);
  });
});

describe('polar normal forms with known l1', () => {
  it("subcritical: r' = r(mu + r^2 - r^4), l1 = 2", () => {
    const rho = '(x^2+y^2)';
    const result = runSweep(
      {
        equations: [`x' = x*(mu + ${rho} - ${rho}^2) - y`, `y' = y*(mu + ${rho} - ${rho}^2) + x`],
        parameters: { mu: -0.5 },
      },
      { parameter: 'mu', from: -0.5, to: 0.7 },
    );
    const [hopf] = pointsOf(result, 'Hopf');
    expect(Math.abs(hopf.parameter)).toBeLessThan(1e-10);
    // z' = (mu + i) z + z|z|^2 has c1 = 1; with <q,q> = 1, q = (1, -i)/sqrt 2, l1 = 2 Re c1 / omega.
    expect(hopf.hopf?.l1).toBeCloseTo(2, 9);
    expect(hopf.hopf?.criticality).toBe('subcritical');
  });
  it('degenerate: no cubic term, so nothing is said of small cycles', () => {
    const result = runSweep(
      {
        equations: ["x' = mu*x - y - x*(x^2+y^2)^2", "y' = mu*y + x - y*(x^2+y^2)^2"],
        parameters: { mu: 0 },
      },
      { parameter: 'mu', from: -0.53, to: 0.7 },
    );
    const [hopf] = pointsOf(result, 'Hopf');
    expect(hopf.hopf?.criticality).toBe('degenerate');
    expect(hopf.meaning).toMatch(/not told from zero/);
  });
});

describe('two sexes of a saturating predator', () => {
  const rates = { r: 1, a: 1, h: 1, e: 1, m: 0.4, s: 0, K: 1 };
  const sweepOf = (s: number) =>
    runSweep(
      {
        equations: [
          "x' = r*x*(1-x/K) - a*x*(y1+y2)/(1+a*h*x)",
          "y1' = e*a*x*(y1+y2)/(1+a*h*x)/2 - m*(1+s)*y1",
          "y2' = e*a*x*(y1+y2)/(1+a*h*x)/2 - m*(1-s)*y2",
        ],
        parameters: { ...rates, s },
        init: { x: 0.5, y1: 0.3, y2: 0.3 },
        nonnegative: true,
      },
      { parameter: 'K', from: 0.2, to: 6 },
    );
  it('have the onset of the pooled predator where their mortalities are equal', () => {
    const [equal] = pointsOf(sweepOf(0), 'Hopf');
    expect(Math.abs(equal.parameter - 7 / 3)).toBeLessThan(1e-9);
    expect(equal.hopf?.criticality).toBe('supercritical');
  });
  it('have the onset of the Routh-Hurwitz condition c2 c1 = c0 where they differ', () => {
    const spread = 0.5;
    const [m1, m2] = [0.4 * (1 + spread), 0.4 * (1 - spread)];
    // Births balance deaths: phi (1/m1 + 1/m2)/2 = 1 with phi = x/(1 + x).
    const phi = 2 / (1 / m1 + 1 / m2);
    const x = phi / (1 - phi);
    const margin = (K: number): number => {
      const slope = (1 - x / K) / (1 + x);
      const a = 1 - (2 * x) / K - slope;
      // Jacobian [[a, -phi, -phi], [s, phi/2 - m1, phi/2], [s, phi/2, phi/2 - m2]], s = slope/2.
      const [p, q, s, half] = [phi / 2 - m1, phi / 2 - m2, slope / 2, phi / 2];
      const c2 = -(a + p + q);
      const c1 = a * p + a * q + 2 * phi * s + p * q - half * half;
      const det = a * (p * q - half * half) + phi * (s * q - half * s) - phi * (s * half - p * s);
      return c2 * c1 + det;
    };
    let [low, high] = [x * 1.05, 6];
    for (let k = 0; k < 60; k += 1) {
      const middle = (low + high) / 2;
      if (margin(middle) > 0) low = middle;
      else high = middle;
    }
    const [apart] = pointsOf(sweepOf(spread), 'Hopf');
    expect(Math.abs(apart.parameter - low)).toBeLessThan(1e-9);
    expect(apart.hopf?.criticality).toBe('supercritical');
  });
});
