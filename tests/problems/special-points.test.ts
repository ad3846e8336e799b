import { describe, expect, it } from 'vitest';

import { nearestResult, onlyResult, studyResults, type PointResult, type SideResult } from '../support/study';
import { problem, titleOf, within } from './catalogue';

const sweep = (
  preset: object,
  parameter: string,
  from: number,
  to: number,
  options: object = {},
): SideResult =>
  onlyResult({ preset, tasks: [{ task: 'sweep', parameter, from, to, bands: false, ...options }] }).split;

function points(side: SideResult, kind: string): readonly PointResult[] {
  return side.specialPoints.filter((one) => one.kind === kind && one.feasible);
}

/** The one point of a kind; a failed test where there are none or several. */
function only(side: SideResult, kind: string): PointResult {
  const found = points(side, kind);
  expect(found, JSON.stringify(side.specialPoints)).toHaveLength(1);
  return found[0];
}

describe('special points, through a study', () => {
  it.each([
    [
      { r: 1, a: 1, h: 1, e: 1, m: 0.4 },
      0.6666666666666666,
      2.3333333333333335,
      0.4140393356054125,
      -0.29982158785219526,
      0.08571428571428572,
    ],
    [
      { r: 0.8, a: 1.2, h: 0.6, e: 0.7, m: 0.35 },
      0.5952380952380952,
      2.5793650793650795,
      0.3882901373576604,
      -0.25112906849143424,
      0.046523076923076924,
    ],
  ])(`${titleOf('C1')} %j`, (parameters, transcritical, hopfAt, omega, l1, speed) => {
    const preset = {
      equations: problem('C1').equations,
      parameters: { ...parameters, K: 1.5 },
      init: { x: 0.5, y: 0.5 },
      sign: 'nonnegative',
    };
    const side = sweep(preset, 'K', 0.2, 4);
    within(only(side, 'transcritical').parameter, transcritical, 1e-7);
    const { parameter, hopf } = only(side, 'Hopf');
    within(parameter, hopfAt, 1e-7);
    within(hopf?.omega, omega, 1e-6);
    within((hopf?.l1 ?? 0) / l1, 1, 1e-4);
    within((hopf?.crossingSpeed ?? 0) / speed, 1, 1e-4);
    expect(hopf?.criticality).toBe('supercritical');
  });

  it(`${titleOf('C1')} amplitude of the cycle just past its onset`, () => {
    const preset = {
      equations: problem('C1').equations,
      parameters: { r: 1, a: 1, h: 1, e: 1, m: 0.4, K: 2.34 },
      init: { x: 0.6, y: 1.2 },
      sign: 'nonnegative',
    };
    const times = Array.from({ length: 4001 }, (_, k) => 20_000 + k * 0.1);
    const { split } = onlyResult({
      preset,
      tasks: [{ task: 'trajectory', times, relativeTolerance: 1e-10 }],
    });
    const x = split.states['x'];
    const half = (Math.max(...x) - Math.min(...x)) / 2;
    within(half ** 2 / (2.34 - 7 / 3) / (4 / 3), 1, 0.02);
  });

  it(titleOf('C2'), () => {
    const preset = {
      equations: problem('C2').equations,
      parameters: { r: 0.9, K: 12, A: 3, q: 0.2, E: 1.2 },
      init: { x: 10 },
      sign: 'nonnegative',
    };
    const fold = only(sweep(preset, 'E', 0, 4), 'fold');
    within(fold.parameter, 2.53125, 1e-7);
    within(fold.state['x'], 7.5, 1e-4);
    const { split } = onlyResult({ preset, tasks: [{ task: 'equilibria' }] });
    expect(split.equilibria).toHaveLength(3);
    within(nearestResult(split, [10.76]).state['x'], 10.763433774416145, 1e-8);
    within(nearestResult(split, [10.76]).eigenvalues[0].re, -1.756287665406054, 1e-8);
    within(nearestResult(split, [4.24]).eigenvalues[0].re, 0.691287665406054, 1e-8);
    within(nearestResult(split, [0]).eigenvalues[0].re, -1.14, 1e-8);
  });

  it.each([
    [
      6,
      [
        [2.5320888862379562, 0.5910954862945774],
        [1.3472963553338606, 0.6171611624217678],
      ],
      [0.5, 0.6, 0.7],
    ],
    [
      10,
      [
        [4.781283795978356, 0.3839707316274608],
        [1.1378052016139044, 0.5595250124456357],
      ],
      [0.3, 0.45, 0.7],
    ],
    [
      20,
      [
        [9.897926849309806, 0.1979997937490933],
        [1.057474507277843, 0.5270894556699132],
      ],
      [0.1, 0.4, 0.7],
    ],
  ])(`${titleOf('C3')} k = %s`, (k, folds, values) => {
    const preset = {
      equations: problem('C3').equations,
      parameters: { r: 0.5, k },
      init: { x: 1 },
      sign: 'nonnegative',
    };
    const found = [...points(sweep(preset, 'r', 0.05, 0.9), 'fold')].sort(
      (a, b) => a.parameter - b.parameter,
    );
    expect(found).toHaveLength(2);
    folds.forEach(([x, r], i) => {
      within(found[i].parameter, r, 1e-7);
      within(found[i].state['x'], x, 1e-4);
    });
    const counts = studyResults({
      preset,
      tasks: values.map((r) => ({ task: 'equilibria', parameters: { r } })),
    }).map((one) => one.split.equilibria.length);
    // Zero besides: one state outside the folds, three between.
    expect(counts).toEqual([2, 4, 2]);
  });

  it(titleOf('C4'), () => {
    const [pitchfork, atPitchfork] = studyResults({
      preset: {
        equations: ["x' = mu*x - x^3"],
        parameters: { mu: 0.25 },
        init: { x: 0.3 },
        box: { x: [-2, 2] },
      },
      tasks: [{ task: 'sweep', parameter: 'mu', from: -1, to: 1 }, { task: 'equilibria' }],
    });
    within(only(pitchfork.split, 'pitchfork').parameter, 0, 1e-6);
    expect(atPitchfork.split.equilibria.map((one) => one.state['x']).sort((a, b) => a - b)).toHaveLength(3);
    [-0.5, 0, 0.5].forEach((x) => within(nearestResult(atPitchfork.split, [x]).state['x'], x, 1e-8));

    const [transcritical, atTranscritical] = studyResults({
      preset: {
        equations: ["x' = mu*x - x^2"],
        parameters: { mu: 0.25 },
        init: { x: 0.3 },
        box: { x: [-2, 2] },
      },
      tasks: [{ task: 'sweep', parameter: 'mu', from: -1, to: 1 }, { task: 'equilibria' }],
    });
    within(only(transcritical.split, 'transcritical').parameter, 0, 1e-6);
    [0, 0.25].forEach((x) => within(nearestResult(atTranscritical.split, [x]).state['x'], x, 1e-8));

    const [coupled, atCoupled] = studyResults({
      preset: {
        equations: ["u' = mu*u - u^3 - u*v", "v' = -v + u^2"],
        parameters: { mu: 0.5 },
        init: { u: 0.3, v: 0.1 },
        box: { u: [-2, 2], v: [-2, 2] },
      },
      tasks: [{ task: 'sweep', parameter: 'mu', from: -0.7, to: 0.9 }, { task: 'equilibria' }],
    });
    within(only(coupled.split, 'pitchfork').parameter, 0, 1e-6);
    expect(atCoupled.split.equilibria).toHaveLength(3);
    for (const u of [0.5, -0.5]) {
      const one = nearestResult(atCoupled.split, [u, 0.25]);
      within(one.state['u'], u, 1e-8);
      within(one.state['v'], 0.25, 1e-8);
      within(one.eigenvalues[0].re, -0.75, 1e-8);
      within(one.eigenvalues[0].im, 0.6614378277661477, 1e-8);
    }
  });

  it.each([
    [1, 2, 1, -0.5],
    [2, 5, 2, -0.16666666666666666],
  ])(`${titleOf('C5')} A = %s`, (A, at, omega, l1) => {
    const preset = { equations: problem('C5').equations, parameters: { A, B: 1.5 }, init: { x: 1, y: 1 } };
    const { parameter, hopf } = only(sweep(preset, 'B', 0.5, 7), 'Hopf');
    within(parameter, at, 1e-7);
    within(hopf?.omega, omega, 1e-6);
    within((hopf?.l1 ?? 0) / l1, 1, 1e-4);
    expect(hopf?.criticality).toBe('supercritical');
  });

  it(titleOf('C6'), () => {
    const preset = {
      equations: problem('C6').equations,
      parameters: { s: 10, r: 28, b: 8 / 3 },
      init: { x: 1, y: 1, z: 20 },
      box: { x: [-30, 30], y: [-30, 30], z: [-5, 60] },
    };
    const [swept, found] = studyResults({
      preset,
      tasks: [{ task: 'sweep', parameter: 'r', from: 0.5, to: 30, bands: false }, { task: 'equilibria' }],
    });
    within(only(swept.split, 'pitchfork').parameter, 1, 1e-6);
    const hopfs = points(swept.split, 'Hopf');
    expect(hopfs).toHaveLength(2);
    for (const { parameter, hopf } of hopfs) {
      within(parameter, 470 / 19, 1e-6);
      within(hopf?.omega, 9.624530063715756, 1e-6);
      within((hopf?.l1 ?? 0) / 0.00026551897258367144, 1, 1e-3);
      expect(hopf?.criticality).toBe('subcritical');
    }
    const c = Math.sqrt((8 / 3) * 27);
    expect(found.split.equilibria).toHaveLength(3);
    const wing = nearestResult(found.split, [c, c, 27]);
    within(wing.eigenvalues[0].re, 0.09395562396468551, 1e-8);
    within(wing.eigenvalues[0].im, 10.19450522092785, 1e-8);
    within(nearestResult(found.split, [0, 0, 0]).eigenvalues[2].re, -22.827723451163457, 1e-8);
  });

  it(`${titleOf('C12')} (the Hopf point)`, () => {
    const preset = {
      equations: problem('C12').equations,
      parameters: { mu: -0.1 },
      init: { x: 0.1, y: 0.1 },
    };
    // The parameter occurs in the equations of the case without a value of its own.
    const { parameter, hopf } = only(sweep(preset, 'mu', -0.4, 0.4), 'Hopf');
    within(parameter, 0, 1e-5);
    within(hopf?.omega, 1, 1e-6);
    expect(hopf?.criticality).toBe('subcritical');
  });
});
