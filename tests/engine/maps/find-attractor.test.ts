import { describe, expect, it } from 'vitest';

import {
  findAttractor,
  type Attractor,
  type AttractorRequest,
} from '../../../src/engine/maps/find-attractor';
import { finish, textbook } from '../../support/equations';

function attractor(
  equations: readonly string[],
  start: readonly number[],
  request: Partial<AttractorRequest> = {},
  options: { parameters?: Record<string, number>; nonnegative?: boolean } = {},
): Attractor {
  const system = textbook(equations, options.parameters ?? {}, options.nonnegative ?? true);
  return finish(
    findAttractor(system, Float64Array.from(start), {
      transient: 500,
      observed: 500,
      extinctBelow: new Float64Array(system.populations.length).fill(1e-9),
      ...request,
    }),
  );
}

const ROESSLER = ["x' = -y - z", "y' = x + 0.2*y", "z' = 0.2 + z*(x-c)"];

describe('what a solution settles to', () => {
  it('rest, at the exact equilibrium, also from a slow spiral', () => {
    // Rosenzweig-MacArthur just below its Hopf value K = 3: decay at a rate of about 0.001.
    const found = attractor(["x' = x*(1 - x/2.99) - 2*x*y/(1 + x)", "y' = 2*x*y/(1 + x) - y"], [0.5, 0.5], {
      transient: 5000,
    });
    expect(found.class).toMatchObject({ kind: 'rest', label: 'rest', extinct: [] });
    expect(found.lowest[0]).toBeCloseTo(1, 12);
    expect(found.lowest[1]).toBeCloseTo(1 - 1 / 2.99, 12);
  });

  it('a slow spiral seen too briefly is not called a cycle', () => {
    const found = attractor(["x' = x*(1 - x/2.999) - 2*x*y/(1 + x)", "y' = 2*x*y/(1 + x) - y"], [0.9, 0.7], {
      transient: 50,
      observed: 400,
    });
    expect(found.class.kind).toBe('undecided');
  });

  it('the cycle beyond it', () => {
    const found = attractor(["x' = x*(1 - x/4) - 2*x*y/(1 + x)", "y' = 2*x*y/(1 + x) - y"], [0.5, 0.5]);
    expect(found.class).toMatchObject({ kind: 'cycle', windings: 1, label: 'cycle' });
    expect(found.lowest[0]).toBeLessThan(0.5);
  });

  // Case D1: the period of van der Pol's cycle.
  it('the cycle of van der Pol with its period and amplitude', () => {
    const found = attractor(
      ["x' = y", "y' = (1-x^2)*y - x"],
      [2, 0],
      { transient: 60 },
      { nonnegative: false },
    );
    expect(found.class.kind).toBe('cycle');
    expect(found.period).toBeCloseTo(6.66328685932313, 6);
    expect(found.highest[0]).toBeCloseTo(2.0086198608748433, 6);
  });

  // Strogatz, Nonlinear Dynamics and Chaos, sect. 12.3: a = b = 0.2, c = 2.5, 3.5, 4, 5 (from memory).
  it.each([
    [2.5, 'cycle', 1],
    [3.5, 'cycle', 2],
    [4, 'cycle', 4],
    [5, 'chaos', null],
  ] as const)('the period doubling of Roessler at c = %f', (c, kind, windings) => {
    const found = attractor(
      ROESSLER,
      [1, 1, 0],
      { transient: 1000, observed: 2000 },
      { parameters: { c }, nonnegative: false },
    );
    expect(found.class).toMatchObject({ kind, windings });
  });

  it('a torus of two oscillators', () => {
    const pair = (x: string, y: string, speed: number): string[] => [
      `${x}' = ${speed}*${y}`,
      `${y}' = ${speed}*((1-${x}^2)*${y} - ${x})`,
    ];
    const found = attractor(
      [...pair('x', 'y', 1), ...pair('u', 'v', Math.SQRT2)],
      [2, 0, 1, 1],
      { transient: 100, observed: 1000 },
      { nonnegative: false },
    );
    expect(found.class.kind).toBe('torus');
  });

  it('forcing that is followed, period for period', () => {
    const found = attractor(
      ["x' = x*(1 + 0.5*sin(w*t) - x)"],
      [0.5],
      { transient: 40, observed: 60 },
      { parameters: { w: 2 * Math.PI } },
    );
    expect(found.class).toMatchObject({
      kind: 'cycle',
      windings: 1,
      label: 'cycle with the period of the forcing',
    });
    expect(found.period).toBeCloseTo(1, 12);
  });
});

