import { longRunExtremes } from '../integrators/long-run';
import type { CompiledSystem } from '../system/contract';
import type { Band, Branch, SpecialPoint } from './contract';
import { growsBesidesPair } from './special-points';

export const BAND_DEFAULTS = {
  /** Values of the parameter along the band. */
  values: 28,
  transientPeriods: 25,
  windowPeriods: 3,
  longestPeriods: 90,
  relativeTolerance: 1e-7,
  maximumSteps: 40_000,
  /** First push away from the equilibrium, as a share of the state. */
  push: 0.02,
} as const;

/** Stretch of a branch beyond a Hopf point on which the equilibrium repels. */
export interface RepellingStretch {
  readonly hopf: SpecialPoint;
  readonly parameters: readonly number[];
  /** Equilibrium at the first value. */
  readonly state: Float64Array;
}

/** Values beyond a Hopf point, denser near it, as far as the equilibrium goes on repelling; null where it does not. */
export function repellingStretch(branch: Branch, hopf: SpecialPoint): RepellingStretch | null {
  const last = branch.parameters.length - 1;
  const ahead = walk(branch, Math.min(hopf.index + 1, last), 1);
  const behind = walk(branch, Math.max(hopf.index, 0), -1);
  const indices = ahead.length >= behind.length ? ahead : behind;
  if (indices.length < 2) return null;
  const end = branch.parameters[indices[indices.length - 1]];
  const span = end - hopf.parameter;
  const parameters = Array.from({ length: BAND_DEFAULTS.values }, (_, k) => {
    const share = (k + 1) / BAND_DEFAULTS.values;
    return hopf.parameter + span * share ** 1.7;
  });
  const n = branch.dimension;
  const first = indices[0];
  return { hopf, parameters, state: branch.states.slice(first * n, (first + 1) * n) };
}

/** Indices of points that repel, from one on in a direction, while the parameter runs one way. */
function walk(branch: Branch, from: number, direction: 1 | -1): number[] {
  const indices: number[] = [];
  let way = 0;
  for (let k = from; k >= 0 && k < branch.parameters.length && branch.attracts[k] === 0; k += direction) {
    const before = indices.at(-1);
    if (before !== undefined) {
      const step = Math.sign(branch.parameters[k] - branch.parameters[before]);
      if (way !== 0 && step !== 0 && step !== way) break;
      way = step || way;
    }
    indices.push(k);
  }
  return indices;
}

/**
 * Long-run lowest and highest values along a stretch, each run starting where the last one ended. What has
 * not settled to a repeating range is marked so. These are runs, not continued cycles: a repelling cycle
 * is never seen, and of several attractors only the one reached.
 * A generator that yields the share done.
 */
export function* integrateBand(
  system: CompiledSystem,
  p: Float64Array,
  parameterIndex: number,
  stretch: RepellingStretch,
): Generator<number, Band> {
  const n = system.dimension;
  const quantities = [...system.stateSymbols, ...system.populations.map((one) => one.symbol)];
  const width = quantities.length;
  const count = stretch.parameters.length;
  const lowest = new Float64Array(count * width).fill(NaN);
  const highest = new Float64Array(count * width).fill(NaN);
  const settled = new Uint8Array(count);
  const parameters = Float64Array.from(p);
  const period = (2 * Math.PI) / (stretch.hopf.hopf?.omega ?? 1);
  let state = stretch.state.map((value, i) => value * (1 + (i % 2 === 0 ? 1 : -1) * BAND_DEFAULTS.push));
  for (let k = 0; k < count; k += 1) {
    parameters[parameterIndex] = stretch.parameters[k];
    system.setParameters(parameters);
    const run = longRunExtremes(system, state, {
      transient: BAND_DEFAULTS.transientPeriods * period,
      window: BAND_DEFAULTS.windowPeriods * period,
      maximumTime: BAND_DEFAULTS.longestPeriods * period,
      relativeTolerance: BAND_DEFAULTS.relativeTolerance,
      absoluteTolerance: 1e-12,
      maximumSteps: BAND_DEFAULTS.maximumSteps,
    });
    let step = run.next();
    while (!step.done) {
      yield k / count;
      // Another computation may have used the system in between.
      system.setParameters(parameters);
      step = run.next();
    }
    const outcome = step.value;
    if (outcome.status === 'settled' || outcome.status === 'not-settled') {
      lowest.set(outcome.lowest.subarray(0, width), k * width);
      highest.set(outcome.highest.subarray(0, width), k * width);
      settled[k] = outcome.settled ? 1 : 0;
    }
    if (outcome.state.every(Number.isFinite) && outcome.state.length === n) state = outcome.state.slice();
    yield (k + 1) / count;
  }
  return { parameters: Float64Array.from(stretch.parameters), lowest, highest, quantities, settled };
}

/**
 * Bands past the Hopf points at which nothing else grows: where another direction repels as well, the
 * long run near the equilibrium is not the cycle's. Each is added to `bands` when it is done. A generator
 * that yields the share done.
 */
export function* integrateBands(
  system: CompiledSystem,
  p: Float64Array,
  parameterIndex: number,
  points: readonly SpecialPoint[],
  branches: readonly Branch[],
  bands: Band[],
): Generator<number, void> {
  const hopfs = points.filter(
    ({ feasible, hopf, eigenvalues }) => feasible && hopf && !growsBesidesPair(eigenvalues, hopf.omega),
  );
  for (const [k, hopf] of hopfs.entries()) {
    const stretch = repellingStretch(branches[hopf.branch], hopf);
    if (stretch === null) continue;
    const run = integrateBand(system, p, parameterIndex, stretch);
    let step = run.next();
    while (!step.done) {
      yield (k + step.value) / hopfs.length;
      step = run.next();
    }
    bands.push(step.value);
  }
}
