import { describe, expect, it } from 'vitest';

import { runStudy } from '@/batch/run-study';
import { STARTER_PRESETS } from '@/presets/index';

import { onlyResult, studyResults } from '../support/study';

const logistic = { equations: ["x' = r*x*(1-x/K)"], parameters: { r: 0.7, K: 10 }, init: { x: 0.4 } };

function problemsOf(study: unknown): string {
  const outcome = runStudy(study);
  if (outcome.ok) throw new Error('the study was not refused');
  return outcome.problems.join('\n');
}

describe('refusals name the place', () => {
  const task = { task: 'equilibria' };
  it.each([
    ['no object', [], /JSON object/],
    ['a stray key', { preset: logistic, tasks: [task], extra: 1 }, /"extra" is neither/],
    ['no preset', { tasks: [task] }, /no model/],
    ['a foreign document', { preset: { format: 'other' }, tasks: [task] }, /"format" should read/],
    ['no tasks', { preset: logistic, tasks: [] }, /at least one task/],
    ['an unknown task', { preset: logistic, tasks: [{ task: 'guess' }] }, /[Tt]ask/],
    ['an unknown option', { preset: logistic, tasks: [{ ...task, speed: 3 }] }, /speed/],
    ['a bad equation', { preset: { equations: ['x = 3'] }, tasks: [task] }, /Equation 1/],
    ['an unknown symbol', { preset: { equations: ["x' = r*q"], parameters: { r: 1 } }, tasks: [task] }, /q/],
    [
      'an unknown parameter',
      { preset: logistic, tasks: [{ ...task, parameters: { z: 1 } }] },
      /Task 1: "z" is no parameter of this model; it has r, K/,
    ],
    [
      'an unknown class',
      { preset: logistic, tasks: [{ task: 'trajectory', starts: { y: 1 } }] },
      /"y" is no class/,
    ],
    ['an empty box', { preset: logistic, tasks: [{ ...task, box: { x: [3, 3] } }] }, /box of x/],
    [
      'a sweep of nothing',
      { preset: logistic, tasks: [{ task: 'sweep', parameter: 'q', from: 0, to: 1 }] },
      /"q" is no parameter/,
    ],
    [
      'a sweep without length',
      { preset: logistic, tasks: [{ task: 'sweep', parameter: 'r', from: 1, to: 1 }] },
      /two different ends/,
    ],
    [
      'times that turn back',
      { preset: logistic, tasks: [{ task: 'trajectory', times: [1, 3, 2] }] },
      /one direction/,
    ],
  ])('%s', (_name, study, message) => {
    expect(problemsOf(study)).toMatch(message);
  });
});

describe('tasks', () => {
  it('integrates backwards, and from another start time', () => {
    const K = 10;
    const closed = (t: number): number => K / (1 + (K / 0.4 - 1) * Math.exp(-0.7 * t));
    const { split } = onlyResult({
      preset: logistic,
      tasks: [{ task: 'trajectory', startTime: 2, times: [1, 0, -3] }],
    });
    expect(split.times).toEqual([1, 0, -3]);
    split.states['x'].forEach((x, k) => expect(x / closed(split.times[k] - 2)).toBeCloseTo(1, 7));
  });

  it('takes parameters, starts and boxes of each task', () => {
    const [first, second] = studyResults({
      preset: logistic,
      tasks: [
        { task: 'equilibria', parameters: { K: 4 }, twin: false },
        { task: 'equilibria', box: { x: [5, 20] } },
      ],
    });
    expect(first.split.equilibria.map((one) => one.state['x']).sort()).toEqual([0, 4]);
    expect(first.verdict).toBeNull();
    expect(second.split.equilibria.map((one) => one.state['x'])).toEqual([10]);
  });

  it('says that formulas with time need the period map, and still integrates', () => {
    const seasonal = { equations: ["x' = x*(1 + sin(t)) - x^2"], init: { x: 1 } };
    const [run, found, swept] = studyResults({
      preset: { ...seasonal, parameters: { c: 1 } },
      tasks: [
        { task: 'trajectory', times: [1] },
        { task: 'equilibria' },
        { task: 'sweep', parameter: 'c', from: 0, to: 1 },
      ],
    });
    expect(run.split.status).toBe('complete');
    expect(found.split).toMatchObject({ status: 'needs-period-map', equilibria: [] });
    expect(swept.split.status).toBe('needs-period-map');
  });

  it.each(STARTER_PRESETS.map((one) => [one.id, one.document] as const))(
    'runs the starter preset %s, twin and caution included',
    (_id, preset) => {
      const outcome = runStudy({
        preset,
        tasks: [{ task: 'equilibria' }, { task: 'trajectory', horizon: 5, samples: 3 }],
      });
      if (!outcome.ok) throw new Error(outcome.problems.join('; '));
      const results = JSON.parse(JSON.stringify(outcome.results));
      const harvested = preset.processes.some((process) => process.kind === 'harvest');
      expect(results.cautions).toHaveLength(harvested ? 1 : 0);
      expect(results.tasks[1].split.times).toEqual([0, 2.5, 5]);
      expect(results.tasks[1].twin === null).toBe(results.twin.states.length === 0);
    },
  );
});
