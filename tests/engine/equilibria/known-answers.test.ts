import { describe, expect, it } from 'vitest';

import { equilibriaOf, nearest, textbook } from '../../support/equations';

const states = (result: ReturnType<typeof equilibriaOf>): number[][] =>
  result.equilibria.map((e) => Array.from(e.state));

/** Every expected state is found, and nothing besides. */
function expectExactly(
  result: ReturnType<typeof equilibriaOf>,
  expected: number[][],
  tolerance = 1e-10,
): void {
  const found = states(result);
  expect(found, JSON.stringify(found)).toHaveLength(expected.length);
  for (const state of expected) {
    const gap = Math.min(...found.map((f) => Math.max(...f.map((x, i) => Math.abs(x - state[i])))));
    expect(gap, `${state.join(', ')} among ${JSON.stringify(found)}`).toBeLessThan(tolerance);
  }
}

describe('two-class predator, mortalities 1 +/- eps (characteristic polynomial derived by hand)', () => {
  const equations = [
    "x' = x - x*(y1+y2)",
    "y1' = x*(y1+y2)/2 - (1+eps)*y1",
    "y2' = x*(y1+y2)/2 - (1-eps)*y2",
  ];
  it.each([0.1, 0.3, 0.5, 0.9])('finds origin and coexistence at eps = %s', (eps) => {
    const result = equilibriaOf(textbook(equations, { eps }));
    const inner = [1 - eps ** 2, (1 - eps) / 2, (1 + eps) / 2];
    expectExactly(result, [[0, 0, 0], inner]);
    const equilibrium = nearest(result, inner);
    expect(equilibrium.type).toBe('stable focus');
    for (const { re, im } of equilibrium.eigenvalues) {
      // L^3 + (1+e^2) L^2 + (1-e^2) L + (1-e^2) at L = re + i im.
      const c = [1 + eps ** 2, 1 - eps ** 2, 1 - eps ** 2];
      const [r2, i2] = [re * re - im * im, 2 * re * im];
      const [r3, i3] = [r2 * re - i2 * im, r2 * im + i2 * re];
      expect(Math.hypot(r3 + c[0] * r2 + c[1] * re + c[2], i3 + c[0] * i2 + c[1] * im)).toBeLessThan(1e-12);
    }
    const origin = nearest(result, [0, 0, 0]);
    expect(origin.type).toBe('saddle');
    expect(origin.eigenvalues.map((e) => e.re)).toEqual([1, -(1 - eps), -(1 + eps)]);
  });

  it('is not called stable or unstable by rounding at eps = 0', () => {
    const system = textbook(equations, { eps: 0 });
    const unproven = nearest(equilibriaOf(system), [1, 0.5, 0.5]);
    expect(unproven.type).toBe('indistinguishable from neutral');
    expect(unproven.attracts).toBe('unknown');
    expect(unproven.notes.join(' ')).toMatch(/accuracy reached/);
    // V = x - log x + Y - log Y with Y = y1 + y2 is constant; its second derivatives at Y.
    const constant = {
      formula: 'x - log(x) + y1 + y2 - log(y1 + y2)',
      hessian: (u: ArrayLike<number>, out: Float64Array) => {
        const v = 1 / (u[1] + u[2]) ** 2;
        out.set([1 / u[0] ** 2, 0, 0, 0, v, v, 0, v, v]);
      },
    };
    const proven = nearest(equilibriaOf(system, { constantsOfMotion: () => [constant] }), [1, 0.5, 0.5]);
    expect(proven.type).toBe('neutral');
    expect(proven.eigenvalues.map((e) => Math.round(e.re * 1e9) / 1e9 + 0)).toEqual([0, 0, -1]);
  });
});

describe('two-class prey, attack rates 1 +/- eps', () => {
  const equations = [
    "x1' = (x1+x2)/2 - (1+eps)*x1*y",
    "x2' = (x1+x2)/2 - (1-eps)*x2*y",
    "y' = y*((1+eps)*x1+(1-eps)*x2) - y",
  ];
  it.each([0.1, 0.5, 0.9])('finds coexistence at eps = %s', (eps) => {
    const inner = [1 / (2 * (1 + eps)), 1 / (2 * (1 - eps)), 1 / (1 - eps ** 2)];
    const result = equilibriaOf(textbook(equations, { eps }));
    expectExactly(result, [[0, 0, 0], inner]);
    expect(nearest(result, inner).type).toBe('stable focus');
  });
});

