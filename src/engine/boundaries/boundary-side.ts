import { eigenvalues } from '../linalg/eigenvalues';
import { luFactor, luSolve } from '../linalg/lu';
import type { BoundaryPoint } from './boundary-monitor';
import type { BoundaryKind } from './contract';
import type { DefiningSystem } from './defining-system';

/** Distance, in scaled parameters, at which the two sides are looked at. */
const BESIDE = 1e-4;
const NEWTON_STEPS = 12;

/**
 * Unit normal of the curve, in scaled parameters, towards the side where the equilibrium attracts; NaN where
 * something else repels on both sides, and where the side cannot be told. At a fold that is the side where the
 * two equilibria exist, one of which attracts.
 */
export function stableSide(
  system: DefiningSystem,
  kind: BoundaryKind,
  point: BoundaryPoint,
): { readonly matters: boolean; readonly normal: readonly [number, number] } {
  const nowhere = { matters: false, normal: [NaN, NaN] as const };
  if (point.growing > 0) return nowhere;
  const { size } = system;
  const [t1, t2] = [point.tangent[size - 2], point.tangent[size - 1]];
  const length = Math.hypot(t1, t2);
  if (!(length > 1e-9)) return { ...nowhere, matters: true };
  const normal = [-t2 / length, t1 / length] as const;
  const side = kind === 'fold' ? foldSide(system, point, normal) : growthSide(system, point, normal);
  if (side === 0) return { ...nowhere, matters: true };
  return { matters: true, normal: [side * normal[0], side * normal[1]] };
}

/** By the sign of the critical real part of the equilibrium followed to both sides. */
function growthSide(
  system: DefiningSystem,
  point: BoundaryPoint,
  normal: readonly [number, number],
): -1 | 0 | 1 {
  const growth = [1, -1].map((sign) => criticalPart(system, point, sign * BESIDE, normal));
  const [ahead, behind] = growth;
  if (!Number.isFinite(ahead) || !Number.isFinite(behind) || ahead === behind) return 0;
  return ahead < behind ? 1 : -1;
}

/** Largest real part at the equilibrium beside the curve: the others decay, so it is the critical one. */
function criticalPart(
  { scope, active }: DefiningSystem,
  point: BoundaryPoint,
  distance: number,
  [n1, n2]: readonly [number, number],
): number {
  const u = point.u.slice();
  const first = point.first + distance * n1 * scope.firstScale;
  const second = point.second + distance * n2 * scope.secondScale;
  const m = active.length;
  const J = new Float64Array(m * m);
  const f = new Float64Array(m);
  const pivots = new Int32Array(m);
  for (let k = 0; k < NEWTON_STEPS; k += 1) {
    if (!scope.load(first, second, u)) return NaN;
    active.forEach((i, a) => {
      f[a] = scope.f[i];
      active.forEach((j, b) => (J[a * m + b] = scope.J[i * scope.n + j]));
    });
    if (luFactor(J, m, pivots) === 0) return NaN;
    luSolve(J, m, pivots, f);
    let step = 0;
    active.forEach((i, a) => {
      u[i] -= f[a];
      step = Math.max(step, Math.abs(f[a]) / scope.stateScale[i]);
    });
    if (step < 1e-12) break;
  }
  if (!scope.load(first, second, u)) return NaN;
  const found = eigenvalues(scope.J, scope.n);
  return found.converged ? found.re[0] : NaN;
}

/**
 * Where the equilibria exist: x' = <w, f_p n> e + a x^2 has rest points where the two terms have opposite
 * signs.
 */
function foldSide(
  { scope, active }: DefiningSystem,
  point: BoundaryPoint,
  [n1, n2]: readonly [number, number],
): -1 | 0 | 1 {
  if (!Number.isFinite(point.quadratic) || point.quadratic === 0) return 0;
  scope.setParameters(point.first, point.second);
  const [fa, fb] = [new Float64Array(scope.n), new Float64Array(scope.n)];
  scope.system.parameterDerivative(0, point.u, scope.firstIndex, fa);
  scope.system.parameterDerivative(0, point.u, scope.secondIndex, fb);
  let push = 0;
  active.forEach((i, a) => {
    const move = fa[i] * n1 * scope.firstScale + fb[i] * n2 * scope.secondScale;
    push += (point.left[a] / scope.stateScale[i]) * move;
  });
  if (push === 0 || !Number.isFinite(push)) return 0;
  return push * point.quadratic < 0 ? 1 : -1;
}
