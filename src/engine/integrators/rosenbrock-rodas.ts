import { luFactor, luSolve } from '../linalg/lu';
import { scaledNorm, type MethodSetting, type OneStepMethod } from './one-step-method';
import { RODAS_43 } from './tableaus/rodas-43';

const STAGES = 6;

/**
 * Stiff steps by the Rosenbrock method RODAS of order 4(3), with the exact Jacobian of the system:
 *
 *     (I / (h gamma) - J) U_i = f(t + c_i h, y + sum a_ij U_j) + sum (C_ij / h) U_j + h d_i df/dt.
 *
 * One Jacobian and one LU factorisation a step, six solves. df/dt by a difference, for systems with
 * explicit time only. Source: Hairer & Wanner II, sect. IV.7.
 */
export class RosenbrockRodas implements OneStepMethod {
  readonly order = 4;
  readonly errorExponent = 4;
  readonly controlBeta = 0;
  readonly smallestFactor = 0.2;
  readonly largestFactor = 6;
  evaluations = 0;
  state: Float64Array;
  readonly slope: Float64Array;

  private readonly n: number;
  private readonly jacobian: Float64Array;
  private readonly matrix: Float64Array;
  private readonly pivots: Int32Array;
  private readonly u: Float64Array[];
  private readonly timeSlope: Float64Array;
  private readonly denseParts: readonly Float64Array[];
  private previous: Float64Array;
  private proposal: Float64Array;
  private jacobianKnown = false;
  private denseReady = false;
  private end = 0;

  constructor(private readonly setting: MethodSetting) {
    const n = setting.system.dimension;
    this.n = n;
    this.jacobian = new Float64Array(n * n);
    this.matrix = new Float64Array(n * n);
    this.pivots = new Int32Array(n);
    this.u = Array.from({ length: STAGES }, () => new Float64Array(n));
    this.denseParts = [new Float64Array(n), new Float64Array(n)];
    this.timeSlope = new Float64Array(n);
    this.state = new Float64Array(n);
    this.slope = new Float64Array(n);
    this.previous = new Float64Array(n);
    this.proposal = new Float64Array(n);
  }

  begin(t: number, u: Float64Array): boolean {
    this.state.set(u.subarray(0, this.n));
    this.evaluate(t, this.state, this.slope);
    this.jacobianKnown = false;
    return this.slope.every(Number.isFinite) && this.state.every(Number.isFinite);
  }

  attempt(t: number, h: number): number {
    const { n, u, proposal, matrix, jacobian } = this;
    if (!this.jacobianKnown) this.linearise(t);
    this.denseReady = false;
    const diagonal = 1 / (h * RODAS_43.gamma);
    for (let k = 0; k < n * n; k += 1) matrix[k] = -jacobian[k];
    for (let i = 0; i < n; i += 1) matrix[i * n + i] += diagonal;
    if (luFactor(matrix, n, this.pivots) === 0) return Number.NaN;
    for (let s = 0; s < STAGES; s += 1) {
      this.stageArgument(s);
      if (s === 0) u[0].set(this.slope);
      else this.evaluate(t + RODAS_43.c[s] * h, proposal, u[s]);
      this.addStages(s, h);
      luSolve(matrix, n, this.pivots, u[s]);
    }
    // The last stage is the difference to the embedded solution, and stiffly accurate: y1 = g6 + u6.
    for (let i = 0; i < n; i += 1) proposal[i] += u[STAGES - 1][i];
    this.end = t + h;
    return scaledNorm(u[STAGES - 1], this.state, proposal, this.setting, n);
  }

  accept(): void {
    const kept = this.previous;
    this.previous = this.state;
    this.state = this.proposal;
    this.proposal = kept;
    this.evaluate(this.end, this.state, this.slope);
    this.jacobianKnown = false;
  }

  interpolate(theta: number, out: Float64Array): void {
    if (!this.denseReady) this.prepareDense();
    const [c3, c4] = this.denseParts;
    const rest = 1 - theta;
    for (let i = 0; i < this.n; i += 1)
      out[i] = this.previous[i] * rest + theta * (this.state[i] + rest * (c3[i] + theta * c4[i]));
  }

  looksStiff(): boolean {
    return false;
  }

  private evaluate(t: number, u: Float64Array, out: Float64Array): void {
    this.evaluations += 1;
    this.setting.system.rhs(t, u, out);
  }

  /** Jacobian at the start of the step, and df/dt where the system has explicit time. */
  private linearise(t: number): void {
    const { system } = this.setting;
    system.jacobian(t, this.state, this.jacobian);
    this.jacobianKnown = true;
    if (system.autonomous) return;
    const delta = Math.sqrt(Number.EPSILON) * Math.max(1e-3, Math.abs(t));
    this.evaluate(t + delta, this.state, this.timeSlope);
    for (let i = 0; i < this.n; i += 1) this.timeSlope[i] = (this.timeSlope[i] - this.slope[i]) / delta;
  }

  /** proposal = y + sum a_sj u_j; the argument of stage 6 is that of stage 5 plus u5. */
  private stageArgument(s: number): void {
    const { n, u, proposal, state } = this;
    if (s === STAGES - 1) {
      for (let i = 0; i < n; i += 1) proposal[i] += u[s - 1][i];
      return;
    }
    const row: readonly number[] = RODAS_43.a[s];
    for (let i = 0; i < n; i += 1) proposal[i] = state[i];
    for (let j = 0; j < row.length; j += 1) for (let i = 0; i < n; i += 1) proposal[i] += row[j] * u[j][i];
  }

  private addStages(s: number, h: number): void {
    const { n, u, timeSlope } = this;
    const row: readonly number[] = RODAS_43.C[s];
    const weight = this.setting.system.autonomous ? 0 : h * RODAS_43.d[s];
    for (let j = 0; j < row.length; j += 1) for (let i = 0; i < n; i += 1) u[s][i] += (row[j] / h) * u[j][i];
    if (weight !== 0) for (let i = 0; i < n; i += 1) u[s][i] += weight * timeSlope[i];
  }

  private prepareDense(): void {
    this.denseParts.forEach((part, m) => {
      part.fill(0);
      const row: readonly number[] = RODAS_43.dense[m];
      for (let j = 0; j < row.length; j += 1)
        for (let i = 0; i < this.n; i += 1) part[i] += row[j] * this.u[j][i];
    });
    this.denseReady = true;
  }
}
