import { determinant } from '../linalg/solve';
import type { Curve } from './curve';
import { Spectrum } from './spectrum';

/** States of one population that are absent together on a branch. */
export interface AbsentGroup {
  readonly population: string;
  readonly states: readonly number[];
}

/** What is watched along a branch: a simple zero of each marks a special point. */
export interface Monitors {
  /** Parameter component of the tangent: zero at a fold. */
  readonly fold: number;
  /** det [F_w; tangent']: zero at a branch point within the face. */
  readonly branch: number;
  /** Determinant of each absent population's block of the Jacobian: zero where it begins to invade. */
  readonly transversal: readonly number[];
  /** Present nonnegative state nearest to zero, in units of its scale, and which it is. */
  readonly lowest: number;
  readonly lowestState: number;
  readonly growing: number;
  readonly undecided: number;
  /** Real part of the eigenvalue nearest to the imaginary axis. */
  readonly nearest: number;
}

/** One accepted point of a branch. */
export interface BranchPoint {
  readonly w: Float64Array;
  readonly tangent: Float64Array;
  readonly monitors: Monitors;
  readonly u: Float64Array;
  readonly parameter: number;
  readonly leading: number;
  readonly attracts: 0 | 1 | 2;
  readonly typeIndex: number;
}

/** Evaluates the monitors; owns the buffers, so one serves one curve. */
export class Monitor {
  readonly spectrum: Spectrum;
  private readonly blocks: readonly Float64Array[];

  constructor(
    readonly curve: Curve,
    readonly absent: readonly AbsentGroup[],
  ) {
    this.spectrum = new Spectrum(curve.n);
    this.blocks = absent.map((group) => new Float64Array(group.states.length ** 2));
  }

  /** The point at w with its tangent along `reference`; null where values are not finite or the tangent is not defined. */
  pointAt(w: Float64Array, reference: Float64Array): BranchPoint | null {
    const { curve } = this;
    if (!curve.evaluate(w)) return null;
    const tangent = new Float64Array(curve.m + 1);
    if (!curve.tangent(reference, tangent)) return null;
    if (!this.spectrum.update(curve.jacobian)) return null;
    return {
      w,
      tangent,
      monitors: this.read(w, tangent),
      u: curve.u.slice(),
      parameter: curve.parameterAt(w),
      leading: this.spectrum.leading,
      attracts: this.spectrum.attracts,
      typeIndex: this.spectrum.typeIndex,
    };
  }

  private read(w: Float64Array, tangent: Float64Array): Monitors {
    const { curve, spectrum } = this;
    let lowest = Infinity;
    let lowestState = -1;
    for (let a = 0; a < curve.m; a += 1) {
      const i = curve.active[a];
      if (curve.system.nonnegative[i] && w[a] < lowest) {
        lowest = w[a];
        lowestState = i;
      }
    }
    return {
      fold: tangent[curve.m],
      branch: curve.lastDeterminant,
      transversal: this.absent.map((_, g) => this.transversalDeterminant(g)),
      lowest,
      lowestState,
      growing: spectrum.growing,
      undecided: spectrum.undecided,
      nearest: spectrum.nearest,
    };
  }

  /** Block of the Jacobian in which absent population g feels itself alone. */
  block(g: number): Float64Array {
    const { states } = this.absent[g];
    const out = this.blocks[g];
    states.forEach((i, a) =>
      states.forEach((j, b) => (out[a * states.length + b] = this.curve.jacobian[i * this.curve.n + j])),
    );
    return out;
  }

  private transversalDeterminant(g: number): number {
    return determinant(this.block(g), this.absent[g].states.length);
  }
}