describe('three-species competition of May & Leonard 1975 (from memory, re-derived)', () => {
  const equations = [
    "n1' = n1*(1-n1-al*n2-be*n3)",
    "n2' = n2*(1-be*n1-n2-al*n3)",
    "n3' = n3*(1-al*n1-be*n2-n3)",
  ];
  it('has five equilibria at (0.8, 1.3)', () => {
    const N = 1 / 3.1;
    const result = equilibriaOf(textbook(equations, { al: 0.8, be: 1.3 }));
    expectExactly(result, [
      [0, 0, 0],
      [1, 0, 0],
      [0, 1, 0],
      [0, 0, 1],
      [N, N, N],
    ]);
    const inner = nearest(result, [N, N, N]);
    expect(inner.type).toBe('saddle focus');
    expect(inner.eigenvalues[0].re).toBeCloseTo(0.016129032258064516, 10);
    const alone = nearest(result, [1, 0, 0]);
    expect(alone.absent).toEqual(['n2', 'n3']);
    // n2 grows at 1 - be = -0.3 and n3 at 1 - al = 0.2 where n1 is alone.
    expect(alone.invasions.map((i) => [i.population, i.answer])).toEqual([
      ['n2', 'cannot invade'],
      ['n3', 'can invade'],
    ]);
    expect(alone.invasions[1].growthRate).toBeCloseTo(0.2, 12);
  });
});

describe('counts of equilibria', () => {
  it('finds zero and three budworm states between the folds, one outside (Ludwig, Jones & Holling 1978)', () => {
    const equations = ["x' = r*x*(1-x/k) - x^2/(1+x^2)"];
    expect(states(equilibriaOf(textbook(equations, { r: 0.45, k: 10 })))).toHaveLength(4);
    expect(states(equilibriaOf(textbook(equations, { r: 0.6, k: 10 })))).toHaveLength(2);
    expect(states(equilibriaOf(textbook(equations, { r: 0.3, k: 10 })))).toHaveLength(2);
    // Just inside the lower fold r = 0.3839707316274608 of k = 10.
    expect(states(equilibriaOf(textbook(equations, { r: 0.383971, k: 10 })))).toHaveLength(4);
    expect(states(equilibriaOf(textbook(equations, { r: 0.38397, k: 10 })))).toHaveLength(2);
  });

  it('finds the Allee stock under harvest with its eigenvalues', () => {
    const system = textbook(["x' = r*x*(1-x/K)*(x/A-1) - q*E*x"], { r: 0.9, K: 12, A: 3, q: 0.2, E: 1.2 });
    const result = equilibriaOf(system);
    expectExactly(result, [[0], [10.763433774416145], [4.236566225583856]], 1e-11);
    expect(nearest(result, [10.76]).eigenvalues[0].re).toBeCloseTo(-1.756287665406054, 9);
    expect(nearest(result, [4.24]).eigenvalues[0].re).toBeCloseTo(0.691287665406054, 9);
    expect(nearest(result, [0]).eigenvalues[0].re).toBeCloseTo(-1.14, 12);
  });

  it('finds the three states of Lorenz 1963 at r = 28', () => {
    const b = 8 / 3;
    const c = Math.sqrt(b * 27);
    const result = equilibriaOf(
      textbook(["x' = s*(y-x)", "y' = x*(r-z) - y", "z' = x*y - b*z"], { s: 10, r: 28, b }, false),
    );
    expectExactly(result, [
      [0, 0, 0],
      [c, c, 27],
      [-c, -c, 27],
    ]);
    const wing = nearest(result, [c, c, 27]);
    expect(wing.type).toBe('saddle focus');
    expect(wing.eigenvalues[0].re).toBeCloseTo(0.09395562396468551, 9);
    expect(wing.eigenvalues[0].im).toBeCloseTo(10.19450522092785, 9);
    expect(nearest(result, [0, 0, 0]).eigenvalues[0].re).toBeCloseTo(11.827723451163456, 9);
  });

  it('finds all nine states of two weakly coupled bistable patches', () => {
    // u' = u(1-u)(u-a) + d(v-u): for small d all nine pairs of {0, a, 1} persist.
    const equations = ["u' = u*(1-u)*(u-a) + d*(v-u)", "v' = v*(1-v)*(v-a) + d*(u-v)"];
    expect(states(equilibriaOf(textbook(equations, { a: 0.4, d: 0.01 })))).toHaveLength(9);
  });

  it('keeps to an entered box for states of any sign', () => {
    const system = textbook(["x' = sin(x)"], {}, false);
    const result = equilibriaOf(system, { box: [{ from: -7, to: 4 }] });
    expectExactly(result, [[-2 * Math.PI], [-Math.PI], [0], [Math.PI]]);
  });

  it('lets the box grow to equilibria of very different densities', () => {
    const system = textbook(["x' = x*(1 - x/5e6)*(x/1e-3 - 1)/(x/1e-3 + 1)"], {});
    expectExactly(equilibriaOf(system, { starts: [Float64Array.of(1)] }), [[0], [1e-3], [5e6]], 1e-6);
  });

  it('finds the pair about to meet at a fold, and the fold itself', () => {
    const near = equilibriaOf(textbook(["x' = mu - x^2"], { mu: 1e-10 }, false));
    expectExactly(near, [[1e-5], [-1e-5]], 1e-14);
    const at = equilibriaOf(textbook(["x' = mu - (x-1)^2"], { mu: 0 }, false));
    expectExactly(at, [[1]], 1e-6);
    expect(at.equilibria[0].type).toBe('indistinguishable from neutral');
    expect(equilibriaOf(textbook(["x' = mu - x^2"], { mu: -1e-10 }, false)).equilibria).toHaveLength(0);
  });
});
