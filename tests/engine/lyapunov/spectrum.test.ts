import { describe, expect, it } from 'vitest';

import { lyapunovSpectrum, type LyapunovRequest } from '../../../src/engine/lyapunov/lyapunov-spectrum';
import type { LyapunovResult } from '../../../src/engine/lyapunov/contract';
import { eigenvalues } from '../../../src/engine/linalg/eigenvalues';
import { finish, textbook } from '../../support/equations';

function spectrum(
  equations: readonly string[],
  parameters: Readonly<Record<string, number>>,
  start: readonly number[],
  request: LyapunovRequest,
  nonnegative = false,
): LyapunovResult {
  const system = textbook(equations, parameters, nonnegative);
  return finish(lyapunovSpectrum(system, Float64Array.from(start), request));
}

const LORENZ = ["x' = s*(y-x)", "y' = x*(r-z) - y", "z' = x*y - b*z"];

describe('exponents with known answers', () => {
  it('of a linear system are the real parts of its eigenvalues, leading ones alone if so wanted', () => {
    const matrix = [-1, 2, 0.5, -2, -1, 0.3, 0, 0.4, -3];
    const row = (i: number): string =>
      ['x', 'y', 'z'].map((name, j) => `(${matrix[3 * i + j]})*${name}`).join(' + ');
    const { re } = eigenvalues(Float64Array.from(matrix), 3);
    const request = { transient: 30, horizon: 400, maximumSteps: 100_000 };
    const equations = ['x', 'y', 'z'].map((name, i) => `${name}' = ${row(i)}`);
    const all = spectrum(equations, {}, [1, 1, 1], request);
    const two = spectrum(equations, {}, [1, 1, 1], { ...request, count: 2 });
    re.forEach((value, j) => expect(all.exponents[j]).toBeCloseTo(value, 2));
    expect(two.exponents).toHaveLength(2);
    expect(two.exponents[0]).toBeCloseTo(re[0], 2);
    expect(Math.abs(all.traceError)).toBeLessThan(1e-6);
    expect(two.traceError).toBeNaN();
  });

  it('of a forced decay is its rate, a cycle that follows the forcing', () => {
    const found = spectrum(["x' = -0.3*x + sin(t)"], {}, [1], { transient: 100, horizon: 500 });
    expect(found.exponents[0]).toBeCloseTo(-0.3, 7);
    expect(found.reading).toBe('cycle');
  });

  it('of two uncoupled oscillators are two zeros: a torus', () => {
    const pair = (x: string, y: string, speed: number): string[] => [
      `${x}' = ${speed}*${y}`,
      `${y}' = ${speed}*((1-${x}^2)*${y} - ${x})`,
    ];
    const equations = [...pair('x', 'y', 1), ...pair('u', 'v', Math.SQRT2)];
    const found = spectrum(equations, {}, [2, 0, 1, 1], { transient: 60, horizon: 3000 });
    expect(found.reading).toBe('torus');
    expect(Math.abs(found.exponents[2] + 1.059376994841855)).toBeLessThan(0.003);
    expect(Math.abs(found.exponents[3] + Math.SQRT2 * 1.059376994841855)).toBeLessThan(0.004);
  });

  // Roessler, Physics Letters A 71 (1979) 155; Sprott (2003): 0.112, 0.019, 0, -25.188 (from memory).
  it('of the hyperchaos of Roessler', () => {
    const equations = ["x' = -y - z", "y' = x + 0.25*y + w", "z' = 3 + x*z", "w' = -0.5*z + 0.05*w"];
    const found = spectrum(equations, {}, [-10, -6, 0, 10], { transient: 500, horizon: 10_000, count: 3 });
    expect(Math.abs(found.exponents[0] - 0.112)).toBeLessThan(0.01);
    expect(Math.abs(found.exponents[1] - 0.019)).toBeLessThan(0.008);
    expect(found.reading).toBe('hyperchaos');
  });
});

describe('what is not decided is not claimed', () => {
  it('closed orbits of predator and prey are neutral', () => {
    const found = spectrum(
      ["x' = x - x*y", "y' = x*y - y"],
      {},
      [0.1, 0.1],
      { transient: 50, horizon: 2000 },
      true,
    );
    expect(found.reading).toMatch(/undecided: /);
    expect(Math.abs(found.exponents[0])).toBeLessThan(0.01);
  });

  // May & Leonard, SIAM J. Appl. Math. 29 (1975) 243: alpha + beta > 2, each turn longer than the last.
  it('three cyclic competitors approach a cycle through saddles: no cycle, no chaos', () => {
    const row = (x: string, y: string, z: string): string => `${x}' = ${x}*(1 - ${x} - 0.8*${y} - 1.5*${z})`;
    const equations = [row('x', 'y', 'z'), row('y', 'z', 'x'), row('z', 'x', 'y')];
    const found = spectrum(equations, {}, [0.5, 0.3, 0.2], { transient: 200, horizon: 2000 }, true);
    expect(found.reading).toMatch(/^undecided: .*lower from turn to turn/);
  });

  it('a population that dies out keeps the rate at which it declines', () => {
    const equations = ["x' = x*(1 - x)", "y' = y*(0.5*x - 0.8)"];
    const found = spectrum(equations, {}, [0.5, 0.5], { transient: 400, horizon: 1500 }, true);
    expect(found.exponents[0]).toBeCloseTo(-0.3, 6);
    expect(found.exponents[1]).toBeCloseTo(-1, 6);
    expect(found.reading).toBe('rest');
  });

  it('a solution that leaves the finite numbers ends with the reason', () => {
    const found = spectrum(["x' = x^2"], {}, [1], { transient: 0, horizon: 5 });
    expect(found.status).toBe('step-too-small');
    expect(found.message).toMatch(/step became too small.* of 5 time units/);
    expect(found.times[found.times.length - 1]).toBeLessThan(1.001);
  });

  it('partial results come before the end', () => {
    const system = textbook(LORENZ, { s: 10, r: 28, b: 8 / 3 }, false);
    const run = lyapunovSpectrum(system, Float64Array.of(1, 1, 20), { transient: 10, horizon: 200 });
    const seen = [...run].flatMap(({ partial }) => (partial ? [partial.times.length] : []));
    expect(seen.length).toBeGreaterThan(10);
    expect(seen[0]).toBeLessThan(5);
  });
});