describe('extinction', () => {
  it('is named, with what is left', () => {
    const found = attractor(["x' = x*(1 - x)", "y' = y*(0.5*x - 0.8)"], [0.5, 0.5]);
    expect(found.class).toEqual({
      kind: 'extinct',
      windings: null,
      extinct: ['y'],
      label: 'y extinct, rest otherwise',
    });
    expect(found.lowest[1]).toBe(0);
  });

  it('of one consumer while the others cycle', () => {
    const meal = '2*x*y/(1 + x)';
    const found = attractor(
      [`x' = x*(1 - x/4) - ${meal} - 0.1*x*z`, `y' = ${meal} - y`, "z' = z*(0.1*x - 1)"],
      [0.5, 0.5, 0.5],
    );
    expect(found.class).toMatchObject({
      kind: 'extinct',
      extinct: ['z'],
      label: 'z extinct, cycle otherwise',
    });
  });

  it('of all', () => {
    const found = attractor(["x' = -x*(0.1 + x)", "y' = y*(x - 1)"], [0.5, 0.5]);
    expect(found.class.label).toBe('everything extinct');
  });

  it('a population that comes back from below the threshold is not extinct', () => {
    const meal = '2*x*y/(1 + x)';
    const found = attractor([`x' = x*(1 - x/12) - ${meal}`, `y' = ${meal} - y`], [0.5, 0.5], {
      extinctBelow: Float64Array.of(0.01, 0.01),
    });
    expect(found.lowest[0]).toBeLessThan(1e-3);
    expect(found.class).toMatchObject({ kind: 'cycle', extinct: [] });
  });
});

describe('what is no attractor of these kinds', () => {
  // May & Leonard, SIAM J. Appl. Math. 29 (1975) 243.
  it('three cyclic competitors on their way to a cycle through saddles are not called a cycle', () => {
    const row = (x: string, y: string, z: string): string => `${x}' = ${x}*(1 - ${x} - 0.8*${y} - 1.5*${z})`;
    const found = attractor([row('x', 'y', 'z'), row('y', 'z', 'x'), row('z', 'x', 'y')], [0.5, 0.3, 0.2]);
    expect(found.class.kind).toBe('undecided');
    expect(found.class.extinct).toEqual([]);
    expect(found.class.label).toMatch(/nears a cycle through saddles|a longer run decides/);
  });

  it('growth without bound', () => {
    expect(attractor(["x' = 0.1*x"], [1]).class.label).toBe('growth without bound');
    expect(attractor(["x' = x^2"], [1]).class.kind).toBe('unbounded');
  });

  it('a spent budget', () => {
    const found = attractor(
      ROESSLER,
      [1, 1, 0],
      { maximumSteps: 300 },
      { parameters: { c: 5 }, nonnegative: false },
    );
    expect(found.class.label).toBe('undecided: step budget spent');
  });
});

describe('closed orbits', () => {
  it('of predator and prey without limits attract nothing, and are no cycle', () => {
    const found = attractor(["x' = x - x*y", "y' = x*y - y"], [0.3, 0.8]);
    expect(found.class.label).toBe('undecided: closed orbits of every size, none of which attracts');
  });

  it('neither where one more class only follows', () => {
    const found = attractor(["x' = x - x*y", "y' = x*y - y", "z' = x - z"], [0.3, 0.8, 1]);
    expect(found.class.kind).toBe('undecided');
  });

  it('a start on the cycle itself is a cycle all the same', () => {
    const on = attractor(["x' = x*(1 - x/4) - 2*x*y/(1 + x)", "y' = 2*x*y/(1 + x) - y"], [0.5, 0.5]);
    const again = attractor(["x' = x*(1 - x/4) - 2*x*y/(1 + x)", "y' = 2*x*y/(1 + x) - y"], [...on.state]);
    expect(again.class.kind).toBe('cycle');
    expect(again.exponent).toBe(0);
  });
});
