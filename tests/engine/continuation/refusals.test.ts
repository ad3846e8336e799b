import { describe, expect, it } from 'vitest';

import { sweep } from '@/engine/continuation/sweep';

import { finish, textbook } from '../../support/equations';
import { pointsOf, runSweep } from './run-sweep';

describe('what is no Hopf point', () => {
  it('a neutral family along the parameter: a note, no point', () => {
    const result = runSweep(
      {
        equations: ["x' = r*x - x*y", "y' = x*y - y"],
        parameters: { r: 1 },
        init: { x: 1, y: 1 },
        nonnegative: true,
      },
      { parameter: 'r', from: 0.2, to: 3 },
    );
    expect(result.specialPoints).toHaveLength(0);
    expect(result.message).toMatch(/neutral or nearly so/);
    const coexistence = result.branches.find((branch) => branch.absent.length === 0);
    expect(coexistence && [...coexistence.attracts].every((value) => value === 2)).toBe(true);
  });
  it('a real part that touches zero and turns back', () => {
    const result = runSweep(
      {
        equations: ["x' = -(p-0.3)^2*x - y - x*(x^2+y^2)", "y' = x - (p-0.3)^2*y - y*(x^2+y^2)"],
        parameters: { p: 0 },
      },
      { parameter: 'p', from: -1, to: 1 },
    );
    expect(result.specialPoints).toHaveLength(0);
  });
  it('spread that only stabilises: real part -eps^2/4 on both sides of 0', () => {
    const result = runSweep(
      {
        equations: ["x' = x - x*(y1+y2)", "y1' = x*(y1+y2)/2 - (1+eps)*y1", "y2' = x*(y1+y2)/2 - (1-eps)*y2"],
        parameters: { eps: 0.1 },
        init: { x: 1, y1: 0.5, y2: 0.5 },
        nonnegative: true,
      },
      { parameter: 'eps', from: -0.9, to: 0.9 },
    );
    expect(result.specialPoints).toHaveLength(0);
  });
  it('two real eigenvalues whose sum passes zero', () => {
    const result = runSweep(
      { equations: ["x' = 0.5*x - x^3", "y' = -p*y - y^3"], parameters: { p: 1 } },
      { parameter: 'p', from: 0.1, to: 1 },
    );
    expect(pointsOf(result, 'Hopf')).toHaveLength(0);
  });
});

