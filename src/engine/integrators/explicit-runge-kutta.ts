import type { ExplicitTableau } from './explicit-tableau';
import type { MethodSetting, OneStepMethod } from './one-step-method';
import { addWeighted, sparseRow, type SparseRow } from './sparse-row';

/**
 * Explicit Runge-Kutta steps for any tableau, with dense output worked out when first asked for.
 * Error norm: Hairer, Norsett & Wanner I, eq. (II.4.11), and sect. II.10 where there are two
 * estimates. Nothing is allocated after construction.
 */
export class ExplicitRungeKutta implements OneStepMethod {
  readonly order: number;
  readonly errorExponent: number;
  readonly controlBeta: number;
  readonly smallestFactor: number;
  readonly largestFactor: number;
  evaluations = 0;
  state: Float64Array;

  private readonly n: number;
  private readonly stageCount: number;
  private readonly rows: readonly SparseRow[];
  private readonly weights: SparseRow;
  private readonly errorRow: SparseRow;
  private readonly lowErrorRow: SparseRow | null;
  private readonly errorUsesEnd: boolean;
  private readonly denseStages: readonly SparseRow[];
  private readonly denseRows: readonly SparseRow[];
  /** All slopes, stage after stage, and a view of each. */
  private readonly slopes: Float64Array;
  private readonly k: readonly Float64Array[];
  private readonly stage: Float64Array;
  private readonly error: Float64Array;
  /** Coefficients of the dense output, row after row. */
  private readonly dense: Float64Array;
  private readonly denseCount: number;
  private previous: Float64Array;
  private proposal: Float64Array;
  private t = 0;
  private h = 0;
  private accepted = false;
  private denseReady = false;
  private endKnown = false;

  constructor(
    private readonly setting: MethodSetting,
    private readonly tableau: ExplicitTableau,
  ) {
    const n = setting.system.dimension;
    this.n = n;
    this.order = tableau.order;
    this.errorExponent = tableau.errorExponent;
    this.controlBeta = tableau.controlBeta;
    this.smallestFactor = tableau.smallestFactor;
    this.largestFactor = tableau.largestFactor;
    this.stageCount = tableau.b.length;
    this.rows = tableau.a.map((row) => sparseRow(row, n));
    this.weights = sparseRow(tableau.b, n);
    this.errorRow = sparseRow(tableau.error, n);
    this.lowErrorRow = tableau.lowOrderError ? sparseRow(tableau.lowOrderError, n) : null;
    this.errorUsesEnd = tableau.error.length > this.stageCount;
    this.denseStages = tableau.denseA.map((row) => sparseRow(row, n));
    this.denseRows = tableau.dense.map((row) => sparseRow(row, n));
    const stages = this.stageCount + 1 + tableau.denseA.length;
    const slopes = new Float64Array(stages * n);
    this.slopes = slopes;
    this.k = Array.from({ length: stages }, (_, j) => slopes.subarray(j * n, (j + 1) * n));
    this.denseCount = tableau.dense.length + 3;
    this.dense = new Float64Array(this.denseCount * n);
    this.stage = new Float64Array(n);
    this.error = new Float64Array(n);
    this.state = new Float64Array(n);
    this.previous = new Float64Array(n);
    this.proposal = new Float64Array(n);
  }

  get slope(): Float64Array {
    return this.accepted ? this.k[this.stageCount] : this.k[0];
  }

  begin(t: number, u: Float64Array): boolean {
    this.accepted = false;
    this.denseReady = false;
    this.state.set(u.subarray(0, this.n));
    this.evaluate(t, this.state, this.k[0]);
    return this.k[0].every(Number.isFinite) && this.state.every(Number.isFinite);
  }

  attempt(t: number, h: number): number {
    const { k, tableau, stageCount } = this;
    if (this.accepted) {
      k[0].set(k[stageCount]);
      this.accepted = false;
    }
    this.denseReady = false;
    this.endKnown = false;
    this.t = t;
    this.h = h;
    for (let s = 1; s < stageCount; s += 1) {
      this.combine(this.rows[s], this.state, h, this.stage);
      this.evaluate(t + tableau.c[s] * h, this.stage, k[s]);
    }
    this.combine(this.weights, this.state, h, this.proposal);
    if (this.errorUsesEnd) this.evaluateEnd();
    return this.errorOverTolerance();
  }

