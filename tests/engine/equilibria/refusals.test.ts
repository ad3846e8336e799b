import { describe, expect, it } from 'vitest';

import { findEquilibria } from '@/engine/equilibria/search';
import { trackEquilibria } from '@/engine/equilibria/track';

import { equilibriaOf, finish, nearest, textbook } from '../../support/equations';

const twoSexes = (b: number): string[] => [
  `M' = ${b}*M*F/(M+F) - (um + c*(M+F))*M`,
  `F' = ${b}*M*F/(M+F) - (uf + c*(M+F))*F`,
];

describe('a mating function of degree one (closed forms derived by hand)', () => {
  const parameters = { um: 0.8, uf: 0.5, c: 0.01 };
  it('finds coexistence and refuses a Jacobian at zero', () => {
    const result = equilibriaOf(textbook(twoSexes(3), parameters));
    const inner = nearest(result, [38.25, 46.75]);
    expect(inner.state[0] / 38.25).toBeCloseTo(1, 10);
    expect(inner.state[1] / 46.75).toBeCloseTo(1, 10);
    expect(inner.type).toBe('stable node');
    expect(inner.eigenvalues[0].re).toBeCloseTo(-0.85, 9);
    expect(inner.eigenvalues[1].re).toBeCloseTo(-1.485, 9);
    const zero = nearest(result, [0, 0]);
    expect(zero.type).toBe('not differentiable');
    expect(zero.eigenvalues).toEqual([]);
    expect(zero.margin).toBeNull();
    expect(zero.attracts).toBe('no');
    // Neither sex grows alone; together at (b - um - uf)/2 with females 1/2 + (um - uf)/(2 b).
    const [males, females, both] = zero.invasions;
    expect([males.growthRate, females.growthRate]).toEqual([-0.8, -0.5]);
    expect(both).toMatchObject({
      population: 'M and F',
      answer: 'can invade',
      method: 'homogeneous growth rate',
    });
    expect(both.growthRate).toBeCloseTo(0.85, 10);
    expect(both.composition?.[1]).toBeCloseTo(0.55, 10);
    expect(result.equilibria).toHaveLength(2);
  });

  it('dies out from low density below the threshold b = 1.3', () => {
    const zero = nearest(equilibriaOf(textbook(twoSexes(1.29), parameters)), [0, 0]);
    expect(zero.attracts).toBe('yes');
    expect(zero.invasions[2].growthRate).toBeCloseTo(-0.005, 10);
    const at = nearest(equilibriaOf(textbook(twoSexes(1.3), parameters)), [0, 0]);
    expect(at.attracts).toBe('unknown');
  });

  it('sees the same through a guard against 0/0', () => {
    const guarded = twoSexes(3).map((e) => e.replace('3*M*F/(M+F)', '(M+F > 0 ? 3*M*F/(M+F) : 0)'));
    const zero = nearest(equilibriaOf(textbook(guarded, parameters)), [0, 0]);
    expect(zero.type).toBe('not differentiable');
  });
});

describe('what is refused or left undecided', () => {
  it('needs the period map where time occurs', () => {
    const result = equilibriaOf(textbook(["x' = x*(1 + sin(t) - x)"]));
    expect(result.status).toBe('needs-period-map');
    expect(result.message).toMatch(/period map/);
    expect(result.equilibria).toEqual([]);
  });

  it('tells a curve of equilibria from an undecided one', () => {
    const epidemic = equilibriaOf(textbook(["s' = -b*s*i", "i' = b*s*i - g*i"], { b: 0.5, g: 1 }));
    expect(epidemic.equilibria.length).toBeGreaterThan(0);
    expect(epidemic.equilibria.length).toBeLessThan(8);
    expect(epidemic.equilibria.every((e) => e.type === 'not isolated' || e.type === 'saddle')).toBe(true);
    const cubic = equilibriaOf(textbook(["x' = -x^3"], {}, false));
    expect(cubic.equilibria.map((e) => e.type)).toEqual(['indistinguishable from neutral']);
  });

  it('says that immigration forbids the question of invasion', () => {
    const result = equilibriaOf(textbook(["x' = I + x*(1 - x)"], { I: 0.1 }));
    expect(result.equilibria).toHaveLength(1);
    expect(result.equilibria[0].absent).toEqual([]);
  });

  it('stops when told, with what was found', () => {
    const system = textbook(["x' = x*(1 - x - y)", "y' = y*(x - 0.5)"]);
    let asked = 0;
    const work = findEquilibria(system, system.defaults, { isCancelled: () => (asked += 1) > 3 });
    expect(finish(work).status).toBe('cancelled');
  });
});

describe('following equilibria with a slider', () => {
  it('keeps, moves and drops', () => {
    const system = textbook(["x' = r*x*(1-x/K)*(x/A-1) - q*E*x"], { r: 0.9, K: 12, A: 3, q: 0.2, E: 1.2 });
    const before = equilibriaOf(system);
    const p = Float64Array.from(system.defaults);
    p[4] = 2.4;
    const moved = trackEquilibria(system, before, p);
    const spread = Math.sqrt(81 / 4 - (0.2 * 2.4 * 36) / 0.9);
    expect(nearest(moved, [10]).state[0]).toBeCloseTo(7.5 + spread, 10);
    expect(nearest(moved, [5]).state[0]).toBeCloseTo(7.5 - spread, 10);
    p[4] = 2.6;
    const past = trackEquilibria(system, moved, p);
    expect(past.equilibria.map((e) => e.state[0])).toEqual([0]);
    expect(past.message).toMatch(/2 went out of sight/);
  });

  it('takes under a millisecond for three classes', () => {
    const system = textbook(
      ["x' = x - x*(y1+y2)", "y1' = x*(y1+y2)/2 - (1+eps)*y1", "y2' = x*(y1+y2)/2 - (1-eps)*y2"],
      { eps: 0.3 },
    );
    let known = equilibriaOf(system);
    const p = Float64Array.from(system.defaults);
    const times: number[] = [];
    for (let k = 0; k < 300; k += 1) {
      p[0] = 0.3 + 0.001 * (k % 100);
      const begun = performance.now();
      known = trackEquilibria(system, known, p);
      times.push(performance.now() - begun);
    }
    expect(known.equilibria).toHaveLength(2);
    expect(times.sort((a, b) => a - b)[150]).toBeLessThan(1);
  });
});
