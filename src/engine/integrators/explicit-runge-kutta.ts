import type { ExplicitTableau } from './explicit-tableau';
import { scaledNorm, type MethodSetting, type OneStepMethod } from './one-step-method';

/** Nonzero weights of a row and the stages they belong to. */
interface SparseRow {
  readonly stages: Int32Array;
  readonly weights: Float64Array;
}

function sparse(row: readonly number[]): SparseRow {
  const stages = row.flatMap((weight, j) => (weight === 0 ? [] : [j]));
  return { stages: Int32Array.from(stages), weights: Float64Array.from(stages, (j) => row[j]) };
}

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
  private readonly k: Float64Array[];
  private readonly stage: Float64Array;
  private readonly error: Float64Array;
  private readonly densePart: Float64Array[];
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
    this.rows = tableau.a.map(sparse);
    this.weights = sparse(tableau.b);
    this.errorRow = sparse(tableau.error);
    this.lowErrorRow = tableau.lowOrderError ? sparse(tableau.lowOrderError) : null;
    this.errorUsesEnd = tableau.error.length > this.stageCount;
    this.denseStages = tableau.denseA.map(sparse);
    this.denseRows = tableau.dense.map(sparse);
    const stages = this.stageCount + 1 + tableau.denseA.length;
    this.k = Array.from({ length: stages }, () => new Float64Array(n));
    this.densePart = Array.from({ length: tableau.dense.length + 3 }, () => new Float64Array(n));
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
      const first = k[stageCount];
      k[stageCount] = k[0];
      k[0] = first;
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
    const { n, previous, densePart } = this;
    const rest = 1 - theta;
    for (let i = 0; i < n; i += 1) {
      let sum = 0;
      for (let m = densePart.length - 1; m >= 0; m -= 1) {
        sum = (sum + densePart[m][i]) * (m % 2 === 0 ? theta : rest);
      }
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

  /** out = base + h sum of weight * stage. */
  private combine(row: SparseRow, base: Float64Array, h: number, out: Float64Array): void {
    const { n, k } = this;
    const { stages, weights } = row;
    for (let i = 0; i < n; i += 1) out[i] = base[i];
    for (let q = 0; q < stages.length; q += 1) {
      const slope = k[stages[q]];
      const factor = h * weights[q];
      for (let i = 0; i < n; i += 1) out[i] += factor * slope[i];
    }
  }

  private weigh(row: SparseRow, factor: number, out: Float64Array): void {
    const { n, k } = this;
    out.fill(0);
    for (let q = 0; q < row.stages.length; q += 1) {
      const slope = k[row.stages[q]];
      const weight = factor * row.weights[q];
      for (let i = 0; i < n; i += 1) out[i] += weight * slope[i];
    }
  }

  private errorOverTolerance(): number {
    const { state, proposal, error, setting, n, h } = this;
    this.weigh(this.errorRow, h, error);
    const high = scaledNorm(error, state, proposal, setting, n);
    if (!this.lowErrorRow) return high;
    this.weigh(this.lowErrorRow, h, error);
    const low = scaledNorm(error, state, proposal, setting, n);
    const squared = high * high + 0.01 * low * low;
    return squared === 0 ? 0 : (high * high) / Math.sqrt(squared);
  }

  private prepareDense(): void {
    const { n, k, h, t, stageCount, densePart, previous, state } = this;
    const { denseC } = this.tableau;
    this.denseStages.forEach((row, s) => {
      this.combine(row, previous, h, this.proposal);
      this.evaluate(t + denseC[s] * h, this.proposal, k[stageCount + 1 + s]);
    });
    for (let i = 0; i < n; i += 1) {
      const change = state[i] - previous[i];
      densePart[0][i] = change;
      densePart[1][i] = h * k[0][i] - change;
      densePart[2][i] = 2 * change - h * (k[0][i] + k[stageCount][i]);
    }
    this.denseRows.forEach((row, m) => this.weigh(row, h, densePart[m + 3]));
    this.denseReady = true;
  }
}
