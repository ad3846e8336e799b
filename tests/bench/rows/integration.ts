import type { MethodName } from '../../../src/engine/integrators/contract';
import { integrateTo } from '../../../src/engine/integrators/driver';
import { absent, atLeast, atMost, median, time, times, type Row } from '../measure';
import { compileBenchModel, EIGHT_CLASSES, THREE_CLASSES, type BenchModel } from '../models';
import { runLsoda, type NativeYardstick } from '../yardsticks/run';

const END = 1000;
/** Error at the end, relative to the largest state, at which methods are compared. */
const ERROR = 1e-7;
const TOLERANCES = [1e-6, 1e-7, 1e-8, 1e-9, 1e-10, 1e-11];
/** LSODA is less accurate than its tolerance. */
const LSODA_TOLERANCES = [1e-8, 1e-9, 1e-10, 1e-11, 1e-12];
const ROUNDS = 5;

/** One method at one tolerance: how long it took and how far off it was. */
interface Work {
  readonly error: number;
  readonly milliseconds: number;
}

/** Integration to t = 1000 with the same error at the end, each method at the tolerance that it needs. */
export function integrationRows(native: NativeYardstick | null): Row[] {
  return [THREE_CLASSES, EIGHT_CLASSES].flatMap((model) => rowsOf(model, native));
}

function rowsOf(model: BenchModel, native: NativeYardstick | null): Row[] {
  const about = `to t = 1000, ${model.classes} classes, equal error`;
  const reference = finalState(model, 'dormand-prince-853', 1e-13);
  const ratios = { auto: [] as number[], pair: [] as number[], odex: [] as number[] };
  for (let round = 0; round < ROUNDS; round += 1) {
    const pair = atError(TOLERANCES.map((tol) => work(model, 'dormand-prince-54', tol, reference)));
    const auto = atError(TOLERANCES.slice(1).map((tol) => work(model, 'auto', tol, reference)));
    const odex = atError(TOLERANCES.map((tol) => work(model, 'odex', tol, reference)));
    ratios.odex.push(odex / auto);
    if (!native) continue;
    const yardstick = atError(
      TOLERANCES.map((tolerance) => {
        const run = native.run(model.classes, tolerance, END);
        return { milliseconds: run.milliseconds, error: largestError(run.state, reference) };
      }),
    );
    ratios.pair.push(pair / yardstick);
    ratios.auto.push(auto / yardstick);
  }
  const noCompiler = 'no C compiler on this machine';
  return [
    native
      ? atMost(`workhorse method ${about}: time over C Dormand-Prince 5(4)`, median(ratios.auto), 1.5, times)
      : absent(`workhorse method ${about}: time over C Dormand-Prince 5(4)`, noCompiler, 'at most 1.5 x'),
    native
      ? atMost(`Dormand-Prince 5(4) ${about}: time over the same in C`, median(ratios.pair), 1.5, times)
      : absent(`Dormand-Prince 5(4) ${about}: time over the same in C`, noCompiler, 'at most 1.5 x'),
    atLeast(`odex ${about}: time over the workhorse method`, median(ratios.odex), 5, times),
    ...(model.classes === 3 ? [lsodaRow(model, reference, about)] : []),
  ];
}

/** LSODA from Python, with Python formulas: what most people would use. */
function lsodaRow(model: BenchModel, reference: Float64Array, about: string): Row {
  const name = `SciPy LSODA ${about}: time over the workhorse method`;
  const runs = runLsoda(END, LSODA_TOLERANCES);
  if (!runs) return absent(name, 'no python3 with SciPy on this machine', 'at least 50 x');
  const theirs = atError(
    runs.map(({ milliseconds, state }) => ({ milliseconds, error: largestError(state, reference) })),
  );
  const ours = atError(TOLERANCES.slice(1).map((tol) => work(model, 'auto', tol, reference)));
  return atLeast(name, theirs / ours, 50, times);
}

function finalState(model: BenchModel, method: MethodName, tolerance: number): Float64Array {
  const run = integrateTo(compileBenchModel(model), Float64Array.from(model.start), Float64Array.of(0, END), {
    method,
    relativeTolerance: tolerance,
    absoluteTolerance: Math.min(1e-12, tolerance / 100),
    maximumSteps: 5_000_000,
  });
  if (run.status !== 'complete') throw new Error(`${method}: ${run.message}`);
  return run.states.slice(-model.classes);
}

function work(model: BenchModel, method: MethodName, tolerance: number, reference: Float64Array): Work {
  const system = compileBenchModel(model);
  const start = Float64Array.from(model.start);
  const ends = Float64Array.of(0, END);
  let state: Float64Array = start;
  const timing = time(
    () => {
      state = integrateTo(system, start, ends, { method, relativeTolerance: tolerance }).states;
    },
    1,
    40,
  );
  return { milliseconds: timing.fastest, error: largestError(state.slice(-model.classes), reference) };
}

function largestError(state: ArrayLike<number>, reference: Float64Array): number {
  let size = 0;
  let error = 0;
  reference.forEach((value, i) => {
    size = Math.max(size, Math.abs(value));
    error = Math.max(error, Math.abs((state[i] ?? NaN) - value));
  });
  return error / size;
}

/** Time at the error compared, by a straight line through log error and log time. */
function atError(works: readonly Work[]): number {
  const x = works.map((one) => Math.log(one.error));
  const y = works.map((one) => Math.log(one.milliseconds));
  const meanX = x.reduce((sum, value) => sum + value, 0) / x.length;
  const meanY = y.reduce((sum, value) => sum + value, 0) / y.length;
  let covariance = 0;
  let variance = 0;
  x.forEach((value, k) => {
    covariance += (value - meanX) * ((y[k] ?? NaN) - meanY);
    variance += (value - meanX) ** 2;
  });
  return Math.exp(meanY + (covariance / variance) * (Math.log(ERROR) - meanX));
}
