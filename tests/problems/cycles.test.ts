import { describe, expect, it } from 'vitest';

import type { CycleBranch } from '@/engine/cycles/contract';
import { detectPeriod } from '@/engine/integrators/period';

import { cyclesOf, multiplier } from '../engine/cycles/run-cycles';
import { finish, textbook } from '../support/equations';
import cases from './cases.json';

const VAN_DER_POL = ["x' = y", "y' = mu*(1-x^2)*y - x"];
const BRUSSELATOR = ["x' = A + x^2*y - (B+1)*x", "y' = B*x - x^2*y"];
const ROESSLER = ["x' = -y - z", "y' = x + a*y", "z' = b + z*(x-c)"];

function expectedOf(id: string): Record<string, unknown> {
  const found = cases.find((one) => one.id === id);
  if (!found) throw new Error(`case ${id} is missing`);
  return found.expected as Record<string, unknown>;
}

/** Index of the cycle of a branch at a value of the parameter: an end of the range, where cycles end exactly. */
function indexAt(branch: CycleBranch, value: number): number {
  const at = [...branch.parameters].findIndex((one) => Math.abs(one - value) < 1e-9);
  if (at < 0) throw new Error(`no cycle at ${value}`);
  return at;
}

// Shared case D1. Period and amplitude at mu = 1: Hairer, Norsett & Wanner I, recomputed there at 38 digits.
describe('van der Pol', () => {
  const byMu = expectedOf('D1')['by_mu'] as Record<
    string,
    { T: number; amplitude_x: number; y_max: number; ln_multiplier: number }
  >;
  it.each(['0.1', '1', '5', '10'])('period, amplitude and multiplier at mu = %s', (mu) => {
    const value = Number(mu);
    const system = textbook(VAN_DER_POL, { mu: value }, false);
    const result = cyclesOf(system, 'mu', [value, value * 1.05], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(2, 0)],
      horizon: 60,
    });
    const [branch] = result.branches;
    if (!branch) throw new Error(result.message);
    const k = indexAt(branch, value);
    const expected = byMu[mu]!;
    expect(Math.abs(branch.periods[k]! - expected.T)).toBeLessThan(1e-7);
    expect(Math.abs(branch.highest[2 * k]! - expected.amplitude_x)).toBeLessThan(1e-7);
    expect(Math.abs(branch.highest[2 * k + 1]! - expected.y_max)).toBeLessThan(1e-6);
    expect(Math.abs(Math.log(multiplier(branch, k, 1).re) - expected.ln_multiplier)).toBeLessThan(1e-4);
    expect(branch.trivialError[k]).toBeLessThan(1e-6);
    expect(branch.attracts[k]).toBe(1);
  });
});

// Shared case D2, computed by two routes outside this project.
describe('Brusselator', () => {
  it('grows from its Hopf point to the known cycle at B = 3', () => {
    const expected = expectedOf('D2') as {
      T: number;
      min: number[];
      max: number[];
      ln_multiplier: number;
    };
    const result = cyclesOf(textbook(BRUSSELATOR, { A: 1, B: 2 }), 'B', [1.5, 3]);
    const [branch] = result.branches;
    if (!branch) throw new Error(result.message);
    expect(branch.parameters[0]).toBeCloseTo(2, 10);
    const k = indexAt(branch, 3);
    expect(Math.abs(branch.periods[k]! - expected.T)).toBeLessThan(1e-7);
    for (const i of [0, 1]) {
      expect(Math.abs(branch.lowest[2 * k + i]! - expected.min[i]!)).toBeLessThan(1e-6);
      expect(Math.abs(branch.highest[2 * k + i]! - expected.max[i]!)).toBeLessThan(1e-6);
    }
    expect(Math.abs(Math.log(multiplier(branch, k, 1).re) - expected.ln_multiplier)).toBeLessThan(1e-3);
    // The mean of x over a cycle is A: integrate (x + y)' and y' over one period.
    expect(branch.mean[2 * k]).toBeCloseTo(1, 8);
  });
});

// Cascade of the Roessler equations (a = b = 0.2): doublings near c = 2.83, 3.84 and 4.12, from memory.
describe('Roessler', () => {
  it('doubles its period where the returns of a trajectory do', () => {
    const at = (c: number) => textbook(ROESSLER, { a: 0.2, b: 0.2, c }, false);
    const result = cyclesOf(at(2.5), 'c', [2.5, 4.3], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(1, 1, 0)],
      doublings: 2,
    });
    const doublings = result.specialPoints.filter((one) => one.kind === 'period doubling');
    expect(doublings.map((one) => Number(one.parameter.toFixed(2)))).toEqual([2.83, 3.84, 4.12]);
    const turns = (c: number): number =>
      finish(
        detectPeriod(at(c), Float64Array.of(1, 1, 0), {
          transient: 3000,
          window: 100,
          maximumTime: 600,
          relativeTolerance: 1e-9,
        }),
      ).crossings;
    const [first, second] = doublings.map((one) => one.parameter);
    expect([turns(first! - 0.03), turns(first! + 0.03)]).toEqual([1, 2]);
    expect([turns(second! - 0.02), turns(second! + 0.02)]).toEqual([2, 4]);
  });
});

describe('mesh and units', () => {
  it('the period converges with order 2m in the mesh', () => {
    const exact = 6.66328685932313;
    const error = (intervals: number): number => {
      const result = cyclesOf(textbook(VAN_DER_POL, { mu: 1 }, false), 'mu', [1, 1.01], {
        beginFrom: 'trajectory',
        starts: [Float64Array.of(2, 0)],
        horizon: 60,
        intervals,
        collocationPoints: 2,
        refine: false,
      });
      const [branch] = result.branches;
      if (!branch) throw new Error(result.message);
      return Math.abs(branch.periods[indexAt(branch, 1)]! - exact);
    };
    const orders = [80, 160].map((N) => Math.log2(error(N) / error(2 * N)));
    for (const order of orders) expect(order).toBeGreaterThan(3.6);
  });

  it('other units of time and density move nothing but units', () => {
    const pair = ["x' = r*x*(1-x/K) - a*x*y/(1+a*h*x)", "y' = e*a*x*y/(1+a*h*x) - m*y"];
    const [time, size] = [24, 1e6];
    const one = cyclesOf(textbook(pair, { K: 2, r: 1, a: 1, h: 1, e: 1, m: 0.3 }), 'K', [1, 6]);
    const other = cyclesOf(
      textbook(pair, { K: 2 * size, r: 1 / time, a: 1 / time / size, h: time, e: 1, m: 0.3 / time }),
      'K',
      [size, 6 * size],
    );
    const [a, b] = [one.branches[0]!, other.branches[0]!];
    const [p, q] = [a.parameters.length - 1, b.parameters.length - 1];
    expect(b.periods[q]! / a.periods[p]!).toBeCloseTo(time, 6);
    expect(b.lowest[2 * q]! / a.lowest[2 * p]! / size).toBeCloseTo(1, 6);
    expect(b.highest[2 * q + 1]! / a.highest[2 * p + 1]! / size).toBeCloseTo(1, 6);
    // Densities of a billionth and less keep their digits.
    expect(a.lowest[2 * p]).toBeLessThan(1e-5);
  });
});
