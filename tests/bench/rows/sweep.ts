import type { SweepResult } from '../../../src/engine/continuation/contract';
import { sweep } from '../../../src/engine/continuation/sweep';
import type { CompiledSystem } from '../../../src/engine/system/contract';
import { absent, atLeast, atMost, median, milliseconds, time, times, told, type Row } from '../measure';
import { compileBenchModel, THREE_CLASSES } from '../models';
import { runPythonSweep } from '../yardsticks/run';

const POINTS = 1000;
const FROM = 0.5;
const TO = 6;

/** The three-class model along K: eigenvalues at every point, special points located; bands left out. */
export function sweepRows(): Row[] {
  const system = compileBenchModel(THREE_CLASSES);
  const step = stepForPoints(system);
  const { result } = run(system, step);
  const hopf = result.specialPoints.filter((point) => point.kind === 'Hopf');
  const whole = time(() => run(system, step)).median;
  // The yardstick is told where to begin, so only the following of branches is set against it.
  const share = POINTS / result.points;
  const wasm = share * followingTime(system, step);
  const closure = share * followingTime(compileBenchModel(THREE_CLASSES, 'closure'), step);
  if (!(wasm > 0)) throw new Error('The sweep told of no time spent on following branches.');
  const name = `sweep of ${POINTS} points, 3 classes`;
  const python = runPythonSweep(POINTS);
  const versusPython = `${name}: NumPy over ours, branches known`;
  return [
    atMost(`${name}, equilibria sought, special points located`, whole, 100, milliseconds),
    told(`${name}, branches known`, milliseconds(wasm)),
    told(`${name}, branches known: closures over WebAssembly`, times(closure / wasm)),
    python
      ? atLeast(versusPython, (python.milliseconds * POINTS) / python.points / wasm, 30, times)
      : absent(versusPython, 'no python3 with NumPy on this machine', 'at least 30 x'),
    told(
      `${name}: Hopf points found, and farthest from NumPy's`,
      python ? `${hopf.length}, ${difference(hopf, python.hopf)}` : String(hopf.length),
    ),
  ];
}

interface Run {
  readonly result: SweepResult;
  /** Milliseconds spent on following branches, without the searches for equilibria between. */
  readonly following: number;
}

function run(system: CompiledSystem, largestStep: number): Run {
  const work = sweep(system, Float64Array.from(system.defaults), {
    parameterIndex: system.parameterKeys.indexOf('K'),
    from: FROM,
    to: TO,
    starts: [Float64Array.from(THREE_CLASSES.start)],
    bands: false,
    largestStep,
  });
  let following = 0;
  let isFollowing = false;
  for (;;) {
    const began = performance.now();
    const next = work.next();
    if (isFollowing) following += performance.now() - began;
    if (next.done) return { result: next.value, following };
    isFollowing = next.value.stage === 'following branches';
  }
}

const ROUNDS = 7;
const RUNS_PER_ROUND = 4;

function followingTime(system: CompiledSystem, step: number): number {
  const round = (): number =>
    Math.min(...Array.from({ length: RUNS_PER_ROUND }, () => run(system, step).following));
  for (let k = 0; k < 3; k += 1) round();
  return median(Array.from({ length: ROUNDS }, round));
}

/** Largest step with which the sweep has about so many points. */
function stepForPoints(system: CompiledSystem): number {
  let step = 1e-2;
  for (let k = 0; k < 4; k += 1) step *= run(system, step).result.points / POINTS;
  return step;
}

function difference(ours: SweepResult['specialPoints'], theirs: readonly number[]): string {
  if (ours.length !== theirs.length) return `but ${theirs.length} by NumPy`;
  const sorted = [...theirs].sort((a, b) => a - b);
  const gaps = ours
    .map((point) => point.parameter)
    .sort((a, b) => a - b)
    .map((value, k) => Math.abs(value - (sorted[k] ?? NaN)));
  return `${Math.max(0, ...gaps).toExponential(1)} apart`;
}
