import type { CollocationBasis } from './collocation-basis';
import type { Orbit } from './orbit';

/** A direction in the space of orbits: nodes, swept parameter in units of its scale, logarithm of the period. */
export interface Direction {
  readonly values: Float64Array;
  parameter: number;
  logPeriod: number;
}

/** Row that closes the system besides the phase: inner product with a direction. */
export interface Constraint {
  readonly along: Direction;
  readonly target: number;
  /** The orbit that distances are taken from. */
  readonly from: Orbit;
}

/**
 * Border rows of the collocation system, the constraint first and then the phase (E = 2; a forced model has the
 * constraint alone, E = 1), over all nodes and then condensed to the mesh points. Owns its buffers.
 */
export class CollocationBorders {
  /** B_k as meshRows[(e*(N+1) + k)*n + i], coefficients of the extra unknowns E*E, right-hand sides E. */
  readonly meshRows: Float64Array;
  readonly corner: Float64Array;
  readonly right: Float64Array;
  private readonly nodeRows: Float64Array;

  constructor(
    private readonly basis: CollocationBasis,
    private readonly N: number,
    private readonly n: number,
    private readonly extras: number,
    private readonly parameterScale: number,
  ) {
    const nodes = N * basis.m + 1;
    this.meshRows = new Float64Array(extras * (N + 1) * n);
    this.corner = new Float64Array(extras * extras);
    this.right = new Float64Array(extras);
    this.nodeRows = new Float64Array(extras * nodes * n);
  }

  /** Rows of the borders over all nodes: the constraint first, then the phase. */
  set(orbit: Orbit, reference: Orbit, { along, target, from }: Constraint): void {
    const { N, n, extras: E, basis, nodeRows, corner, right } = this;
    const { m } = basis;
    const length = (N * m + 1) * n;
    nodeRows.fill(0);
    corner.fill(0);
    let phase = 0;
    let distance = 0;
    for (let k = 0; k < N; k += 1) {
      const h = orbit.mesh[k + 1] - orbit.mesh[k];
      for (let q = 0; q < m; q += 1)
        for (let i = 0; i < n; i += 1) {
          const direction = h * basis.weights[q] * valueAtGauss(basis, n, along.values, k, q, i);
          let slope = 0;
          if (E === 2)
            for (let j = 0; j <= m; j += 1)
              slope += basis.slopes[q * (m + 1) + j] * reference.values[(k * m + j) * n + i];
          slope *= basis.weights[q];
          for (let j = 0; j <= m; j += 1) {
            const at = (k * m + j) * n + i;
            const value = basis.values[q * (m + 1) + j];
            nodeRows[at] += direction * value;
            distance += direction * value * (orbit.values[at] - from.values[at]);
            if (E === 2) {
              nodeRows[length + at] += slope * value;
              phase += slope * value * (orbit.values[at] - reference.values[at]);
            }
          }
        }
    }
    corner[0] = along.parameter;
    distance += (along.parameter * (orbit.parameter - from.parameter)) / this.parameterScale;
    if (E === 2) {
      corner[1] = along.logPeriod;
      distance += along.logPeriod * (orbit.logPeriod - from.logPeriod);
      right[1] = -phase;
    }
    right[0] = target - distance;
  }

  /**
   * Rows over all nodes become rows over mesh points.
   *
   * @param inner interior nodes as affine functions of the mesh points, as `Collocation` keeps them
   */
  condense(inner: Float64Array): void {
    const { N, n, extras: E, nodeRows, meshRows, corner, right } = this;
    const { m } = this.basis;
    const length = (N * m + 1) * n;
    const width = n + E + 1;
    for (let e = 0; e < E; e += 1) {
      for (let k = 0; k <= N; k += 1)
        for (let i = 0; i < n; i += 1)
          meshRows[(e * (N + 1) + k) * n + i] = nodeRows[e * length + k * m * n + i];
      for (let k = 0; k < N; k += 1)
        for (let r = 0; r < n * (m - 1); r += 1) {
          const coefficient = nodeRows[e * length + (k * m + 1) * n + r];
          const row = (k * n * m + r) * width;
          for (let i = 0; i < n; i += 1) meshRows[(e * (N + 1) + k) * n + i] += coefficient * inner[row + i];
          for (let f = 0; f < E; f += 1) corner[e * E + f] += coefficient * inner[row + n + f];
          right[e] -= coefficient * inner[row + n + E];
        }
    }
  }
}

/** Component i of a piecewise polynomial at Gauss point q of interval k. */
export function valueAtGauss(
  { m, values: L }: CollocationBasis,
  n: number,
  values: Float64Array,
  k: number,
  q: number,
  i: number,
): number {
  let sum = 0;
  for (let j = 0; j <= m; j += 1) sum += L[q * (m + 1) + j] * values[(k * m + j) * n + i];
  return sum;
}
