import { describe, expect, it } from 'vitest';

import { textbook } from '../../support/equations';
import { boundariesOf, onlyCurve, pairsOf } from './run-boundaries';

const system = (equations: string[], parameters: Record<string, number>) =>
  textbook(equations, parameters, false);

/** Normal forms with exactly known curves and points (Kuznetsov, chapters 3 and 8; textbook). */
describe('special points of two parameters', () => {
  it('cusp: b + a x - x^3 folds on 27 b^2 = 4 a^3', () => {
    const result = boundariesOf(system(["x' = b + a*x - x^3"], { b: 0, a: 1 }), ['b', -1, 1], ['a', -1, 1.5]);
    const curve = onlyCurve(result, 'fold');
    for (const [b, a] of pairsOf(curve)) expect(Math.abs(27 * b * b - 4 * a ** 3)).toBeLessThan(1e-10);
    expect(result.specialPoints.map((one) => one.kind)).toEqual(['cusp']);
    expect(result.specialPoints[0]?.first).toBeCloseTo(0, 9);
    expect(result.specialPoints[0]?.second).toBeCloseTo(0, 9);
  });

  it('Bogdanov-Takens: the Hopf curve ends on the fold and is entered from it', () => {
    const equations = ["x' = y", "y' = b1 + b2*x + x^2 - x*y"];
    const result = boundariesOf(system(equations, { b1: -0.2, b2: -1 }), ['b1', -1, 1], ['b2', -1.5, 1]);
    for (const [b1, b2] of pairsOf(onlyCurve(result, 'fold')))
      expect(Math.abs(4 * b1 - b2 * b2)).toBeLessThan(1e-10);
    const hopf = onlyCurve(result, 'Hopf');
    hopf.second.forEach((b2, k) => {
      expect(Math.abs(hopf.first[k]!)).toBeLessThan(1e-12);
      // omega^2 = -b2 at x = 0.
      expect(hopf.omega[k]! ** 2).toBeCloseTo(-b2, 7);
    });
    expect([hopf.startEnd.reason, hopf.endEnd.reason]).toContain('ended at a Bogdanov-Takens point');
    const points = result.specialPoints.filter((one) => one.kind === 'Bogdanov-Takens');
    expect(points.length).toBeGreaterThan(0);
    for (const { first, second } of points) expect(Math.hypot(first, second)).toBeLessThan(1e-8);
    // From the fold alone the Hopf curve is found too.
    const fromFold = boundariesOf(system(equations, { b1: 0.2, b2: 0.9 }), ['b1', -1, 1], ['b2', -1.5, 1]);
    expect(onlyCurve(fromFold, 'Hopf').first.length).toBeGreaterThan(20);
  });

  it('generalised Hopf: the first Lyapunov coefficient is 2 b2 and changes sign at 0', () => {
    const s = '(x^2+y^2)';
    const grow = `(b1 + b2*${s} - ${s}^2)`;
    const result = boundariesOf(
      system([`x' = ${grow}*x - y`, `y' = x + ${grow}*y`], { b1: -0.2, b2: -0.53 }),
      ['b1', -1, 1],
      ['b2', -1, 1],
      { starts: [Float64Array.of(0.1, 0)] },
    );
    const curve = onlyCurve(result, 'Hopf');
    curve.second.forEach((b2, k) => expect(curve.coefficient[k]).toBeCloseTo(2 * b2, 8));
    expect(result.specialPoints.map((one) => one.kind)).toEqual(['generalised Hopf']);
    expect(result.specialPoints[0]?.second).toBeCloseTo(0, 8);
  });

  it('fold-Hopf: where a fold and a Hopf curve touch', () => {
    const result = boundariesOf(
      system(["z' = b1 - z^2 - (x^2+y^2)", "x' = (b2 + z)*x - y", "y' = x + (b2+z)*y"], {
        b1: 0.5,
        b2: 0.13,
      }),
      ['b1', -1, 1],
      ['b2', -1, 1],
      { starts: [Float64Array.of(0.6, 0.1, 0)] },
    );
    for (const [b1] of pairsOf(onlyCurve(result, 'fold'))) expect(Math.abs(b1)).toBeLessThan(1e-12);
    for (const [b1, b2] of pairsOf(onlyCurve(result, 'Hopf')))
      expect(Math.abs(b1 - b2 * b2)).toBeLessThan(1e-9);
    const found = result.specialPoints.filter((one) => one.kind === 'fold-Hopf');
    expect(found).toHaveLength(2);
    for (const { first, second } of found) expect(Math.hypot(first, second)).toBeLessThan(1e-7);
  });

  it('double Hopf: where a second pair crosses', () => {
    const result = boundariesOf(
      system(
        [
          "x' = b1*x - y - x*(x^2+y^2)",
          "y' = x + b1*y - y*(x^2+y^2)",
          "z' = b2*z - 2*w - z*(z^2+w^2)",
          "w' = 2*z + b2*w - w*(z^2+w^2)",
        ],
        { b1: -0.2, b2: -0.53 },
      ),
      ['b1', -1, 1],
      ['b2', -1, 1],
      { starts: [Float64Array.of(0.1, 0, 0, 0)] },
    );
    const curve = onlyCurve(result, 'Hopf');
    // Past it the second pair repels already, so that crossing the curve decides nothing.
    curve.second.forEach((b2, k) => {
      if (Math.abs(b2) > 1e-6) expect(curve.matters[k]).toBe(b2 < 0 ? 1 : 0);
    });
    expect(result.specialPoints.map((one) => one.kind)).toEqual(['double Hopf']);
    expect(result.specialPoints[0]?.second).toBeCloseTo(0, 8);
  });

  it('pitchfork: persists under a parameter that keeps the symmetry, and not under one that breaks it', () => {
    const keeps = boundariesOf(
      system(["x' = a*x - x^3", "y' = -y + b"], { a: 0.5, b: 0.3 }),
      ['a', -1, 1],
      ['b', -1, 1],
    );
    for (const [a] of pairsOf(onlyCurve(keeps, 'pitchfork'))) expect(Math.abs(a)).toBeLessThan(1e-9);
    const breaks = boundariesOf(system(["x' = a*x - x^3 + b"], { a: 0.5, b: 0 }), ['a', -1, 1], ['b', -1, 1]);
    const curve = onlyCurve(breaks, 'pitchfork');
    expect([curve.startEnd.reason, curve.endEnd.reason]).toEqual(['does not persist', 'does not persist']);
  });
});

