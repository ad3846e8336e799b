import type { Branch } from './contract';
import type { SweepScope } from './sweep-scope';

/** Neighbouring points nearer than this, in scaled units, may be on one branch; the corrector decides. */
const NEAR = 0.15;
const SAME = 1e-5;

/** Branches followed so far, with the question whether a point lies on one of them. */
export class BranchSet {
  readonly branches: Branch[] = [];
  private readonly actives: (readonly number[])[] = [];

  constructor(private readonly scope: SweepScope) {}

  /** Returns the index of the branch. */
  add(branch: Branch, active: readonly number[]): number {
    this.branches.push(branch);
    this.actives.push(active);
    return this.branches.length - 1;
  }

  /** Whether an equilibrium at a value of the parameter lies on a branch of the same face. */
  holds(state: Float64Array, parameter: number, active: readonly number[]): boolean {
    return this.branches.some(
      (branch, b) => sameList(this.actives[b], active) && this.isOn(branch, active, state, parameter),
    );
  }

  private isOn(branch: Branch, active: readonly number[], state: Float64Array, parameter: number): boolean {
    const n = branch.dimension;
    const curve = this.scope.curveOn(active);
    const across = new Float64Array(active.length + 1);
    across[active.length] = 1;
    for (let k = 0; k + 1 < branch.parameters.length; k += 1) {
      const low = branch.parameters[k];
      const high = branch.parameters[k + 1];
      const slack = 1e-9 * this.scope.parameterScale;
      if (parameter < Math.min(low, high) - slack || parameter > Math.max(low, high) + slack) continue;
      const share = high === low ? 0 : (parameter - low) / (high - low);
      const guess = new Float64Array(n);
      for (let i = 0; i < n; i += 1) {
        const a = branch.states[k * n + i];
        guess[i] = a + Math.min(1, Math.max(0, share)) * (branch.states[(k + 1) * n + i] - a);
      }
      if (this.distance(guess, state, active) > NEAR) continue;
      if (this.distance(guess, state, active) < SAME) return true;
      const w = curve.pointOf(guess, parameter);
      if (curve.correct(w, across, parameter / this.scope.parameterScale) < 0) continue;
      const corrected = curve.pointOf(state, parameter);
      if (w.every((value, j) => Math.abs(value - corrected[j]) < SAME)) return true;
    }
    return false;
  }

  private distance(a: Float64Array, b: Float64Array, active: readonly number[]): number {
    return Math.max(0, ...active.map((i) => Math.abs(a[i] - b[i]) / this.scope.stateScale[i]));
  }
}

function sameList(a: readonly number[], b: readonly number[]): boolean {
  return a.length === b.length && a.every((value, k) => value === b[k]);
}
