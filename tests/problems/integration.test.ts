import { describe, expect, it } from 'vitest';

import { onlyResult, studyResults } from '../support/study';
import { problem, titleOf, within } from './catalogue';

/** States of a case at given times, every method in turn. */
function statesAt(
  preset: object,
  times: readonly number[],
  options: object = {},
): { at: (symbol: string, k: number) => number; status: string } {
  const { split } = onlyResult({
    preset,
    tasks: [{ task: 'trajectory', times, relativeTolerance: 1e-12, absoluteTolerance: 1e-14, ...options }],
  });
  return { at: (symbol, k) => split.states[symbol][k], status: split.status };
}

describe('integration, through a study', () => {
  it(titleOf('A1'), () => {
    const preset = { equations: problem('A1').equations, init: { x: 0.5, y: 0.5 } };
    const expected: Record<number, [number, number]> = {
      1: [0.8995871398673474, 0.3604298021967716],
      10: [1.8095759537589062, 1.7010661428328864],
      50: [1.9913175586286378, 1.466977416833664],
      100: [0.4174007266277082, 0.624697758694918],
    };
    for (const method of ['automatic', 'dormand-prince-54', 'dormand-prince-853', 'odex']) {
      const times = Object.keys(expected).map(Number);
      const { at } = statesAt(preset, times, { method });
      times.forEach((time, k) => {
        within(at('x', k), expected[time][0], 1e-7);
        within(at('y', k), expected[time][1], 1e-7);
        const v = at('x', k) - Math.log(at('x', k)) + at('y', k) - Math.log(at('y', k));
        within(v, 1 + 2 * Math.log(2), 1e-8);
      });
    }
  });

  it(titleOf('A4'), () => {
    const preset = {
      equations: problem('A4').equations,
      parameters: { mu: 0.012277471 },
      init: { x: 0.994, y: 0, u: 0, v: -2.0015851063790824 },
    };
    const { at } = statesAt(preset, [2, 5, 17.065216560157964], { relativeTolerance: 1e-13 });
    [-0.5798767232363895, 0.6090783555023062, -0.4225300922738806, 0.24422199185507654].forEach((x, i) =>
      within(at(['x', 'y', 'u', 'v'][i], 0), x, 1e-7),
    );
    [0.022688783647977124, 0.8665401401712473, -0.1177364786408644, -0.42178580416287775].forEach((x, i) =>
      within(at(['x', 'y', 'u', 'v'][i], 1), x, 1e-7),
    );
    [0.994, 0, 0, -2.0015851063790824].forEach((x, i) => within(at(['x', 'y', 'u', 'v'][i], 2), x, 1e-4));
  });

  it(titleOf('A5'), () => {
    const preset = { equations: problem('A5').equations, parameters: { A: 1, B: 3 }, init: { x: 1.5, y: 3 } };
    const { at } = statesAt(preset, [20]);
    within(at('x', 0), 0.49863707126834783, 1e-8);
    within(at('y', 0), 4.596780349452011, 1e-8);
  });

  it(titleOf('A6'), () => {
    const preset = { equations: problem('A6').equations, init: { a: 1, b: 0, c: 0 } };
    const expected: readonly [number, number[]][] = [
      [0.4, [0.9851721138609931, 3.386395378974941e-5, 0.01479402218521893]],
      [40, [0.715827068719405, 9.185534764557764e-6, 0.28416374574583037]],
      [4000, [0.18320225777671004, 8.942371252776118e-7, 0.8167968479861691]],
      [4e5, [0.004938274520979821, 1.984994087954366e-8, 0.995061705629085]],
      [1e11, [2.083340149701255e-8, 8.333360770334713e-14, 0.999999979166505]],
    ];
    for (const method of ['automatic', 'rosenbrock']) {
      const run = statesAt(
        preset,
        expected.map(([time]) => time),
        {
          method,
          relativeTolerance: 1e-8,
          absoluteTolerance: 1e-20,
        },
      );
      expect(run.status).toBe('complete');
      expected.forEach(([time, state], k) =>
        state.forEach((x, i) => within(run.at('abc'[i], k) / x, 1, time > 1e6 ? 1e-4 : 1e-5)),
      );
    }
  });

  it(titleOf('A9'), () => {
    const growth: readonly [string, number, number][] = [
      ["n' = r*n*(1-n/K)", 5.7979847524698656, 9.946321534984136],
      ["n' = r*n*(1-(n/K)^theta)", 8.514118051243564, 9.9999905248482],
      ["n' = r*n*log(K/n)", 9.073730363562023, 9.992764419008974],
    ];
    for (const [equation, early, late] of growth) {
      const preset = { equations: [equation], parameters: { r: 0.7, K: 10, theta: 2.5 }, init: { n: 0.4 } };
      const { at } = statesAt(preset, [5, 12]);
      within(at('n', 0) / early, 1, 1e-8);
      within(at('n', 1) / late, 1, 1e-8);
    }
  });

  it(titleOf('A10'), () => {
    const expected: Record<number, readonly [number, number[]][]> = {
      0: [[100, [0.4174007266277082, 0.312348879347459, 0.312348879347459]]],
      0.3: [
        [5, [0.38130418724550735, 0.4748596547029569, 0.9656359958974992]],
        [20, [0.4380333849137058, 0.29112963043250395, 0.6787158790038753]],
        [100, [0.9448829854929683, 0.40340296915343093, 0.7165190784920508]],
      ],
      0.9: [[100, [0.1852268898034075, 0.041456747725639786, 0.8536940829218159]]],
    };
    for (const [eps, rows] of Object.entries(expected)) {
      const preset = {
        equations: problem('A10').equations,
        parameters: { eps: Number(eps) },
        init: { x: 0.5, y1: 0.25, y2: 0.25 },
        sign: 'nonnegative',
      };
      const { at } = statesAt(
        preset,
        rows.map(([time]) => time),
      );
      rows.forEach(([, state], k) => state.forEach((x, i) => within(at(['x', 'y1', 'y2'][i], k), x, 1e-7)));
    }
  });

  it(titleOf('J1'), () => {
    const e = 0.5;
    const preset = {
      equations: problem('J1').equations,
      parameters: { r: 1.2, a: 0.1, b: 0.4, e, m: 0.3 },
      init: { x: 3, y: 1 },
      sign: 'nonnegative',
    };
    const times = Array.from({ length: 41 }, (_, k) => k / 4);
    const [run, found] = studyResults({
      preset,
      tasks: [{ task: 'trajectory', times, relativeTolerance: 1e-12 }, { task: 'equilibria' }],
    });
    const inner = found.split.equilibria.find((one) => one.absent.length === 0);
    within(inner?.state['x'], 1.5, 1e-10);
    within(inner?.state['y'], 2.625, 1e-10);
    const V = run.split.states['x'].map((x, k) => {
      const y = run.split.states['y'][k];
      return e * (x - 1.5 - 1.5 * Math.log(x / 1.5)) + (y - 2.625 - 2.625 * Math.log(y / 2.625));
    });
    within(V[0], 1.138476966694457, 1e-8);
    within(V[40], 0.17129155781171856, 1e-8);
    V.forEach((value, k) => expect(k === 0 || value <= V[k - 1]).toBe(true));
  });
});
