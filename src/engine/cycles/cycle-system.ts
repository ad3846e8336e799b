import { logScaleSystem } from '../integrators/log-scale';
import type { CompiledSystem } from '../system/contract';

/** Step of the central difference, as a share of the swept range. */
const DIFFERENCE = 1e-6;

/**
 * A model in the coordinates in which its cycles are computed: w_i = ln u_i for nonnegative states that
 * are present, so that densities of 1e-30 keep their relative accuracy, and w_i = u_i / S_i for all
 * others, absent ones included. Time is scaled: dw/dtau = T g(T tau, w, lambda).
 */
export class CycleSystem {
  readonly n: number;
  readonly logarithmic: readonly boolean[];
  private readonly scaled: CompiledSystem;
  private readonly parameters: Float64Array;
  private readonly v: Float64Array;
  private readonly beside: Float64Array;
  /** Whether the period of the forcing depends on the swept parameter. */
  private readonly periodMoves: boolean;

  /**
   * @param p all parameters; not written to
   * @param present states on the cycle, all n; decides which are taken as logarithms
   * @param forcingPeriods periods of the forcing that make one cycle; 0 for a model without explicit time
   */
  constructor(
    readonly system: CompiledSystem,
    p: Float64Array,
    readonly parameterIndex: number,
    readonly parameterScale: number,
    present: Float64Array,
    readonly stateScale: Float64Array,
    readonly forcingPeriods: number,
  ) {
    this.n = system.dimension;
    const { system: scaled, logarithmic } = logScaleSystem(system, present);
    this.scaled = scaled;
    this.logarithmic = logarithmic;
    this.parameters = Float64Array.from(p);
    this.v = new Float64Array(this.n);
    this.beside = new Float64Array(this.n);
    this.periodMoves = this.forced && this.forcingMoves();
  }

  get forced(): boolean {
    return this.forcingPeriods > 0;
  }

  toCoordinates(u: Float64Array, out: Float64Array): void {
    for (let i = 0; i < this.n; i += 1)
      out[i] = this.logarithmic[i] ? Math.log(u[i]) : u[i] / this.stateScale[i];
  }

  toState(w: Float64Array, out: Float64Array): void {
    for (let i = 0; i < this.n; i += 1)
      out[i] = this.logarithmic[i] ? Math.exp(w[i]) : w[i] * this.stateScale[i];
  }

  setParameter(value: number): void {
    this.parameters[this.parameterIndex] = value;
    this.system.setParameters(this.parameters);
  }

  /** All parameters with the swept one at a value; a copy. */
  parametersAt(value: number): Float64Array {
    const p = Float64Array.from(this.parameters);
    p[this.parameterIndex] = value;
    return p;
  }

  /** Period of one cycle of a forced model at the parameter set; NaN where the forcing has none. */
  forcedPeriod(): number {
    return this.forcingPeriods * (this.system.forcingPeriod() ?? NaN);
  }

  /** g into `out` (n). */
  rhs(t: number, w: Float64Array, out: Float64Array): void {
    this.load(w);
    this.scaled.rhs(t, this.v, out);
    for (let i = 0; i < this.n; i += 1) if (!this.logarithmic[i]) out[i] /= this.stateScale[i];
  }

  /** dg_i/dw_j into `out` (n*n, row-major). */
  jacobian(t: number, w: Float64Array, out: Float64Array): void {
    const { n, logarithmic, stateScale } = this;
    this.load(w);
    this.scaled.jacobian(t, this.v, out);
    for (let i = 0; i < n; i += 1)
      for (let j = 0; j < n; j += 1) {
        if (!logarithmic[i]) out[i * n + j] /= stateScale[i];
        if (!logarithmic[j]) out[i * n + j] *= stateScale[j];
      }
  }

  /** dg/dlambda into `out` (n), at fixed t. */
  parameterDerivative(t: number, w: Float64Array, out: Float64Array): void {
    this.load(w);
    this.scaled.parameterDerivative(t, this.v, this.parameterIndex, out);
    for (let i = 0; i < this.n; i += 1) if (!this.logarithmic[i]) out[i] /= this.stateScale[i];
  }

  /**
   * d(T g(T tau, w, lambda))/dlambda of a forced model into `out` (n): exact where the period T of the
   * forcing does not move with the parameter, else by a central difference.
   */
  forcedParameterDerivative(tau: number, T: number, w: Float64Array, value: number, out: Float64Array): void {
    if (!this.periodMoves) {
      this.parameterDerivative(T * tau, w, out);
      for (let i = 0; i < this.n; i += 1) out[i] *= T;
      return;
    }
    const step = DIFFERENCE * this.parameterScale;
    this.setParameter(value + step);
    const after = this.forcedPeriod();
    this.rhs(after * tau, w, out);
    this.setParameter(value - step);
    const before = this.forcedPeriod();
    this.rhs(before * tau, w, this.beside);
    for (let i = 0; i < this.n; i += 1) out[i] = (after * out[i] - before * this.beside[i]) / (2 * step);
    this.setParameter(value);
  }

  private forcingMoves(): boolean {
    const value = this.parameters[this.parameterIndex];
    this.setParameter(value);
    const here = this.forcedPeriod();
    this.setParameter(value + DIFFERENCE * this.parameterScale);
    const there = this.forcedPeriod();
    this.setParameter(value);
    return here !== there;
  }

  private load(w: Float64Array): void {
    for (let i = 0; i < this.n; i += 1) this.v[i] = this.logarithmic[i] ? w[i] : w[i] * this.stateScale[i];
  }
}
