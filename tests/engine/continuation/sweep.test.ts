import { describe, expect, it } from 'vitest';

import { pointsOf, runSweep } from './run-sweep';

const SATURATING = ["x' = r*x*(1-x/K) - a*x*y/(1+a*h*x)", "y' = e*a*x*y/(1+a*h*x) - m*y"];
const RATES = { r: 1, a: 1, h: 1, e: 1, m: 0.4, K: 1 };

describe('units do not matter', () => {
  it.each([
    [1e-3, 1e6],
    [365, 1e-4],
    [1, 1e9],
  ])('time in units of %s, densities in units of %s', (time, density) => {
    const sweepIn = (T: number, D: number) =>
      runSweep(
        {
          equations: SATURATING,
          parameters: { r: 1 * T, a: (1 * T) / D, h: 1 / T, e: 1, m: 0.4 * T, K: D },
          init: { x: 0.5 * D, y: 0.5 * D },
          nonnegative: true,
        },
        { parameter: 'K', from: 0.2 * D, to: 4 * D },
      );
    const here = sweepIn(1, 1);
    const there = sweepIn(time, density);
    expect(there.specialPoints.map((point) => point.kind)).toEqual(
      here.specialPoints.map((point) => point.kind),
    );
    there.specialPoints.forEach((point, k) => {
      const known = here.specialPoints[k];
      expect(Math.abs(point.parameter / density / known.parameter - 1)).toBeLessThan(1e-10);
      if (!known.hopf || !point.hopf) return;
      expect(point.hopf.omega / time).toBeCloseTo(known.hopf.omega, 9);
      // l1 has the dimension of one over density squared.
      expect((point.hopf.l1 ?? 0) * density ** 2).toBeCloseTo(known.hopf.l1 ?? NaN, 6);
      expect(point.hopf.criticality).toBe(known.hopf.criticality);
    });
    expect(there.branches).toHaveLength(here.branches.length);
    expect(there.points).toBe(here.points);
  });
});

describe('ranges', () => {
  const input = { equations: SATURATING, parameters: RATES, init: { x: 0.5, y: 0.5 }, nonnegative: true };
  it('may run downwards', () => {
    const up = runSweep(input, { parameter: 'K', from: 0.2, to: 4 });
    const down = runSweep(input, { parameter: 'K', from: 4, to: 0.2 });
    expect(down.specialPoints.map((point) => point.kind)).toEqual(
      up.specialPoints.map((point) => point.kind),
    );
    down.specialPoints.forEach((point, k) =>
      expect(Math.abs(point.parameter - up.specialPoints[k].parameter)).toBeLessThan(1e-10),
    );
    expect([down.from, down.to]).toEqual([4, 0.2]);
  });
  it('hold every equilibrium of every branch, to rounding', () => {
    const result = runSweep(input, { parameter: 'K', from: 0.2, to: 4 });
    for (const branch of result.branches) {
      branch.parameters.forEach((K, k) => {
        const [x, y] = branch.states.slice(2 * k, 2 * k + 2);
        expect(Math.abs(x * (1 - x / K) - (x * y) / (1 + x))).toBeLessThan(1e-13);
        expect(Math.abs((x * y) / (1 + x) - 0.4 * y)).toBeLessThan(1e-13);
        expect(K).toBeGreaterThanOrEqual(0.2);
        expect(K).toBeLessThanOrEqual(4);
        // Absent populations stay at exactly zero.
        if (branch.absent.includes('y')) expect(y).toBe(0);
      });
    }
  });
  it('that begin at a special point, or have the current value on one, hide nothing', () => {
    const spiral = ["x' = mu*x - y - x*(x^2+y^2)", "y' = mu*y + x - y*(x^2+y^2)"];
    const result = runSweep(
      { equations: spiral, parameters: { mu: 0 } },
      { parameter: 'mu', from: -0.53, to: 0.7 },
    );
    expect(pointsOf(result, 'Hopf').map((point) => Math.round(point.parameter * 1e10) + 0)).toEqual([0]);
  });
});

