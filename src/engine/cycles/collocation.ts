import type { CollocationBasis } from './collocation-basis';
import { CollocationBorders, valueAtGauss, type Constraint, type Direction } from './collocation-borders';
import { CondensedChain } from './condensed-chain';
import type { CycleSystem } from './cycle-system';
import { solveAugmented } from './interval-elimination';
import { intervalsOf, type Orbit } from './orbit';

/**
 * Orthogonal collocation at Gauss points for dw/dtau = T g(T tau, w, lambda), w(0) = w(1), on a fixed mesh:
 *
 *     sum_j L_j'(c_i) x_kj / h_k - T g(sum_j L_j(c_i) x_kj) = 0   for every interval k and Gauss point c_i,
 *     integral <w, w_ref'> dtau = 0  (phase; not for a forced model),   <direction, (w, lambda, ln T) - from> = target
 *
 * (Doedel, Keller & Kernevez 1991, from memory). `linearise` condenses the Newton system to the mesh
 * points; one instance serves one mesh size, owns its buffers and is not re-entrant.
 */
export class Collocation {
  readonly n: number;
  readonly m: number;
  readonly extras: number;
  /** [G_k | H_k | rho_k] of each interval: what the last linearisation says of the flow across it. */
  readonly transfer: Float64Array;
  private readonly chain: CondensedChain;
  private readonly borders: CollocationBorders;
  /** x_k1 .. x_km as affine functions of x_k0 and the extras: n*m rows of n + E + 1, for each interval. */
  private readonly inner: Float64Array;
  private readonly augmented: Float64Array;
  private readonly w: Float64Array;
  private readonly g: Float64Array;
  private readonly gp: Float64Array;
  private readonly J: Float64Array;
  private readonly X: Float64Array;
  private readonly d: Float64Array;
  private residual = 0;
  /** Integral of the divergence over one period, at the last linearisation: ln of the product of all multipliers. */
  divergence = 0;

  constructor(
    readonly cycles: CycleSystem,
    readonly basis: CollocationBasis,
    readonly N: number,
  ) {
    const n = (this.n = cycles.n);
    const m = (this.m = basis.m);
    const E = (this.extras = cycles.forced ? 1 : 2);
    this.chain = new CondensedChain(N, n, E);
    this.borders = new CollocationBorders(basis, N, n, E, cycles.parameterScale);
    this.transfer = new Float64Array(N * n * (n + E + 1));
    this.inner = new Float64Array(N * n * m * (n + E + 1));
    this.augmented = new Float64Array(n * m * (n * m + n + E + 1));
    this.w = new Float64Array(n);
    this.g = new Float64Array(n);
    this.gp = new Float64Array(n);
    this.J = new Float64Array(n * n);
    this.X = new Float64Array((N + 1) * n);
    this.d = new Float64Array(E);
  }

  /** Determinant of the last linearisation, as sign and logarithm up to a factor of the mesh. */
  get determinant(): { readonly sign: number; readonly log: number } {
    return { sign: this.chain.determinantSign, log: this.chain.determinantLog };
  }

  newDirection(): Direction {
    return { values: new Float64Array((this.N * this.m + 1) * this.n), parameter: 0, logPeriod: 0 };
  }

  /** Period of an orbit at its parameter, which is set on the system. */
  periodOf(orbit: Orbit): number {
    this.cycles.setParameter(orbit.parameter);
    return this.cycles.forced ? this.cycles.forcedPeriod() : Math.exp(orbit.logPeriod);
  }

  /**
   * Linearises at an orbit: interval maps, borders, factors.
   *
   * @param reference orbit of the phase condition, on the same mesh
   * @returns largest residual of the collocation equations; NaN where something is not finite or singular
   */
  linearise(orbit: Orbit, reference: Orbit, constraint: Constraint): number {
    if (intervalsOf(orbit) !== this.N) throw new Error('The orbit has another number of intervals.');
    if (!this.condenseIntervals(orbit)) return NaN;
    const { borders } = this;
    borders.set(orbit, reference, constraint);
    borders.condense(this.inner);
    if (!this.chain.factor(this.transfer, borders.meshRows, borders.corner, borders.right)) return NaN;
    return this.residual;
  }

  /** Newton step of the last linearisation into `out`; false where it is not finite. */
  newtonStep(out: Direction): boolean {
    return this.chain.solve(this.X, this.d) && this.spread(out, 1);
  }

  /** Unit tangent of the branch at the last linearisation: the step that moves along the constraint alone. */
  tangent(mesh: Float64Array, out: Direction): boolean {
    if (!this.chain.solveHomogeneous(0, this.X, this.d) || !this.spread(out, 0)) return false;
    return this.normalise(mesh, out);
  }

  /** Unit direction of a second branch at a branch point: the null vector across the constraint. */
  secondDirection(mesh: Float64Array, out: Direction): boolean {
    if (!this.chain.solveNull(this.X, this.d) || !this.spread(out, 0)) return false;
    return this.normalise(mesh, out);
  }

  normalise(mesh: Float64Array, out: Direction): boolean {
    const length = Math.sqrt(this.inner2(mesh, out, out));
    if (!(length > 0) || !Number.isFinite(length)) return false;
    for (let k = 0; k < out.values.length; k += 1) out.values[k] /= length;
    out.parameter /= length;
    out.logPeriod /= length;
    return true;
  }

