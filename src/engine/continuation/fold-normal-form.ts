import type { CompiledSystem } from '../system/contract';

/**
 * Quadratic coefficient of a fold (or of the boundary crossing of one class): on the line of the null vector the
 * motion is x' = a x^2 + ..., with
 *
 *     a = <w, B(v, v)> / (2 <w, v>),   A v = 0,   A' w = 0,   B the second derivative of f.
 *
 * Source: Kuznetsov, Elements of Applied Bifurcation Theory, section 3.3 and chapter 5 (from memory). Its
 * size depends on the units of v, its zero (a cusp) does not.
 *
 * @param u state at the point, all n states; parameters are those set on the system
 * @param v, w right and left null vectors among the active states, in their order
 * @returns numerator <w, B(v, v)> / 2 and denominator <w, v>; the latter is zero at a Bogdanov-Takens point
 */
export function foldForm(
  system: CompiledSystem,
  u: Float64Array,
  active: readonly number[],
  v: Float64Array,
  w: Float64Array,
): { readonly numerator: number; readonly denominator: number } {
  const n = system.dimension;
  const direction = new Float64Array(n);
  active.forEach((i, a) => (direction[i] = v[a]));
  const jet = new Float64Array(3 * n);
  system.directional(0, u, direction, jet);
  let [numerator, denominator] = [0, 0];
  active.forEach((i, a) => {
    numerator += (w[a] * jet[n + i]) / 2;
    denominator += w[a] * v[a];
  });
  return { numerator, denominator };
}