describe('many populations', () => {
  it('competitors with equal rates: one corner, no branch twice, no point invented', () => {
    const result = runSweep(
      {
        equations: [
          "n1' = n1*(r-n1-al*n2-be*n3)",
          "n2' = n2*(r-be*n1-n2-al*n3)",
          "n3' = n3*(r-al*n1-be*n2-n3)",
        ],
        parameters: { al: 0.8, be: 0.9, r: 1 },
        init: { n1: 1, n2: 1, n3: 1 },
        nonnegative: true,
      },
      { parameter: 'r', from: -1, to: 1 },
    );
    expect(result.specialPoints).toHaveLength(1);
    expect(result.specialPoints[0].kind).toBe('transcritical');
    expect(Math.abs(result.specialPoints[0].parameter)).toBeLessThan(1e-10);
    expect([...result.specialPoints[0].invades].sort()).toEqual(['n1', 'n2', 'n3']);
    // Eight faces, one equilibrium on each.
    const faces = result.branches.map((branch) => branch.absent.join(' '));
    expect(new Set(faces).size).toBe(8);
    expect(faces).toHaveLength(8);
  });
  it('three competitors (May & Leonard 1975): the onset at al + be = 2 is degenerate', () => {
    const result = runSweep(
      {
        equations: [
          "n1' = n1*(1-n1-al*n2-be*n3)",
          "n2' = n2*(1-be*n1-n2-al*n3)",
          "n3' = n3*(1-al*n1-be*n2-n3)",
        ],
        parameters: { al: 0.8, be: 0.7 },
        init: { n1: 1, n2: 1, n3: 1 },
        nonnegative: true,
      },
      { parameter: 'be', from: 0.5, to: 1.6 },
    );
    const [hopf] = pointsOf(result, 'Hopf');
    expect(Math.abs(hopf.parameter - 1.2)).toBeLessThan(1e-10);
    expect(hopf.hopf?.criticality).toBe('degenerate');
    // A pair invades or not at be = 1: each of the three boundary equilibria meets its own neighbour.
    expect(pointsOf(result, 'transcritical')).toHaveLength(3);
  });
  it('a food chain: each level invades once, in order', () => {
    const result = runSweep(
      {
        equations: [
          "x' = x*(1-x/K) - 5*x*y/(1+3*x)",
          "y' = 5*x*y/(1+3*x) - 0.1*y*z/(1+2*y) - 0.4*y",
          "z' = 0.1*y*z/(1+2*y) - 0.01*z",
        ],
        parameters: { K: 1 },
        init: { x: 0.5, y: 0.1, z: 1 },
        nonnegative: true,
      },
      { parameter: 'K', from: 0.05, to: 1.5, bands: true },
    );
    const invasions = pointsOf(result, 'transcritical');
    expect(invasions.map((point) => point.invades)).toEqual([['y'], ['z']]);
    // 5x/(1+3x) = 0.4 gives x = 2/19; y = 0.125 there needs K = x/(1 - 5 y/(1+3x)).
    expect(Math.abs(invasions[0].parameter - 2 / 19)).toBeLessThan(1e-10);
    const x = 2 / 19;
    expect(Math.abs(invasions[1].parameter - x / (1 - 0.625 / (1 + 3 * x)))).toBeLessThan(1e-10);
    // Without z a pair crosses as well, but there z can invade: those cycles do not attract.
    const [without, coexistence] = pointsOf(result, 'Hopf');
    expect(without.state[2]).toBe(0);
    expect(without.eigenvalues[0].re).toBeGreaterThan(0);
    expect(without.meaning).toMatch(/repels in another direction/);
    expect(coexistence.meaning).toMatch(/small attracting cycles/);
    expect(result.bands).toHaveLength(1);
    expect(Math.min(...result.bands[0].parameters)).toBeGreaterThan(coexistence.parameter);
  });
});

describe('long-run bands past a Hopf point', () => {
  const result = runSweep(
    { equations: SATURATING, parameters: RATES, init: { x: 0.5, y: 0.5 }, nonnegative: true },
    { parameter: 'K', from: 0.2, to: 3, bands: true },
  );
  it('open as the square root of the distance: amplitude^2 = 2 x (K - K_H), x = 2/3', () => {
    expect(result.bands).toHaveLength(1);
    const [band] = result.bands;
    const width = band.quantities.length;
    const near = [...band.parameters.keys()].filter(
      (k) => band.settled[k] && band.parameters[k] - 7 / 3 < 0.03,
    );
    expect(near.length).toBeGreaterThan(0);
    for (const k of near) {
      const half = (band.highest[k * width] - band.lowest[k * width]) / 2;
      expect(Math.abs(half ** 2 / (band.parameters[k] - 7 / 3) / (4 / 3) - 1)).toBeLessThan(0.1);
    }
  });
  it('hold states and totals, lowest below highest, only where the equilibrium repels', () => {
    const [band] = result.bands;
    expect(band.quantities.slice(0, 2)).toEqual(['x', 'y']);
    expect(Math.min(...band.parameters)).toBeGreaterThan(7 / 3);
    expect(Math.max(...band.parameters)).toBeLessThanOrEqual(3);
    band.lowest.forEach((low, q) => expect(low).toBeLessThan(band.highest[q]));
  });
});
