import type { CompiledSystem } from '../system/contract';

/**
 * Jacobian of the composition alone: the modes in which population totals stay and only the shares of
 * the classes change. With S the matrix that sums the classes of each population, these modes are the
 * eigenvectors in the kernel of S, an invariant subspace where S J = J' S for some J', that is, where
 * the totals' linear dynamics do not depend on composition. A basis of the kernel: one class up, the
 * population's first class down by as much.
 *
 * Returns the matrix of J on that basis (row-major, own array) with its size, or null where
 * the totals depend on composition, so that no such modes exist. Size 0 where no population is split.
 */
export const COMPOSITION_TOLERANCE = 1e-9;

export function compositionJacobian(
  system: CompiledSystem,
  J: Float64Array,
): { readonly matrix: Float64Array; readonly size: number } | null {
  const n = system.dimension;
  const moves = system.populations.flatMap((population) =>
    population.states.slice(1).map((up) => ({ up, down: population.states[0] })),
  );
  const size = moves.length;
  const matrix = new Float64Array(size * size);
  let norm = 0;
  for (let k = 0; k < n * n; k += 1) norm = Math.max(norm, Math.abs(J[k]));
  for (let b = 0; b < size; b += 1) {
    const { up, down } = moves[b];
    const column = Float64Array.from({ length: n }, (_, i) => J[i * n + up] - J[i * n + down]);
    for (const population of system.populations) {
      const leak = population.states.reduce((sum, i) => sum + column[i], 0);
      if (Math.abs(leak) > COMPOSITION_TOLERANCE * norm) return null;
    }
    for (let a = 0; a < size; a += 1) matrix[a * size + b] = column[moves[a].up];
  }
  return { matrix, size };
}
