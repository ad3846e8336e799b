import { luFactor, luSolve } from '../linalg/lu';
import type { CycleSystem } from './cycle-system';
import { nodeTimes, type Orbit } from './orbit';

export const REST_DEFAULTS = {
  /** Speed below this share of the greatest counts as resting. */
  slow: 0.01,
  /** Share of the period at rest from which on an orbit is taken for nearly homoclinic. */
  share: 0.85,
  /** Distance of the equilibrium from the cycle, as a share of its range. */
  near: 0.05,
  newtonSteps: 20,
} as const;

export interface RestOnCycle {
  /** Share of the period at rest. */
  readonly share: number;
  /** Equilibria by which the cycle passes, one a slow stretch, none twice. */
  readonly equilibria: readonly Float64Array[];
}

/** How long a cycle dwells near equilibria, and near which: what tells an approach to a homoclinic orbit. */
export function restOnCycle(cycles: CycleSystem, m: number, orbit: Orbit, period: number): RestOnCycle {
  const { n, system } = cycles;
  const times = nodeTimes(orbit.mesh, m);
  const last = times.length - 1;
  cycles.setParameter(orbit.parameter);
  const states = new Float64Array(times.length * n);
  const f = new Float64Array(n);
  const speeds = new Float64Array(times.length);
  const range = new Float64Array(n);
  const lowest = new Float64Array(n).fill(Infinity);
  for (let k = 0; k <= last; k += 1) {
    const u = states.subarray(k * n, (k + 1) * n);
    cycles.toState(orbit.values.subarray(k * n, (k + 1) * n), u);
    for (let i = 0; i < n; i += 1) {
      range[i] = Math.max(range[i], u[i] - lowest[i]);
      lowest[i] = Math.min(lowest[i], u[i]);
    }
  }
  for (let i = 0; i < n; i += 1) {
    let highest = -Infinity;
    for (let k = 0; k <= last; k += 1) highest = Math.max(highest, states[k * n + i]);
    range[i] = Math.max(highest - lowest[i], Number.MIN_VALUE);
  }
  for (let k = 0; k <= last; k += 1) {
    system.rhs(times[k] * period, states.subarray(k * n, (k + 1) * n), f);
    for (let i = 0; i < n; i += 1) speeds[k] = Math.max(speeds[k], Math.abs(f[i]) / range[i]);
  }
  const limit = REST_DEFAULTS.slow * speeds.reduce((most, value) => Math.max(most, value), 0);
  let share = 0;
  for (let k = 0; k < last; k += 1)
    if (speeds[k] < limit && speeds[k + 1] < limit) share += times[k + 1] - times[k];
  const equilibria: Float64Array[] = [];
  if (share < REST_DEFAULTS.share / 2) return { share, equilibria };
  for (let k = 0; k < last; k += 1) {
    const before = speeds[k === 0 ? last - 1 : k - 1];
    if (!(speeds[k] < limit && speeds[k] <= before && speeds[k] <= speeds[k + 1])) continue;
    const found = equilibriumNear(cycles, states.subarray(k * n, (k + 1) * n), range);
    if (found && !equilibria.some((one) => distance(one, found, range) < REST_DEFAULTS.near))
      equilibria.push(found);
  }
  return { share, equilibria };
}

function distance(a: Float64Array, b: Float64Array, range: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < a.length; i += 1) largest = Math.max(largest, Math.abs(a[i] - b[i]) / range[i]);
  return largest;
}

/** Newton's method from a state of the cycle; null where it leads elsewhere. */
function equilibriumNear(
  { n, system }: CycleSystem,
  start: Float64Array,
  range: Float64Array,
): Float64Array | null {
  const u = start.slice();
  const f = new Float64Array(n);
  const J = new Float64Array(n * n);
  const pivots = new Int32Array(n);
  for (let k = 0; k < REST_DEFAULTS.newtonSteps; k += 1) {
    system.rhs(0, u, f);
    system.jacobian(0, u, J);
    if (luFactor(J, n, pivots) === 0) return null;
    luSolve(J, n, pivots, f);
    let size = 0;
    for (let i = 0; i < n; i += 1) {
      u[i] -= f[i];
      size = Math.max(size, Math.abs(f[i]) / range[i]);
    }
    if (!Number.isFinite(size)) return null;
    if (size < 1e-10) return distance(u, start, range) < REST_DEFAULTS.near ? u : null;
  }
  return null;
}