  /** Values along a whole period that begin at `start` (n) and follow the linearised flow, into `out` nodes. */
  carry(start: Float64Array, out: Float64Array): void {
    const { N, n, m, inner, extras: E } = this;
    const width = n + E + 1;
    out.set(start.subarray(0, n), 0);
    for (let k = 0; k < N; k += 1)
      for (let r = 0; r < n * m; r += 1) {
        let sum = 0;
        for (let i = 0; i < n; i += 1) sum += inner[(k * n * m + r) * width + i] * out[k * m * n + i];
        out[(k * m + 1) * n + r] = sum;
      }
  }

  /** Inner product of two directions: integral over the period, plus parameter and period. */
  inner2(mesh: Float64Array, a: Direction, b: Direction): number {
    const { N, n, m, basis } = this;
    let sum = 0;
    for (let k = 0; k < N; k += 1) {
      const h = mesh[k + 1] - mesh[k];
      for (let g = 0; g < m; g += 1) {
        let dot = 0;
        for (let i = 0; i < n; i += 1)
          dot += valueAtGauss(basis, n, a.values, k, g, i) * valueAtGauss(basis, n, b.values, k, g, i);
        sum += h * basis.weights[g] * dot;
      }
    }
    return sum + a.parameter * b.parameter + a.logPeriod * b.logPeriod;
  }

  private condenseIntervals(orbit: Orbit): boolean {
    const { N, n, m, extras: E, augmented, inner, transfer } = this;
    const rows = n * m;
    const columns = n + E + 1;
    const T = this.periodOf(orbit);
    if (!(T > 0) || !Number.isFinite(T)) return false;
    this.residual = 0;
    this.divergence = 0;
    for (let k = 0; k < N; k += 1) {
      if (!this.fillInterval(orbit, T, k) || !solveAugmented(augmented, rows, columns)) return false;
      for (let r = 0; r < rows; r += 1)
        for (let c = 0; c < columns; c += 1)
          inner[(k * rows + r) * columns + c] = augmented[r * (rows + columns) + rows + c];
      const last = (k * rows + n * (m - 1)) * columns;
      transfer.set(inner.subarray(last, last + n * columns), k * n * columns);
    }
    return true;
  }

  private fillInterval(orbit: Orbit, T: number, k: number): boolean {
    const { n, m, extras: E, basis, cycles, augmented, w, g, gp, J } = this;
    const { mesh, values } = orbit;
    const h = mesh[k + 1] - mesh[k];
    const rows = n * m;
    const width = rows + n + E + 1;
    const scale = cycles.parameterScale;
    for (let q = 0; q < m; q += 1) {
      const tau = mesh[k] + h * basis.points[q];
      for (let i = 0; i < n; i += 1) w[i] = valueAtGauss(basis, n, values, k, q, i);
      const t = cycles.forced ? T * tau : 0;
      cycles.rhs(t, w, g);
      cycles.jacobian(t, w, J);
      if (cycles.forced) cycles.forcedParameterDerivative(tau, T, w, orbit.parameter, gp);
      else {
        cycles.parameterDerivative(t, w, gp);
        for (let i = 0; i < n; i += 1) gp[i] *= T;
      }
      for (let i = 0; i < n; i += 1) {
        const row = (q * n + i) * width;
        this.divergence += h * basis.weights[q] * T * J[i * n + i];
        let slope = 0;
        for (let j = 0; j <= m; j += 1) {
          const derivative = basis.slopes[q * (m + 1) + j] / h;
          const value = -T * basis.values[q * (m + 1) + j];
          slope += derivative * values[(k * m + j) * n + i];
          // The first node stands on the right-hand side.
          const at = j === 0 ? row + rows : row + (j - 1) * n;
          const sign = j === 0 ? -1 : 1;
          for (let l = 0; l < n; l += 1)
            augmented[at + l] = sign * ((l === i ? derivative : 0) + value * J[i * n + l]);
        }
        const residual = slope - T * g[i];
        augmented[row + rows + n] = gp[i] * scale;
        if (E === 2) augmented[row + rows + n + 1] = T * g[i];
        augmented[row + rows + n + E] = -residual;
        if (!Number.isFinite(residual) || !Number.isFinite(gp[i])) return false;
        this.residual = Math.max(this.residual, Math.abs(residual));
      }
    }
    return true;
  }

  /** From mesh points to all nodes. `particular`: 1 with the residuals of the intervals, 0 without. */
  private spread(out: Direction, particular: 0 | 1): boolean {
    const { N, n, m, extras: E, inner, X, d } = this;
    const width = n + E + 1;
    let finite = true;
    for (let k = 0; k < N; k += 1) {
      for (let i = 0; i < n; i += 1) out.values[k * m * n + i] = X[k * n + i];
      for (let r = 0; r < n * (m - 1); r += 1) {
        const row = (k * n * m + r) * width;
        let sum = particular * inner[row + n + E];
        for (let i = 0; i < n; i += 1) sum += inner[row + i] * X[k * n + i];
        for (let f = 0; f < E; f += 1) sum += inner[row + n + f] * d[f];
        out.values[(k * m + 1) * n + r] = sum;
        if (!Number.isFinite(sum)) finite = false;
      }
    }
    for (let i = 0; i < n; i += 1) out.values[N * m * n + i] = X[N * n + i];
    out.parameter = d[0];
    out.logPeriod = E === 2 ? d[1] : 0;
    return finite;
  }
}
