import { foldForm } from '../continuation/fold-normal-form';
import { firstLyapunovCoefficient } from '../continuation/hopf-normal-form';
import { kinkNear } from '../continuation/kink-near';
import type { Eigenvalue } from '../equilibria/contract';
import { eigenvalues } from '../linalg/eigenvalues';
import { leftNullVector } from '../linalg/null-vector';
import type { BoundaryKind } from './contract';
import { firstOf, loadPoint, scaledBlock, secondOf, type DefiningSystem } from './defining-system';
import { HopfSystem } from './hopf-system';
import { NullitySystem } from './nullity-system';

/** One accepted point of a boundary curve. */
export interface BoundaryPoint {
  readonly x: Float64Array;
  readonly tangent: Float64Array;
  readonly first: number;
  readonly second: number;
  readonly u: Float64Array;
  /** All eigenvalues of the equilibrium, by falling real part. */
  readonly eigenvalues: readonly Eigenvalue[];
  /** Those besides the critical one or pair. */
  readonly others: readonly Eigenvalue[];
  readonly growing: number;
  /** omega^2 on a Hopf curve; NaN elsewhere. */
  readonly kappa: number;
  /** Fold coefficient's numerator and denominator with oriented unit vectors; NaN off fold curves. */
  readonly quadratic: number;
  readonly overlap: number;
  /** First Lyapunov coefficient; NaN off Hopf curves and where withheld. */
  readonly l1: number;
  /** Left null vector, which orients the coefficients along the curve. */
  readonly left: Float64Array;
}

/** Reads what is watched along a curve. */
export class BoundaryMonitor {
  private readonly buffer: Float64Array;

  constructor(
    readonly kind: BoundaryKind,
    readonly system: DefiningSystem,
  ) {
    this.buffer = new Float64Array(system.scope.n);
  }

  /** The point at x; null where values are not finite. `before` orients the vectors. */
  read(x: Float64Array, tangent: Float64Array, before: BoundaryPoint | null): BoundaryPoint | null {
    const { system } = this;
    const { scope } = system;
    if (!loadPoint(system, x, this.buffer)) return null;
    const u = scope.u.slice();
    const found = eigenvalues(scope.J, scope.n);
    if (!found.converged) return null;
    const all = Array.from(found.re, (re, k) => ({ re, im: found.im[k] }));
    const kappa = system instanceof HopfSystem ? system.kappaOf(x) : NaN;
    const others = withoutCritical(all, kappa);
    return {
      x,
      tangent,
      first: firstOf(system, x),
      second: secondOf(system, x),
      u,
      eigenvalues: all,
      others,
      growing: others.filter(({ re }) => re > 0).length,
      kappa,
      ...this.foldNumbers(x, u, before),
      l1: kappa > 0 ? this.lyapunov(u, Math.sqrt(kappa)) : NaN,
    };
  }

  private foldNumbers(
    x: Float64Array,
    u: Float64Array,
    before: BoundaryPoint | null,
  ): Pick<BoundaryPoint, 'quadratic' | 'overlap' | 'left'> {
    const { system } = this;
    if (this.kind !== 'fold' || !(system instanceof NullitySystem))
      return { quadratic: NaN, overlap: NaN, left: new Float64Array(0) };
    const { scope, active } = system;
    const m = active.length;
    const scaled = new Float64Array(m * m);
    scaledBlock(scope, active, scaled);
    let left = leftNullVector(scaled, m).vector;
    const along = before ? left.reduce((sum, value, a) => sum + value * before.left[a], 0) : 1;
    if (along < 0) left = left.map((value) => -value);
    // From scaled coordinates back to the model's: v_i S_i, w_i / S_i.
    const v = system.vectorOf(x).map((value, a) => value * scope.stateScale[active[a]]);
    const w = left.map((value, a) => value / scope.stateScale[active[a]]);
    const { numerator, denominator } = foldForm(scope.system, u, active, v, w);
    const kinked = kinkNear(scope.system, u, active, scope.stateScale);
    return { quadratic: kinked ? NaN : numerator, overlap: denominator, left };
  }

  private lyapunov(u: Float64Array, omega: number): number {
    const { scope, active } = this.system;
    if (kinkNear(scope.system, u, active, scope.stateScale)) return NaN;
    return firstLyapunovCoefficient(scope.system, u, scope.J, active, omega);
  }
}

/** All but the eigenvalue nearest to zero, or but the pair nearest to +- i omega (+- sqrt(-kappa) where real). */
function withoutCritical(all: readonly Eigenvalue[], kappa: number): readonly Eigenvalue[] {
  if (Number.isNaN(kappa)) {
    const nearest = indexOfNearest(all, 0, 0, -1);
    return all.filter((_, k) => k !== nearest);
  }
  const [re, im] = kappa >= 0 ? [0, Math.sqrt(kappa)] : [Math.sqrt(-kappa), 0];
  const one = indexOfNearest(all, re, im, -1);
  const other = indexOfNearest(all, -re, -im, one);
  return all.filter((_, k) => k !== one && k !== other);
}

function indexOfNearest(all: readonly Eigenvalue[], re: number, im: number, besides: number): number {
  let best = -1;
  let least = Infinity;
  all.forEach((value, k) => {
    const distance = Math.hypot(value.re - re, value.im - im);
    if (k !== besides && distance < least) [best, least] = [k, distance];
  });
  return best;
}
