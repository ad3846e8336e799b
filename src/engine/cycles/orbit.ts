import { lagrangeSlopes, lagrangeValues, type CollocationBasis } from './collocation-basis';

/**
 * A periodic solution as a continuous piecewise polynomial of degree m over scaled time in [0, 1]:
 * N mesh intervals, N*m + 1 nodes, values[node*n + i] in the coordinates of its `CycleSystem`, the last
 * node equal to the first. `logPeriod` is ln T (a forced model's T is given, and this follows it).
 */
export interface Orbit {
  readonly mesh: Float64Array;
  readonly values: Float64Array;
  readonly logPeriod: number;
  /** Value of the swept parameter. */
  readonly parameter: number;
}

export const intervalsOf = (orbit: { readonly mesh: Float64Array }): number => orbit.mesh.length - 1;

export function uniformMesh(intervals: number): Float64Array {
  return Float64Array.from({ length: intervals + 1 }, (_, k) => k / intervals);
}

/** Scaled times of all N*m + 1 nodes of a mesh. */
export function nodeTimes(mesh: Float64Array, m: number): Float64Array {
  const N = mesh.length - 1;
  const times = new Float64Array(N * m + 1);
  for (let k = 0; k < N; k += 1)
    for (let j = 0; j < m; j += 1) times[k * m + j] = mesh[k] + ((mesh[k + 1] - mesh[k]) * j) / m;
  times[N * m] = 1;
  return times;
}

/** Makes the last node equal to the first, in place: steps of the corrector keep it so. */
export function closeOrbit(values: Float64Array, n: number): void {
  values.copyWithin(values.length - n, 0, n);
}

/** Interval of the mesh that holds scaled time tau in [0, 1]. */
export function intervalAt(mesh: Float64Array, tau: number): number {
  let low = 0;
  let high = mesh.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (mesh[middle] <= tau) low = middle;
    else high = middle;
  }
  return low;
}

/** Reads a piecewise polynomial (an orbit, a tangent) at any scaled time. Owns its buffers. */
export class OrbitReader {
  private readonly weights: Float64Array;

  constructor(
    private readonly m: number,
    private readonly n: number,
  ) {
    this.weights = new Float64Array(m + 1);
  }

  /** u(tau) into `out` (n). */
  at(mesh: Float64Array, values: Float64Array, tau: number, out: Float64Array): void {
    const k = intervalAt(mesh, tau);
    lagrangeValues(this.m, (tau - mesh[k]) / (mesh[k + 1] - mesh[k]), this.weights);
    this.combine(values, k, 1, out);
  }

  /** du/dtau into `out` (n). */
  slopeAt(mesh: Float64Array, values: Float64Array, tau: number, out: Float64Array): void {
    const k = intervalAt(mesh, tau);
    const h = mesh[k + 1] - mesh[k];
    lagrangeSlopes(this.m, (tau - mesh[k]) / h, this.weights);
    this.combine(values, k, 1 / h, out);
  }

  private combine(values: Float64Array, k: number, factor: number, out: Float64Array): void {
    const { m, n, weights } = this;
    for (let i = 0; i < n; i += 1) {
      let sum = 0;
      for (let j = 0; j <= m; j += 1) sum += weights[j] * values[(k * m + j) * n + i];
      out[i] = sum * factor;
    }
  }
}

/** The same piecewise polynomial on another mesh, by interpolation at the new nodes. */
export function onMesh(
  basis: CollocationBasis,
  n: number,
  from: Float64Array,
  values: Float64Array,
  to: Float64Array,
): Float64Array {
  const reader = new OrbitReader(basis.m, n);
  const times = nodeTimes(to, basis.m);
  const out = new Float64Array(times.length * n);
  for (let k = 0; k < times.length; k += 1)
    reader.at(from, values, times[k], out.subarray(k * n, (k + 1) * n));
  return out;
}
