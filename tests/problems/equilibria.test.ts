import { describe, expect, it } from 'vitest';

import { listOf, nearestResult, onlyResult } from '../support/study';
import { problem, titleOf, within } from './catalogue';

const equilibria = (preset: object) => onlyResult({ preset, tasks: [{ task: 'equilibria' }] }).split;

describe('equilibria, through a study', () => {
  it.each([
    [0.1, [-0.0024748439240214544, 0.9924813297139757, -1.0050503121519572]],
    [0.3, [-0.02036325821580087, 0.9310489159786635, -1.0492734835683983]],
    [0.5, [-0.044707643262208455, 0.802637659185427, -1.1605847134755831]],
    [0.9, [-0.023322263019518136, 0.32742203915802476, -1.7633554739609638]],
  ])(`${titleOf('B1')} eps = %s`, (eps, [re, im, third]) => {
    const found = equilibria({
      equations: problem('B1').equations,
      parameters: { eps },
      sign: 'nonnegative',
    });
    expect(found.equilibria).toHaveLength(2);
    const inner = nearestResult(found, [1 - eps ** 2, (1 - eps) / 2, (1 + eps) / 2]);
    [1 - eps ** 2, (1 - eps) / 2, (1 + eps) / 2].forEach((x, i) => within(listOf(inner.state)[i], x, 1e-10));
    within(inner.eigenvalues[0].re, re, 1e-9);
    within(inner.eigenvalues[0].im, im, 1e-9);
    within(inner.eigenvalues[2].re, third, 1e-9);
    expect(inner.type).toBe('stable focus');
    expect(inner.attracts).toBe('yes');
  });

  it(`${titleOf('B1')} eps = 0 is neutral, by a constant of motion`, () => {
    const found = equilibria({
      equations: problem('B1').equations,
      parameters: { eps: 0 },
      sign: 'nonnegative',
    });
    const inner = nearestResult(found, [1, 0.5, 0.5]);
    expect(inner.type).toBe('neutral');
    expect(inner.attracts).toBe('neutral');
  });

  it.each([
    [0.1, [-0.005024869283515751, 0.9999619965010529, -1.0101522816349886]],
    [0.3, [-0.04689117178068055, 0.9965765136913249, -1.1040198542408366]],
    [0.5, [-0.1354363586820753, 0.9679399909871798, -1.395793949302516]],
    [0.9, [-0.2597362203439347, 0.7189492981366765, -9.006843348785814]],
  ])(`${titleOf('B2')} eps = %s`, (eps, [re, im, third]) => {
    const found = equilibria({
      equations: problem('B2').equations,
      parameters: { eps },
      sign: 'nonnegative',
    });
    const expected = [1 / (2 * (1 + eps)), 1 / (2 * (1 - eps)), 1 / (1 - eps ** 2)];
    const inner = nearestResult(found, expected);
    expected.forEach((x, i) => within(listOf(inner.state)[i], x, 1e-10));
    within(inner.eigenvalues[0].re, re, 1e-8);
    within(inner.eigenvalues[0].im, im, 1e-8);
    within(inner.eigenvalues[2].re, third, 1e-8);
    expect(inner.type).toBe('stable focus');
  });

  it.each([
    [0.5, 0.8, 'stable focus'],
    [0.8, 1.2, 'indistinguishable from neutral'],
    [0.8, 1.3, 'saddle focus'],
  ])(`${titleOf('B6')} (%s, %s)`, (al, be, type) => {
    const found = equilibria({
      equations: problem('B6').equations,
      parameters: { al, be },
      init: { n1: 0.5, n2: 0.4, n3: 0.3 },
      sign: 'nonnegative',
    });
    const N = 1 / (1 + al + be);
    const inner = nearestResult(found, [N, N, N]);
    listOf(inner.state).forEach((x) => within(x, N, 1e-10));
    within(inner.eigenvalues[0].re, (-1 + (al + be) / 2) * N, 1e-9);
    within(inner.eigenvalues[0].im, (Math.sqrt(3) / 2) * Math.abs(al - be) * N, 1e-9);
    within(inner.eigenvalues[2].re, -1, 1e-9);
    expect(inner.type).toBe(type);
    if (be === 1.3) expect(found.equilibria).toHaveLength(5);
  });

  it(titleOf('B8'), () => {
    const parameters = { b: 3, um: 0.8, uf: 0.5, c: 0.01 };
    const { equations } = problem('B8');
    const found = equilibria({ equations, parameters, init: { M: 10, F: 10 }, sign: 'nonnegative' });
    const inner = nearestResult(found, [38.25, 46.75]);
    within(inner.state['M'] / 38.25, 1, 1e-9);
    within(inner.state['F'] / 46.75, 1, 1e-9);
    within(inner.eigenvalues[0].re, -0.85, 1e-8);
    within(inner.eigenvalues[1].re, -1.485, 1e-8);
    const zero = nearestResult(found, [0, 0]);
    expect(zero.type).toBe('not differentiable');
    expect(zero.eigenvalues).toEqual([]);
    // Below b = um + uf = 1.3 the population dies out.
    const below = equilibria({
      equations,
      parameters: { ...parameters, b: 1.2 },
      init: { M: 10, F: 10 },
      sign: 'nonnegative',
    });
    expect(below.equilibria.every((one) => one.absent.length === 2)).toBe(true);
  });
});
