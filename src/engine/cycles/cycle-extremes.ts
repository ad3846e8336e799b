import { createStepper } from '../integrators/choose-method';
import { ExtremesTracker } from '../integrators/extremes';
import type { Stepper } from '../integrators/stepper';
import type { CompiledSystem } from '../system/contract';
import type { CollocationBasis } from './collocation-basis';
import type { CycleSystem } from './cycle-system';
import { intervalsOf, type Orbit } from './orbit';

/** Accuracy and step budget of the short runs that refine an extreme. */
const REFINE = { relativeTolerance: 1e-10, absoluteTolerance: 1e-14, steps: 300 } as const;

/** Quantities of a cycle: each state, then the total of each population of several classes. */
export function cycleQuantities(system: CompiledSystem): {
  readonly names: readonly string[];
  readonly groups: readonly (readonly number[])[];
} {
  const totals = system.populations.filter((one) => one.states.length > 1);
  return {
    names: [...system.stateSymbols, ...totals.map((one) => one.symbol)],
    groups: [...system.stateSymbols.map((_, i) => [i]), ...totals.map((one) => one.states)],
  };
}

interface Range {
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
}

export interface CycleExtremes extends Range {
  /** Mean over one period, by the Gauss rule of the mesh. */
  readonly mean: Float64Array;
}

/**
 * Lowest, highest and mean value of each quantity over one period, in units of the model. Between mesh
 * points the polynomials are less accurate than at them (order m + 1 against 2m), so extremes are taken
 * from short runs that begin at the mesh points before them.
 *
 * @param period of the orbit, whose parameter is set on the system
 */
export function cycleExtremes(
  cycles: CycleSystem,
  basis: CollocationBasis,
  orbit: Orbit,
  period: number,
): CycleExtremes {
  const { n, system } = cycles;
  const { m } = basis;
  const { groups } = cycleQuantities(system);
  const N = intervalsOf(orbit);
  const u = new Float64Array(n);
  const lowest = new Float64Array(groups.length).fill(Infinity);
  const highest = new Float64Array(groups.length).fill(-Infinity);
  const lowestAt = new Int32Array(groups.length);
  const highestAt = new Int32Array(groups.length);
  for (let node = 0; node < N * m; node += 1) {
    cycles.toState(orbit.values.subarray(node * n, (node + 1) * n), u);
    groups.forEach((group, q) => {
      const value = sum(group, u);
      if (value < lowest[q]) [lowest[q], lowestAt[q]] = [value, node];
      if (value > highest[q]) [highest[q], highestAt[q]] = [value, node];
    });
  }
  cycles.setParameter(orbit.parameter);
  const runner = runnerOf(cycles);
  const runs = new Map<number, Range | null>();
  const across = (k: number): Range | null => {
    const known = runs.get(k);
    if (known !== undefined) return known;
    const found = runner.across(orbit, m, k, period);
    runs.set(k, found);
    return found;
  };
  groups.forEach((group, q) => {
    const at = totalsIndex(system, group, q);
    for (const k of intervalsBeside(lowestAt[q], m, N)) {
      const found = across(k);
      if (found) lowest[q] = lowestOf(lowest[q], found.lowest[at], k * m === lowestAt[q]);
    }
    for (const k of intervalsBeside(highestAt[q], m, N)) {
      const found = across(k);
      if (found) highest[q] = -lowestOf(-highest[q], -found.highest[at], k * m === highestAt[q]);
    }
  });
  return { lowest, highest, mean: meanOf(cycles, basis, orbit, groups) };
}

/** The value of a run replaces that of an inner node, which is less accurate; a mesh point is as good. */
function lowestOf(node: number, run: number, isMeshPoint: boolean): number {
  return isMeshPoint ? Math.min(node, run) : run;
}

function intervalsBeside(node: number, m: number, N: number): readonly number[] {
  const k = Math.floor(node / m);
  return node % m === 0 ? [(k + N - 1) % N, k % N] : [k];
}

/** Where the tracker keeps a quantity: states first, then every population's total. */
function totalsIndex(system: CompiledSystem, group: readonly number[], q: number): number {
  if (q < system.dimension) return q;
  return system.dimension + system.populations.findIndex((one) => one.states === group);
}

/** Follows the solution across one interval from its mesh point; kept for a system, since methods are costly to set up. */
class IntervalRunner {
  private readonly stepper: Stepper;
  private readonly tracker: ExtremesTracker;
  private readonly u: Float64Array;

  constructor(private readonly cycles: CycleSystem) {
    this.stepper = createStepper(cycles.system, { ...REFINE, method: 'dormand-prince-853' });
    this.tracker = new ExtremesTracker(cycles.system);
    this.u = new Float64Array(cycles.n);
  }

  /** Extremes across interval k, or null where the run cannot be followed. */
  across(orbit: Orbit, m: number, k: number, period: number): Range | null {
    const { cycles, stepper, tracker, u } = this;
    const { n } = cycles;
    cycles.toState(orbit.values.subarray(k * m * n, (k * m + 1) * n), u);
    const from = period * orbit.mesh[k];
    const end = period * orbit.mesh[k + 1];
    const before = stepper.steps + stepper.rejected;
    stepper.begin(from, u, end - from);
    tracker.reset(stepper);
    while (stepper.time < end) {
      const spent = stepper.steps + stepper.rejected - before;
      if (spent > REFINE.steps || stepper.advance(end) !== 'stepped') return null;
      tracker.note(stepper);
    }
    return { lowest: tracker.lowest.slice(), highest: tracker.highest.slice() };
  }
}

const runners = new WeakMap<CycleSystem, IntervalRunner>();

function runnerOf(cycles: CycleSystem): IntervalRunner {
  let runner = runners.get(cycles);
  if (runner === undefined) {
    runner = new IntervalRunner(cycles);
    runners.set(cycles, runner);
  }
  return runner;
}

function meanOf(
  cycles: CycleSystem,
  basis: CollocationBasis,
  { mesh, values }: Orbit,
  groups: readonly (readonly number[])[],
): Float64Array {
  const { n } = cycles;
  const { m } = basis;
  const w = new Float64Array(n);
  const u = new Float64Array(n);
  const mean = new Float64Array(groups.length);
  for (let k = 0; k < intervalsOf({ mesh }); k += 1)
    for (let g = 0; g < m; g += 1) {
      for (let i = 0; i < n; i += 1) {
        let value = 0;
        for (let j = 0; j <= m; j += 1) value += basis.values[g * (m + 1) + j] * values[(k * m + j) * n + i];
        w[i] = value;
      }
      cycles.toState(w, u);
      const weight = (mesh[k + 1] - mesh[k]) * basis.weights[g];
      groups.forEach((group, q) => (mean[q] += weight * sum(group, u)));
    }
  return mean;
}

function sum(group: readonly number[], u: Float64Array): number {
  let total = 0;
  for (const i of group) total += u[i];
  return total;
}