  accept(): void {
    if (!this.endKnown) this.evaluateEnd();
    const kept = this.previous;
    this.previous = this.state;
    this.state = this.proposal;
    this.proposal = kept;
    this.accepted = true;
  }

  interpolate(theta: number, out: Float64Array): void {
    if (!this.denseReady) this.prepareDense();
    const { n, previous, dense, denseCount } = this;
    const rest = 1 - theta;
    for (let i = 0; i < n; i += 1) {
      let sum = 0;
      for (let m = denseCount - 1; m >= 0; m -= 1)
        sum = (sum + dense[m * n + i]) * (m % 2 === 0 ? theta : rest);
      out[i] = previous[i] + sum;
    }
  }

  /**
   * Hairer & Wanner II, sect. IV.2: |f(y1) - f(g)| / |y1 - g| with g the argument of the last stage,
   * which has the time t + h as well, estimates the largest eigenvalue.
   */
  looksStiff(): boolean {
    const { n, k, stageCount, state, stage } = this;
    let slopes = 0;
    let distance = 0;
    for (let i = 0; i < n; i += 1) {
      slopes += (k[stageCount][i] - k[stageCount - 1][i]) ** 2;
      distance += (state[i] - stage[i]) ** 2;
    }
    return distance > 0 && Math.abs(this.h) * Math.sqrt(slopes / distance) > this.tableau.stiffnessLimit;
  }

  private evaluate(t: number, u: Float64Array, out: Float64Array): void {
    this.evaluations += 1;
    this.setting.system.rhs(t, u, out);
  }

  private evaluateEnd(): void {
    this.evaluate(this.t + this.h, this.proposal, this.k[this.stageCount]);
    this.endKnown = true;
  }

  /** out = base + h sum of weight * slope. */
  private combine(row: SparseRow, base: Float64Array, h: number, out: Float64Array): void {
    for (let i = 0; i < this.n; i += 1) out[i] = base[i];
    addWeighted(row, h, this.slopes, this.n, out);
  }

  /** Root mean square of an estimate over tolerance. */
  private estimate(row: SparseRow): number {
    const { n, state, proposal, error } = this;
    const { absoluteTolerance, relativeTolerance } = this.setting;
    error.fill(0);
    addWeighted(row, this.h, this.slopes, n, error);
    let squares = 0;
    for (let i = 0; i < n; i += 1) {
      const size = Math.max(Math.abs(state[i]), Math.abs(proposal[i]));
      const ratio = error[i] / (absoluteTolerance + relativeTolerance * size);
      squares += ratio * ratio;
    }
    return Math.sqrt(squares / n);
  }

  private errorOverTolerance(): number {
    const high = this.estimate(this.errorRow);
    if (!this.lowErrorRow) return high;
    const low = this.estimate(this.lowErrorRow);
    const squared = high * high + 0.01 * low * low;
    return squared === 0 ? 0 : (high * high) / Math.sqrt(squared);
  }

  private prepareDense(): void {
    const { n, k, h, t, stageCount, dense, previous, state } = this;
    const { denseC } = this.tableau;
    for (let s = 0; s < this.denseStages.length; s += 1) {
      this.combine(this.denseStages[s], previous, h, this.proposal);
      this.evaluate(t + denseC[s] * h, this.proposal, k[stageCount + 1 + s]);
    }
    for (let i = 0; i < n; i += 1) {
      const change = state[i] - previous[i];
      dense[i] = change;
      dense[n + i] = h * k[0][i] - change;
      dense[2 * n + i] = 2 * change - h * (k[0][i] + k[stageCount][i]);
    }
    dense.fill(0, 3 * n);
    for (let m = 0; m < this.denseRows.length; m += 1)
      addWeighted(this.denseRows[m], h, this.slopes, n, dense, (m + 3) * n);
    this.denseReady = true;
  }
}
