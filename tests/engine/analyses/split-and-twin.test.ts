import { describe, expect, it } from 'vitest';

import { splitAndTwin, type Side } from '@/engine/analyses/split-and-twin';
import type { Progress } from '@/engine/continuation/contract';
import { pictureTaskSchema, sectionTaskSchema } from '@/engine/schema/analysis-tasks';
import { compileModel, type CompiledModel } from '@/engine/system/compile-model';

import { splitPredator } from '../../support/example-models';

interface Counted {
  readonly status: 'complete' | 'cancelled';
  readonly message: string;
  readonly counted: number;
}

const STEPS = 5;

function modelOf(eps = 0.3): CompiledModel {
  const compiled = compileModel(splitPredator(eps));
  if (!compiled.ok) throw new Error('the example does not compile');
  return compiled.model;
}

const taskOf = (changes: object = {}) =>
  sectionTaskSchema.parse({ task: 'section', quantity: 'x', value: 1, ...changes });

/** Counts to five, one a slice, and remembers for whom. */
function counting(sides: Side[] = []) {
  return function* count(side: Side): Generator<Progress<Counted>, Counted> {
    sides.push(side);
    for (let k = 1; k <= STEPS; k += 1)
      yield {
        fraction: k / STEPS,
        stage: side.of,
        partial: { status: 'complete', message: '', counted: k },
      };
    return { status: 'complete', message: 'done', counted: STEPS };
  };
}

function drive<Result>(work: Generator<Progress<Result>, Result>) {
  const progress: Progress<Result>[] = [];
  for (;;) {
    const next = work.next();
    if (next.done) return { result: next.value, progress };
    progress.push(next.value);
  }
}

describe('a task for the model and its pooled twin', () => {
  it('runs one after the other, with progress from 0 to 1 and partial results of both', () => {
    const { result, progress } = drive(splitAndTwin(modelOf(), taskOf(), {}, counting()));
    expect(result).toEqual({
      split: { status: 'complete', message: 'done', counted: 5 },
      twin: { status: 'complete', message: 'done', counted: 5 },
    });
    expect(progress.map((one) => one.fraction)).toEqual([0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8, 0.9, 1]);
    expect(progress.map((one) => one.stage)).toEqual([
      ...Array.from({ length: 5 }, () => 'split'),
      ...Array.from({ length: 5 }, () => 'twin'),
    ]);
    expect(progress[1].partial).toMatchObject({ split: { counted: 2 }, twin: null });
    expect(progress[6].partial).toMatchObject({ split: { counted: 5 }, twin: { counted: 2 } });
  });

  it('hands each side its own parameters, starts and box', () => {
    const sides: Side[] = [];
    const task = pictureTaskSchema.parse({
      task: 'picture',
      parameter: 'm_y1',
      from: 1,
      to: 2,
      parameters: { spread: 0.5 },
      starts: { y1: 2 },
      box: { y1: [0, 3], y2: [1, 4] },
    });
    const model = modelOf();
    drive(splitAndTwin(model, task, {}, counting(sides)));
    const [split, twin] = sides;
    const spread = model.parameterIndex('spread');
    expect([split.p[spread], twin.p[spread]]).toEqual([0.5, 0.5]);
    expect(split.p).not.toBe(twin.p);
    // Starts of the example are 0.5, 0.25, 0.25; the twin starts at the totals.
    expect([...split.starts]).toEqual([0.5, 2, 0.25]);
    expect([...twin.starts]).toEqual([0.5, 2.25]);
    expect(split.box.slice(1)).toEqual([
      { from: 0, to: 3 },
      { from: 1, to: 4 },
    ]);
    expect(twin.box[1]).toEqual({ from: 1, to: 7 });
    expect([...twin.toState({ y2: 5 })]).toEqual([0.5, 5.25]);
  });

  it('leaves the twin out where it is not asked for', () => {
    const { result, progress } = drive(splitAndTwin(modelOf(), taskOf({ twin: false }), {}, counting()));
    expect(result.twin).toBeNull();
    expect(progress[4].fraction).toBe(1);
  });

  it('cancelled in the first half keeps what the split model had, and leaves the twin out', () => {
    let asked = 0;
    const isCancelled = () => (asked += 1) >= 3;
    const { result, progress } = drive(splitAndTwin(modelOf(), taskOf(), { isCancelled }, counting()));
    expect(result.split).toMatchObject({ status: 'cancelled', counted: 3 });
    expect(result.split.message).toMatch(/Cancelled; what was found/);
    expect(result.twin).toBeNull();
    expect(progress).toHaveLength(2);
  });

  it('cancelled in the second half keeps the split model whole', () => {
    let asked = 0;
    const isCancelled = () => (asked += 1) >= 7;
    const { result } = drive(splitAndTwin(modelOf(), taskOf(), { isCancelled }, counting()));
    expect(result.split).toMatchObject({ status: 'complete', counted: 5 });
    expect(result.twin).toMatchObject({ status: 'cancelled', counted: 2 });
  });
});