describe('what is withheld or refused', () => {
  it('l1 at a kink, but not far from one', () => {
    const rates = { r: 1, a: 1, h: 1, e: 1, m: 0.4, K: 1 };
    const sweepWith = (kink: string) =>
      runSweep(
        {
          equations: [`x' = r*x*(1-x/K) - a*x*y/(1+a*h*x) + 0.1*${kink}`, "y' = e*a*x*y/(1+a*h*x) - m*y"],
          parameters: rates,
          init: { x: 0.5, y: 0.5 },
          nonnegative: true,
        },
        { parameter: 'K', from: 0.9, to: 4 },
      );
    // The Hopf point lies at x = 2/3; the kink at x = 5, or just beside it.
    const [far] = pointsOf(sweepWith('min(0, 5 - x)'), 'Hopf');
    expect(far.hopf?.l1).toBeCloseTo(-0.29982158785219526, 8);
    const [near] = pointsOf(sweepWith('min(0, 0.667 - x)'), 'Hopf');
    expect(near.hopf?.l1).toBeNull();
    expect(near.hopf?.criticality).toBe('withheld');
    expect(near.meaning).toMatch(/kink/);
  });
  it('formulas with time', () => {
    const result = runSweep(
      { equations: ["x' = r*x*(1 + sin(t) - x)"], parameters: { r: 1 } },
      { parameter: 'r', from: 0, to: 1 },
    );
    expect(result.status).toBe('needs-period-map');
    expect(result.message).toMatch(/period map/);
    expect(result.branches).toHaveLength(0);
  });
  it('an empty range, and a parameter that is none', () => {
    const system = { equations: ["x' = r*x*(1 - x)"], parameters: { r: 1 } };
    expect(runSweep(system, { parameter: 'r', from: 1, to: 1 }).status).toBe('failed');
    expect(runSweep(system, { parameter: 'r', from: 0, to: Infinity }).message).toMatch(
      /two different finite ends/,
    );
    expect(runSweep(system, { parameter: 'q', from: 0, to: 1 }).message).toMatch(/not one of this model/);
  });
  it('a line of equilibria at one value of the parameter is said, not drawn as a branch', () => {
    const result = runSweep(
      {
        equations: ["x' = x*(p - x - y)", "y' = y*(1 - x - y)"],
        parameters: { p: 0.5 },
        init: { x: 1, y: 1 },
        nonnegative: true,
      },
      { parameter: 'p', from: 0.1, to: 2 },
    );
    expect(result.message).toMatch(/whole curve of such states/);
    expect(result.branches.map((branch) => branch.absent.join(' ')).sort()).toEqual(['x', 'x y', 'y']);
    // Each excludes the other on its side of p = 1.
    expect(pointsOf(result, 'transcritical').map((point) => Math.round(point.parameter * 1e9) / 1e9)).toEqual(
      [1, 1],
    );
  });
  it('no equilibrium at all is said', () => {
    const result = runSweep(
      { equations: ["x' = 1 + p^2"], parameters: { p: 1 } },
      { parameter: 'p', from: 0, to: 1 },
    );
    expect(result.status).toBe('complete');
    expect(result.message).toMatch(/No equilibrium/);
  });
  it('a formula that ends within the range ends its branch with a reason', () => {
    const result = runSweep(
      { equations: ["x' = sqrt(p) - x"], parameters: { p: 0.5 } },
      { parameter: 'p', from: -1, to: 1 },
    );
    const [branch] = result.branches;
    const ends = [branch.startEnd, branch.endEnd].map((end) => end.reason).sort();
    expect(ends[1]).toBe('left the range');
    expect(['could not be resolved further', 'not finite']).toContain(ends[0]);
  });
  it('a branch that grows without bound leaves the state box', () => {
    const result = runSweep(
      { equations: ["x' = 1 - p*x"], parameters: { p: 1 }, init: { x: 1 } },
      { parameter: 'p', from: -1, to: 1 },
    );
    const reasons = result.branches.flatMap((branch) => [branch.startEnd.reason, branch.endEnd.reason]);
    expect(reasons).toContain('left the state box');
  });
  it('left early, what was found is in the progress', () => {
    const system = textbook(["x' = r*x*(1-x/K) - x*y/(1+x)", "y' = x*y/(1+x) - 0.4*y"], { r: 1, K: 1 });
    const run = sweep(system, system.defaults, {
      parameterIndex: 1,
      from: 0.2,
      to: 4,
      starts: [Float64Array.of(0.5, 0.5)],
      bands: false,
    });
    let seen = run.next();
    while (!seen.done && (seen.value.partial?.branches.length ?? 0) === 0) seen = run.next();
    if (seen.done) throw new Error('no progress with a branch was seen');
    expect(seen.value.partial?.status).toBe('cancelled');
    expect(seen.value.partial?.branches[0].parameters.length).toBeGreaterThan(10);
    expect(seen.value.fraction).toBeLessThan(1);
  });
});

describe('the ends of the range', () => {
  it('hold what lies within alone: a population that reaches zero just outside is no special point', () => {
    const system = textbook(["x' = x*(1 - x/K)", "y' = -y"], { K: 2 });
    const result = finish(
      sweep(system, system.defaults, {
        parameterIndex: 0,
        from: 0.1,
        to: 10,
        starts: [Float64Array.of(1, 0)],
        bands: false,
      }),
    );
    expect(result.specialPoints).toHaveLength(0);
    for (const branch of result.branches)
      expect(Math.min(...branch.parameters)).toBeGreaterThanOrEqual(0.1 - 1e-12);
  });
});
