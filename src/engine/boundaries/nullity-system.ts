import { nullVector } from '../linalg/null-vector';
import type { BoundaryScope } from './boundary-scope';
import { loadPoint, packPoint, scaledBlock, type DefiningSystem } from './defining-system';

/**
 * Points at which a block of the Jacobian is singular: with m active states and the block R,
 *
 *     f_a(u, p) = 0,   J_RR(u, p) v = 0,   <v_0, v> = 1.
 *
 * R = all active states gives folds (Moore & Spence 1980, from memory); R = the classes of an absent
 * population gives the points at which it begins to invade. Unknowns u_a, v, p1, p2.
 */
export class NullitySystem implements DefiningSystem {
  readonly size: number;
  private readonly buffer: Float64Array;
  private readonly blockMatrix: Float64Array;
  private reference: Float64Array;

  constructor(
    readonly scope: BoundaryScope,
    readonly active: readonly number[],
    readonly block: readonly number[],
  ) {
    this.size = active.length + block.length + 2;
    this.buffer = new Float64Array(scope.n);
    this.blockMatrix = new Float64Array(block.length ** 2);
    this.reference = new Float64Array(block.length);
  }

  /** The point at an equilibrium that is nearly one of this kind; null where values are not finite. */
  pack(u: Float64Array, first: number, second: number): Float64Array | null {
    const x = packPoint(this, u, first, second);
    if (!loadPoint(this, x, this.buffer)) return null;
    scaledBlock(this.scope, this.block, this.blockMatrix);
    x.set(nullVector(this.blockMatrix, this.block.length).vector, this.active.length);
    this.refer(x);
    return x;
  }

  /** How far the block packed last was from singular: |J v| of the unit vector v, over the rates of the model. */
  singularity(): number {
    const { blockMatrix, block } = this;
    return nullVector(blockMatrix, block.length).residual / this.rateScale();
  }

  vectorOf(x: Float64Array): Float64Array {
    return x.slice(this.active.length, this.active.length + this.block.length);
  }

  /** Largest entry of the whole Jacobian: the size of rates where the block itself is zero. */
  private rateScale(): number {
    return this.scope.J.reduce((most, value) => Math.max(most, Math.abs(value)), 0) || 1;
  }

  refer(x: Float64Array): void {
    const v = this.vectorOf(x);
    const squared = v.reduce((sum, value) => sum + value * value, 0);
    this.reference = v.map((value) => value / squared);
  }

  residual(x: Float64Array, out: Float64Array): boolean {
    const { scope, active, block, blockMatrix, reference } = this;
    if (!loadPoint(this, x, this.buffer)) return false;
    const m = active.length;
    const r = block.length;
    for (let a = 0; a < m; a += 1) out[a] = scope.f[active[a]] / scope.stateScale[active[a]];
    scaledBlock(scope, block, blockMatrix);
    let norm = -1;
    for (let a = 0; a < r; a += 1) {
      let sum = 0;
      for (let b = 0; b < r; b += 1) sum += blockMatrix[a * r + b] * x[m + b];
      out[m + a] = sum;
      norm += reference[a] * x[m + a];
    }
    out[m + r] = norm;
    return true;
  }
}