describe('which side is stable', () => {
  it('points to where the equilibrium attracts, or exists at all', () => {
    const hopf = onlyCurve(
      boundariesOf(
        system(["x' = a*x - y - x*(x^2+y^2)", "y' = x + a*y - y*(x^2+y^2) + 0*b"], { a: 0.5, b: 0.3 }),
        ['a', -1, 1],
        ['b', -1, 1],
        { starts: [Float64Array.of(0.1, 0)] },
      ),
      'Hopf',
    );
    expect(hopf.matters.every((one) => one === 1)).toBe(true);
    hopf.first.forEach((_, k) => expect(hopf.stableSide[2 * k]).toBeCloseTo(-1, 6));
    const fold = onlyCurve(
      boundariesOf(system(["x' = a - x^2 + 0*b"], { a: 0.5, b: 0.3 }), ['a', -1, 1], ['b', -1, 1]),
      'fold',
    );
    fold.first.forEach((_, k) => expect(fold.stableSide[2 * k]).toBeCloseTo(1, 6));
  });
});

describe('refusals', () => {
  const plain = system(["x' = a - x^2 + 0*b"], { a: 0.5, b: 0.3 });

  it('a range without length, one parameter twice, explicit time', () => {
    expect(boundariesOf(plain, ['a', 1, 1], ['b', 0, 1]).message).toMatch(/different finite ends/);
    expect(boundariesOf(plain, ['a', 0, 1], ['a', 0, 1]).message).toMatch(/Two different/);
    const forced = system(["x' = a - x + b*sin(t)"], { a: 1, b: 1 });
    expect(boundariesOf(forced, ['a', 0, 1], ['b', 0, 1]).status).toBe('needs-period-map');
  });

  it('says so where there is nothing to trace', () => {
    const result = boundariesOf(system(["x' = a - x + 0*b"], { a: 1, b: 1 }), ['a', 0, 1], ['b', 0, 1]);
    expect(result.status).toBe('complete');
    expect(result.message).toMatch(/No special point/);
  });

  it('withholds coefficients at a kink', () => {
    const result = boundariesOf(
      system(["x' = a*x - y - x*abs(x)", "y' = x + a*y + 0*b"], { a: -0.5, b: 0.1 }),
      ['a', -1, 1],
      ['b', 0, 1],
      { starts: [Float64Array.of(0.1, 0.1)] },
    );
    const curve = onlyCurve(result, 'Hopf');
    expect(curve.coefficient.every(Number.isNaN)).toBe(true);
  });
});
