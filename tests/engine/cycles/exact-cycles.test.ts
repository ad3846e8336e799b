import { describe, expect, it } from 'vitest';

import { textbook } from '../../support/equations';
import { cyclesOf, multiplier, onlyBranch } from './run-cycles';

/** Radial motion r' = r (mu + r^2 - r^4), turning at rate 1. */
const FOLDED = ["x' = x*(mu + (x^2+y^2) - (x^2+y^2)^2) - y", "y' = y*(mu + (x^2+y^2) - (x^2+y^2)^2) + x"];

/**
 * A cycle of radius 1 and period 2 pi around which a strip turns by half a turn: with a across and b along the
 * width of the strip, a' = mu a - a^3 and b' = -b. Multipliers -exp(2 pi mu) and -exp(-2 pi); own derivation.
 */
const HALF_TURN = (() => {
  const r = 'sqrt(x^2+y^2)';
  const [cc, ss, sc] = [`(1+x/${r})/2`, `(1-x/${r})/2`, `y/${r}/2`];
  const xi = `(${r}-1)`;
  const [ac, as] = [`(${xi}*${cc}+z*${sc})`, `(${xi}*${sc}+z*${ss})`];
  const squared = `(${xi}^2*${cc}+2*${xi}*z*${sc}+z^2*${ss})`;
  // (xi, z) = a (c, s) + b (-s, c) with c = cos(theta/2), s = sin(theta/2), and a c = ac, a s = as.
  const growth = `(mu+1-${squared})`;
  const radial = `(-(${xi})+${growth}*${ac}-z/2)`;
  const axial = `(-z+${growth}*${as}+${xi}/2)`;
  return [`x' = -y + x/${r}*${radial}`, `y' = x + y/${r}*${radial}`, `z' = ${axial}`];
})();

/** Around a cycle of radius 1 the rest turns by w a unit of time and grows at rate mu until saturated. */
const TORUS = (() => {
  const r = 'sqrt(x^2+y^2)';
  const grow = `(mu-((${r}-1)^2+z^2))`;
  const radial = `(${grow}*(${r}-1)-w*z)`;
  return [`x' = -y + x/${r}*${radial}`, `y' = x + y/${r}*${radial}`, `z' = ${grow}*z+w*(${r}-1)`];
})();

describe('cycles known in closed form', () => {
  // Shared case C12: rho = r^2 = (1 +- sqrt(1 + 4 mu))/2, multiplier exp(4 pi rho (1 - 2 rho)); derived.
  it('grow from a subcritical Hopf point, fold and attract', () => {
    const result = cyclesOf(textbook(FOLDED, { mu: 0.1 }, false), 'mu', [-0.5, 0.5]);
    const branch = onlyBranch(result);
    expect(branch.origin).toMatchObject({ kind: 'Hopf' });
    expect(result.specialPoints.map((one) => one.kind)).toEqual(['fold of cycles']);
    expect(result.specialPoints[0]?.parameter).toBeCloseTo(-0.25, 8);
    expect(result.specialPoints[0]?.highest[0]).toBeCloseTo(Math.SQRT1_2, 5);
    for (let k = 1; k < branch.parameters.length; k += 1) {
      const rho = (branch.highest[2 * k] ?? NaN) ** 2;
      expect(Math.abs((branch.parameters[k] ?? NaN) + rho - rho * rho)).toBeLessThan(2e-9);
      expect(branch.periods[k]).toBeCloseTo(2 * Math.PI, 8);
      const { re } = multiplier(branch, k, 1);
      expect(Math.log(re) / (4 * Math.PI * rho * (1 - 2 * rho))).toBeCloseTo(1, 4);
      expect(branch.attracts[k] === 1).toBe(rho > 0.5);
    }
    expect(branch.endEnd.reason).toBe('left the range');
  });

  it('double their period where a multiplier passes -1, and the doubled cycle is entered', () => {
    const system = textbook(HALF_TURN, { mu: -0.1 }, false);
    const result = cyclesOf(system, 'mu', [-0.2, 0.3], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(1.1, 0, 0.1)],
      horizon: 40,
    });
    const [doubling] = result.specialPoints;
    expect(doubling?.kind).toBe('period doubling');
    expect(doubling?.parameter).toBeCloseTo(0, 7);
    expect(doubling?.period).toBeCloseTo(2 * Math.PI, 7);
    const [single, doubled] = result.branches;
    if (!single || !doubled) throw new Error(result.message);
    for (let k = 0; k < single.parameters.length; k += 1) {
      const larger = Math.exp(2 * Math.PI * single.parameters[k]!);
      expect(multiplier(single, k, 1).re / -larger).toBeCloseTo(1, 5);
      expect(multiplier(single, k, 2).re / -Math.exp(-2 * Math.PI)).toBeCloseTo(1, 4);
    }
    expect(doubled.origin).toMatchObject({ kind: 'period doubling', specialPoint: doubling?.id });
    const last = doubled.parameters.length - 1;
    const mu = doubled.parameters[last]!;
    expect(mu).toBeCloseTo(0.3, 12);
    expect(doubled.periods[last]).toBeCloseTo(4 * Math.PI, 7);
    // On the doubled cycle a = sqrt(mu), so that z = a sin(theta/2) is highest at half of its turn.
    expect(doubled.highest[3 * last + 2]).toBeCloseTo(Math.sqrt(mu), 7);
    expect(multiplier(doubled, last, 1).re / Math.exp(-2 * mu * 4 * Math.PI)).toBeCloseTo(1, 4);
    expect(doubled.attracts[last]).toBe(1);
  });

  it('give way to a torus where a pair passes the unit circle, at the right angle', () => {
    const result = cyclesOf(textbook(TORUS, { mu: -0.1, w: 0.3 }, false), 'mu', [-0.2, 0.2], {
      beginFrom: 'trajectory',
      starts: [Float64Array.of(1.1, 0, 0.1)],
      horizon: 60,
    });
    expect(result.specialPoints.map((one) => one.kind)).toEqual(['torus']);
    const [torus] = result.specialPoints;
    expect(torus?.parameter).toBeCloseTo(0, 7);
    expect(torus?.angle).toBeCloseTo(2 * Math.PI * 0.3, 6);
  });
});

