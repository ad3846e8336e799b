import { luFactor, luSolve } from '../linalg/lu';
import type { DefiningSystem } from './defining-system';

export const BOUNDARY_NEWTON_DEFAULTS = {
  iterations: 12,
  tolerance: 1e-11,
  /** Rounding sets a floor near singular points: a step that no longer shrinks is the end below this. */
  accepted: 1e-7,
  /** Step of the central differences for the matrix; the residuals themselves are exact. */
  difference: 1e-6,
} as const;

/** Corrector and tangent of a curve r(x) = 0. Owns its buffers. */
export class BoundaryCurve {
  private readonly matrix: Float64Array;
  private readonly pivots: Int32Array;
  private readonly r: Float64Array;
  private readonly plus: Float64Array;
  private readonly minus: Float64Array;
  private readonly moved: Float64Array;
  private readonly step: Float64Array;

  constructor(readonly system: DefiningSystem) {
    const { size } = system;
    this.matrix = new Float64Array(size * size);
    this.pivots = new Int32Array(size);
    this.r = new Float64Array(size - 1);
    this.plus = new Float64Array(size - 1);
    this.minus = new Float64Array(size - 1);
    this.moved = new Float64Array(size);
    this.step = new Float64Array(size);
  }

  /**
   * Newton's method for r(x) = 0 with <along, x> = target, x moved in place.
   *
   * @returns iterations used, or -1 where it did not converge or values were not finite
   */
  correct(x: Float64Array, along: Float64Array, target: number): number {
    const { system, r, step } = this;
    const { size } = system;
    let before = Infinity;
    for (let k = 1; k <= BOUNDARY_NEWTON_DEFAULTS.iterations; k += 1) {
      if (!system.residual(x, r) || !this.factor(x, along)) return -1;
      let distance = target;
      for (let j = 0; j < size; j += 1) distance -= along[j] * x[j];
      for (let i = 0; i < size - 1; i += 1) step[i] = -r[i];
      step[size - 1] = distance;
      luSolve(this.matrix, size, this.pivots, step);
      let largest = 0;
      for (let j = 0; j < size; j += 1) {
        largest = Math.max(largest, Math.abs(step[j]) / (1 + Math.abs(x[j])));
        x[j] += step[j];
      }
      if (!Number.isFinite(largest)) return -1;
      if (largest < BOUNDARY_NEWTON_DEFAULTS.tolerance) return k;
      if (largest < BOUNDARY_NEWTON_DEFAULTS.accepted && largest > before / 2) return k;
      if (k > 4 && largest > 10 * before) return -1;
      before = largest;
    }
    return before < BOUNDARY_NEWTON_DEFAULTS.accepted ? BOUNDARY_NEWTON_DEFAULTS.iterations : -1;
  }

  /** Unit tangent at x, turned along `reference`; false where it is not defined. */
  tangent(x: Float64Array, reference: Float64Array, out: Float64Array): boolean {
    const { size } = this.system;
    if (!this.factor(x, reference)) return false;
    out.fill(0);
    out[size - 1] = 1;
    luSolve(this.matrix, size, this.pivots, out);
    const length = Math.sqrt(out.reduce((sum, value) => sum + value * value, 0));
    if (!(length > 0) || !Number.isFinite(length)) return false;
    for (let j = 0; j < size; j += 1) out[j] /= length;
    return true;
  }

  /** First tangent, without a reference: along whichever coordinate gives a well defined one, parameters first. */
  firstTangent(x: Float64Array, out: Float64Array): boolean {
    const { size } = this.system;
    const reference = new Float64Array(size);
    for (let j = size - 1; j >= 0; j -= 1) {
      reference.fill(0);
      reference[j] = 1;
      if (this.tangent(x, reference, out) && Math.abs(out[j]) > 1e-3) return true;
    }
    return false;
  }

  private factor(x: Float64Array, last: Float64Array): boolean {
    const { system, matrix, plus, minus, moved } = this;
    const { size } = system;
    moved.set(x);
    for (let j = 0; j < size; j += 1) {
      const h = BOUNDARY_NEWTON_DEFAULTS.difference * Math.max(1, Math.abs(x[j]));
      moved[j] = x[j] + h;
      const there = system.residual(moved, plus);
      moved[j] = x[j] - h;
      if (!there || !system.residual(moved, minus)) return false;
      moved[j] = x[j];
      for (let i = 0; i < size - 1; i += 1) matrix[i * size + j] = (plus[i] - minus[i]) / (2 * h);
      matrix[(size - 1) * size + j] = last[j];
    }
    return luFactor(matrix, size, this.pivots) !== 0;
  }
}
