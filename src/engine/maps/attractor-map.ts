import type { Progress } from '../continuation/contract';
import { lyapunovSpectrum } from '../lyapunov/lyapunov-spectrum';
import type { CompiledSystem } from '../system/contract';
import { ClassList } from './attractor-class';
import type { MapAxis, MapResult } from './contract';
import { fillSheet } from './fill-sheet';
import { ATTRACTOR_DEFAULTS, findAttractor, type Attractor, type AttractorRequest } from './find-attractor';
import { axisValues, MapSheet } from './map-sheet';

export interface AttractorMapRequest extends AttractorRequest {
  readonly quantity: 'attractor' | 'lowest' | 'exponent';
  readonly x: MapAxis;
  readonly y: MapAxis;
  /** Indices of the two parameters in p. */
  readonly columns: readonly [number, number];
  /** State from which every cell begins. */
  readonly starts: Float64Array;
  /** Milliseconds; the engine has no clock of its own. */
  readonly clock?: () => number;
}

/**
 * Maps over two parameters of what the solution from the start values settles to: its kind, the lowest density
 * of any population on it (0 where one dies out), or its largest Lyapunov exponent. Every cell begins from the same
 * state, so that a cell does not depend on its neighbours. Coarse cells come first.
 *
 * @param p parameters in the order of the system, set on it and written to
 */
export function* attractorMap(
  system: CompiledSystem,
  p: Float64Array,
  request: AttractorMapRequest,
): Generator<Progress<MapResult>, MapResult> {
  const sheet = new MapSheet(request.quantity, request.x, request.y, request.clock);
  const kinds = new ClassList();
  const [xs, ys] = [axisValues(request.x), axisValues(request.y)];
  let undecided = 0;
  function* solve(ix: number, iy: number): Generator<void, number> {
    p[request.columns[0]] = xs[ix];
    p[request.columns[1]] = ys[iy];
    system.setParameters(p);
    const found = yield* findAttractor(system, request.starts, request);
    if (request.quantity === 'exponent') return yield* largestExponent(system, found, request);
    if (found.class.kind === 'undecided') undecided += 1;
    return request.quantity === 'attractor' ? kinds.indexOf(found.class) : lowestDensity(system, found);
  }
  yield* fillSheet(sheet, solve, STAGES[request.quantity], () => kinds.classes);
  const share = Number(((100 * undecided) / sheet.cells).toPrecision(2));
  const left =
    undecided === 0 ? '' : ` ${share} % of the cells are undecided: a longer time observed may decide them.`;
  return sheet.result(
    'complete',
    `Every cell begins from the start values: ${request.transient} time units left out, up to ${request.observed} observed.${left}`,
    kinds.classes,
  );
}

const STAGES = {
  attractor: 'Mapping what solutions settle to',
  lowest: 'Mapping lowest densities',
  exponent: 'Mapping the largest exponent',
} as const;

/** Lowest total of any population that was there at the start; 0 where one dies out, NaN where nothing is bounded. */
function lowestDensity(system: CompiledSystem, found: Attractor): number {
  if (found.class.kind === 'unbounded') return Number.NaN;
  if (found.class.extinct.length > 0) return 0;
  const totals = system.populations.filter(({ states }) => states.length > 1);
  let lowest = Infinity;
  for (const population of system.populations) {
    const at =
      population.states.length === 1
        ? population.states[0]
        : system.dimension + totals.findIndex((one) => one.symbol === population.symbol);
    if (found.highest[at] > 0) lowest = Math.min(lowest, found.lowest[at]);
  }
  return lowest;
}

/** What the attractor is known to have, else the mean growth over the time observed; NaN where it cannot be followed. */
function* largestExponent(
  system: CompiledSystem,
  found: Attractor,
  request: AttractorMapRequest,
): Generator<void, number> {
  if (found.exponent !== null) return found.exponent;
  if (found.class.kind === 'unbounded') return Number.NaN;
  const run = lyapunovSpectrum(system, found.state, {
    startTime: found.time,
    transient: 0.1 * request.observed,
    horizon: request.observed,
    count: 1,
    maximumSteps: request.maximumSteps ?? ATTRACTOR_DEFAULTS.maximumSteps,
  });
  let step = run.next();
  while (!step.done) {
    yield;
    step = run.next();
  }
  return step.value.status === 'complete' ? step.value.exponents[0] : Number.NaN;
}
