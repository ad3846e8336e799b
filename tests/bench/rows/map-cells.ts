import { marginCells, type MarginCells } from '../../../src/engine/maps/margin-cells';
import { nativeMarginCells } from '../../../src/engine/maps/native-margin-cells';
import { absent, atMost, median, time, times, told, type Row } from '../measure';
import { compileBenchModel, EIGHT_CLASSES, THREE_CLASSES, type BenchModel } from '../models';
import { compileMapCells, type MapYardstick } from '../yardsticks/run';

export const COLUMNS = 64;
export const ROWS = 128;
const ROUNDS = 5;

/** Newton's method, Jacobian and eigenvalues in each cell of a map over K and e, against C with LAPACK. */
export function mapCellRows(): Row[] {
  const yardstick = compileMapCells();
  try {
    return [THREE_CLASSES, EIGHT_CLASSES].flatMap((model) => rowsOf(model, yardstick));
  } finally {
    yardstick?.dispose();
  }
}

function rowsOf(model: BenchModel, yardstick: MapYardstick | null): Row[] {
  const core = cellsOf(model, true);
  const plain = cellsOf(model, false);
  const name = `map cell, ${model.classes} classes`;
  const inCore: number[] = [];
  const inPlain: number[] = [];
  const ratios: number[] = [];
  let apart = 0;
  for (let round = 0; round < ROUNDS; round += 1) {
    const own = time(() => void core(), 1, 150).fastest;
    inCore.push(own);
    inPlain.push(time(() => void plain(), 1, 150).fastest);
    if (!yardstick) continue;
    const theirs = yardstick.run(model.classes, COLUMNS, ROWS, model.start);
    ratios.push(own / theirs.milliseconds);
    apart = Math.abs(core() - theirs.sum) / Math.abs(theirs.sum);
  }
  const rate = (COLUMNS * ROWS * 1000) / median(inCore);
  const row = `${name}: time over C with LAPACK`;
  return [
    yardstick
      ? atMost(row, median(ratios), 1, times)
      : absent(row, 'no C compiler with LAPACK on this machine', 'at most 1 x'),
    ...(yardstick ? [told(`${name}: sums of all margins, relative difference`, apart.toExponential(1))] : []),
    told(`${name}: cells a second`, rate.toExponential(2)),
    told(`${name}: plain code over the core`, times(median(inPlain) / median(inCore))),
  ];
}

/** The whole map once, column by column from the equilibria of the column before; gives the sum of all margins. */
export function cellsOf(model: BenchModel, native: boolean): () => number {
  const system = compileBenchModel(model);
  const n = model.classes;
  const p = system.defaults.slice();
  const columns = [system.parameterKeys.indexOf('K'), system.parameterKeys.indexOf('e')] as const;
  let cells: MarginCells;
  if (!native) cells = marginCells(system, p, columns);
  else if (system.native) cells = nativeMarginCells(system, system.native, p, columns);
  else throw new Error('The compiled core is not there.');
  const y = Float64Array.from({ length: ROWS }, (_, k) => 0.75 + (0.1 * k) / ROWS);
  const [x, margins, states] = [new Float64Array(ROWS), new Float64Array(ROWS), new Float64Array(ROWS * n)];
  return () => {
    for (let k = 0; k < ROWS; k += 1) states.set(model.start, k * n);
    let sum = 0;
    for (let c = 0; c < COLUMNS; c += 1) {
      cells.solve(ROWS, x.fill(3 + (2 * c) / COLUMNS), y, states, margins);
      for (let k = 0; k < ROWS; k += 1) sum += margins[k] ?? NaN;
    }
    return sum;
  };
}
