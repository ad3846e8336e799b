import { describe, expect, it } from 'vitest';

import { checkTask } from '@/engine/analyses/check-task';
import { ANALYSIS_TASK_SCHEMAS, type AnalysisTask } from '@/engine/schema/analysis-tasks';
import { z } from '@/engine/schema/zod';
import { compileModel } from '@/engine/system/compile-model';

import { splitPredator } from '../../support/example-models';

const compiled = compileModel(splitPredator(0.3));
const taskSchema = z.discriminatedUnion('task', [...ANALYSIS_TASK_SCHEMAS]);

function problemsOf(task: object): readonly string[] {
  if (!compiled.ok) throw new Error('the example does not compile');
  const parsed: AnalysisTask = taskSchema.parse(task);
  return checkTask(compiled.model, parsed);
}

const range = { parameter: 'dial:spread', from: 0, to: 2 };
const other = { parameter: 'm_y1', from: 0.5, to: 2 };

describe('names and ranges of a task', () => {
  it.each([
    { task: 'cycles', ...range },
    { task: 'cycles', parameter: 'spread', from: 2, to: 0 },
    { task: 'boundaries', first: range, second: other },
    { task: 'map', x: range, y: other },
    { task: 'basins', x: { state: 'x', from: 0, to: 1 }, y: { state: 'y1', from: 0, to: 1 } },
    { task: 'lyapunov', starts: { x: 1 } },
    { task: 'section', quantity: 'Y', value: 1 },
    { task: 'section', quantity: 'y2', value: 1 },
    { task: 'extremes', ...range, observe: 'Y' },
    { task: 'picture', ...range, box: { x: [0, 2] } },
  ])('that fit the model pass: $task', (task) => {
    expect(problemsOf(task)).toEqual([]);
  });

  it.each([
    [{ task: 'cycles', ...range, parameter: 'm_y3' }, /"m_y3" is no parameter.*Did you mean m_y1\?/],
    [{ task: 'cycles', ...range, to: 0 }, /range of dial:spread needs two different ends; both are 0/],
    [{ task: 'picture', ...range, starts: { Y: 1 } }, /"Y" is no class of this model; it has x, y1, y2/],
    [{ task: 'picture', ...range, box: { x: [2, 1] } }, /box of x ends at 1/],
    [{ task: 'map', x: range, y: { ...range, parameter: 'spread' } }, /Both parameters are dial:spread/],
    [{ task: 'boundaries', first: range, second: { ...other, parameter: 'mm_y1' } }, /Did you mean m_y1\?/],
    [
      {
        task: 'boundaries',
        first: range,
        second: other,
        point: { kind: 'Hopf', first: 1, second: 1, state: { z: 1 } },
      },
      /"z" is no class/,
    ],
    [
      { task: 'basins', x: { state: 'x', from: 0, to: 1 }, y: { state: 'x', from: 0, to: 1 } },
      /Both axes of the basins are x/,
    ],
    [{ task: 'section', quantity: 'y', value: 1 }, /"y" is no class or population.*Did you mean Y\?/],
    [{ task: 'extremes', ...range, observe: 'q' }, /"q" is no class or population/],
    [{ task: 'lyapunov', parameters: { k: 1 } }, /"k" is no parameter of this model; it has .*dial:spread/],
  ])('that do not are told: %j', (task, message) => {
    expect(problemsOf(task).join('\n')).toMatch(message);
  });
});
