import { setFlagsFromString } from 'node:v8';
import { runInNewContext } from 'node:vm';

import { nativeMarginCells } from '../../../src/engine/maps/native-margin-cells';
import { integrateTo } from '../../../src/engine/integrators/driver';
import type { CompiledSystem } from '../../../src/engine/system/contract';
import { systemFromEquations } from '../../../src/engine/system/from-equations';
import { atMost, time, told, type Row } from '../measure';
import { starterDrags } from './live';

const SIZES = [3, 10, 30];
const CELLS = 128;
const DRAGS = 400;
const MEGABYTE = 2 ** 20;

/** How cost grows with the number of classes, and memory with the number of drags. */
export function growthRows(): Row[] {
  return [...SIZES.flatMap(sizeRows), memoryRow()];
}

/** Competitors along a line: each meets all, the nearer the more. At c = 0.4 they rest together at 5/3 and 5/6. */
function competitors(n: number): CompiledSystem {
  const weight = (i: number, j: number): number => 0.5 ** Math.abs(i - j);
  const equations = Array.from({ length: n }, (_, i) => {
    const met = Array.from({ length: n }, (_, j) => `${weight(i, j)}*x${j}`).join('+');
    return `x${i}' = r*x${i}*(1 - c*(${met}))`;
  });
  const made = systemFromEquations({ equations, parameters: { r: 1, c: 0.4 }, nonnegative: true });
  if (!made.ok) throw new Error(made.message);
  return made.system;
}

function sizeRows(n: number): Row[] {
  const system = competitors(n);
  const start = Float64Array.from({ length: n }, (_, i) => 0.5 + 0.4 * Math.sin(i));
  const [rhs, jacobian] = [new Float64Array(n), new Float64Array(n * n)];
  const microseconds = (calls: number, work: () => void): string => {
    const spent = time(() => {
      for (let k = 0; k < calls; k += 1) work();
    }, 5).median;
    return `${Number(((1000 * spent) / calls).toPrecision(3))} us`;
  };
  const rows = [
    told(
      `n = ${n}: right-hand side`,
      microseconds(1000, () => system.rhs(0, start, rhs)),
    ),
    told(
      `n = ${n}: Jacobian`,
      microseconds(1000, () => system.jacobian(0, start, jacobian)),
    ),
    told(
      `n = ${n}: trajectory to t = 200`,
      microseconds(
        1,
        () => void integrateTo(system, start, Float64Array.of(0, 200), { method: 'dormand-prince-54' }),
      ),
    ),
  ];
  if (system.native) {
    const cells = nativeMarginCells(system, system.native, system.defaults.slice(), [0, 1]);
    const [x, y] = [
      new Float64Array(CELLS).fill(1),
      Float64Array.from({ length: CELLS }, (_, k) => 0.4 + 1e-4 * k),
    ];
    const [states, margins] = [new Float64Array(CELLS * n), new Float64Array(CELLS)];
    const solve = (): void => {
      for (let e = 0; e < CELLS * n; e += 1) states[e] = e % n === 0 || e % n === n - 1 ? 5 / 3 : 5 / 6;
      cells.solve(CELLS, x, y, states, margins);
    };
    solve();
    if (margins.some(Number.isNaN)) throw new Error('A cell of the bench has no equilibrium.');
    rows.push(told(`n = ${n}: ${CELLS} map cells`, microseconds(1, solve)));
  }
  return rows;
}

/** Memory in use after many drags of a slider against after few, garbage collected. */
function memoryRow(): Row {
  setFlagsFromString('--expose-gc');
  const collect = runInNewContext('gc') as () => void;
  const used = (): number => {
    for (let k = 0; k < 3; k += 1) collect();
    const { heapUsed, external } = process.memoryUsage();
    return heapUsed + external;
  };
  const drag = starterDrags();
  for (let k = 0; k < DRAGS / 4; k += 1) drag();
  const before = used();
  for (let k = 0; k < DRAGS; k += 1) drag();
  const grown = Math.max(0, used() - before);
  return atMost(
    `memory after ${DRAGS} more drags of a slider`,
    grown / MEGABYTE,
    0.5,
    (value) => `${Number(value.toPrecision(2))} MB more`,
  );
}
