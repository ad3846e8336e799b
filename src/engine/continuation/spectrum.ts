import type { EquilibriumType } from '../equilibria/contract';
import { createEigenWorkspace, eigenvaluesInto, type EigenWorkspace } from '../linalg/eigenvalues';

/** A real part below this share of the size of the Jacobian is not told from zero. */
export const NEUTRAL_SHARE = 1e-9;

export const BRANCH_TYPES = [
  'stable node',
  'stable focus',
  'unstable node',
  'unstable focus',
  'saddle',
  'saddle focus',
  'indistinguishable from neutral',
  'not differentiable',
] as const satisfies readonly EquilibriumType[];

/** Eigenvalues of one Jacobian after another, with what a sweep reads from them. */
export class Spectrum {
  readonly re: Float64Array;
  readonly im: Float64Array;
  /** Numbers of eigenvalues with real part above, below and within the band told as zero. */
  growing = 0;
  shrinking = 0;
  undecided = 0;
  private readonly workspace: EigenWorkspace;

  constructor(private readonly n: number) {
    this.re = new Float64Array(n);
    this.im = new Float64Array(n);
    this.workspace = createEigenWorkspace(n);
  }

  /** @param J n*n row-major; not written to. False where no eigenvalues could be computed. */
  update(J: Float64Array): boolean {
    if (!eigenvaluesInto(J, this.workspace, this.re, this.im)) return false;
    let norm = 0;
    for (let i = 0; i < this.n; i += 1) norm = Math.max(norm, Math.hypot(this.re[i], this.im[i]));
    const band = NEUTRAL_SHARE * norm;
    this.growing = 0;
    this.shrinking = 0;
    for (let i = 0; i < this.n; i += 1) {
      if (this.re[i] > band) this.growing += 1;
      else if (this.re[i] < -band) this.shrinking += 1;
    }
    this.undecided = this.n - this.growing - this.shrinking;
    return true;
  }

  get leading(): number {
    return this.n > 0 ? this.re[0] : -Infinity;
  }

  /** Real part of the eigenvalue nearest to the imaginary axis; NaN where there are none. */
  get nearest(): number {
    let best = NaN;
    for (let i = 0; i < this.n; i += 1) if (!(Math.abs(this.re[i]) >= Math.abs(best))) best = this.re[i];
    return best;
  }

  /** 1 attracts, 0 repels, 2 not told from neutral. */
  get attracts(): 0 | 1 | 2 {
    if (this.growing > 0) return 0;
    return this.undecided > 0 ? 2 : 1;
  }

  /** Index into BRANCH_TYPES. */
  get typeIndex(): number {
    // The leading eigenvalues stand first.
    const spiral = this.n > 0 && this.im[0] !== 0;
    if (this.growing === 0) return this.undecided > 0 ? 6 : spiral ? 1 : 0;
    if (this.shrinking > 0 || this.undecided > 0) return this.hasPair() ? 5 : 4;
    return spiral ? 3 : 2;
  }

  /** Real part of the complex pair nearest to the imaginary axis, and its frequency; NaN where there is none. */
  nearestPair(): { re: number; im: number } {
    let best = { re: NaN, im: NaN };
    for (let i = 0; i < this.n; i += 1) {
      if (this.im[i] > 0 && !(Math.abs(this.re[i]) >= Math.abs(best.re)))
        best = { re: this.re[i], im: this.im[i] };
    }
    return best;
  }

  private hasPair(): boolean {
    for (let i = 0; i < this.n; i += 1) if (this.im[i] !== 0) return true;
    return false;
  }

  list(): { re: number; im: number }[] {
    return Array.from(this.re, (re, i) => ({ re, im: this.im[i] }));
  }
}