describe('a family of cycles at one value', () => {
  // van der Pol at mu = 0 is the harmonic oscillator; the limit cycles leave it at amplitude 2 (averaging, textbook).
  it('is left where the limit cycles of van der Pol begin, on both sides', () => {
    const system = textbook(["x' = y", "y' = mu*(1-x^2)*y - x"], { mu: 1 }, false);
    const result = cyclesOf(system, 'mu', [-1, 2]);
    const [family, ...others] = result.branches;
    expect(family?.origin.kind).toBe('Hopf');
    expect(family?.parameters.every((mu) => Math.abs(mu) < 1e-9)).toBe(true);
    expect(result.specialPoints).toHaveLength(1);
    expect(result.specialPoints[0]?.highest[0]).toBeCloseTo(2, 5);
    expect(result.specialPoints[0]?.meaning).toMatch(/all sizes/);
    expect(others.map((one) => one.parameters.at(-1)).sort()).toEqual([-1, 2]);
    for (const branch of others) {
      const last = branch.parameters.length - 1;
      expect(branch.attracts[last]).toBe(branch.parameters[last]! > 0 ? 1 : 0);
    }
  });

  it('is said of the classic neutral pair, and nothing is drawn', () => {
    const system = textbook(["x' = x*(1-y)", "y' = m*y*(x-1)"], { m: 1 });
    const result = cyclesOf(system, 'm', [0.5, 2], { starts: [Float64Array.of(2, 1)] });
    expect(result.branches).toHaveLength(0);
    expect(result.message).toMatch(/cycles of all sizes/);
  });
});

describe('models with explicit time', () => {
  // x' = -x + sin(w t): x = (sin wt - w cos wt)/(1 + w^2), multiplier exp(-2 pi / w); exact.
  it('follow the period map also where the period of the forcing is swept', () => {
    const system = textbook(["x' = -x + sin(w*t)"], { w: 1 }, false);
    const result = cyclesOf(system, 'w', [0.5, 4], { starts: [Float64Array.of(0)] });
    const branch = onlyBranch(result);
    expect(result.forcingPeriod).toBeCloseTo(2 * Math.PI, 12);
    for (let k = 0; k < branch.parameters.length; k += 1) {
      const w = branch.parameters[k]!;
      expect(branch.periods[k]).toBeCloseTo((2 * Math.PI) / w, 10);
      expect(branch.highest[k]).toBeCloseTo(1 / Math.sqrt(1 + w * w), 8);
      expect(multiplier(branch, k, 0).re / Math.exp((-2 * Math.PI) / w)).toBeCloseTo(1, 5);
    }
    expect([branch.parameters[0], branch.parameters.at(-1)].sort()).toEqual([0.5, 4]);
  });

  it('say so where time enters without a period', () => {
    const result = cyclesOf(textbook(["x' = 1/(1+t) - k*x"], { k: 1 }), 'k', [0.5, 2]);
    expect(result.branches).toHaveLength(0);
    expect(result.message).toMatch(/no period map/);
  });

  it('know the common period of several frequencies', () => {
    const system = textbook(["x' = -k*x + sin(2*t) + cos(3*t)"], { k: 1 }, false);
    expect(system.forcingPeriod()).toBeCloseTo(2 * Math.PI, 12);
    expect(textbook(["x' = -x"], {}, false).forcingPeriod()).toBeNull();
  });
});
