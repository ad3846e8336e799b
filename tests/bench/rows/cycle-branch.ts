import { cycles } from '../../../src/engine/cycles/cycles';
import { sweep } from '../../../src/engine/continuation/sweep';
import type { SpecialPoint } from '../../../src/engine/continuation/contract';
import type { CyclesResult } from '../../../src/engine/cycles/contract';
import { atMost, milliseconds, time, type Row } from '../measure';
import { compileBenchModel, THREE_CLASSES } from '../models';

const POINTS = 200;
const FROM = 1;
const TO = 60;

/** Cycles of the three-class model from its Hopf point along K, 40 intervals of 4 points each. */
export function cycleBranchRows(): Row[] {
  const system = compileBenchModel(THREE_CLASSES);
  const parameterIndex = system.parameterKeys.indexOf('K');
  const starts = [Float64Array.from(THREE_CLASSES.start)];
  const range = { parameterIndex, from: FROM, to: TO, starts };
  const hopfPoints: readonly SpecialPoint[] = finish(
    sweep(system, system.defaults.slice(), { ...range, bands: false }),
  ).specialPoints;
  const run = (): CyclesResult =>
    finish(
      cycles(system, system.defaults.slice(), {
        ...range,
        beginFrom: 'Hopf points',
        hopfPoints,
        intervals: 40,
        collocationPoints: 4,
        maximumPoints: POINTS,
      }),
    );
  const { points, branches } = run();
  if (branches.length === 0) throw new Error('The bench found no branch of cycles.');
  const spent = time(() => void run(), 3, 100).median;
  return [
    atMost(
      `cycle branch, 3 classes, 40 x 4, ${points} points: time for ${POINTS}`,
      (spent * POINTS) / points,
      1000,
      milliseconds,
    ),
  ];
}

function finish<R>(work: Generator<unknown, R>): R {
  for (;;) {
    const next = work.next();
    if (next.done) return next.value;
  }
}
