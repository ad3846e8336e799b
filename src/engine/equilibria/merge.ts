/** States closer than this, relative to each state, are one equilibrium. */
export const MERGE_TOLERANCE = 1e-7;
/** States below this share of their scale are compared against it. */
const FLOOR = 1e-7;

/**
 * Whether two states are the same equilibrium. Differences are relative to each state, so that
 * equilibria of small densities stay apart; where a root is badly known (near a fold), its own
 * accuracy widens the comparison.
 */
export function sameState(a: Float64Array, b: Float64Array, scale: Float64Array, accuracy: number): boolean {
  const tolerance = Math.max(MERGE_TOLERANCE, Math.min(10 * accuracy, 1e-3));
  for (let i = 0; i < a.length; i += 1) {
    const size = Math.max(Math.abs(a[i]), Math.abs(b[i]), FLOOR * scale[i]);
    if (Math.abs(a[i] - b[i]) > tolerance * size) return false;
  }
  return true;
}
