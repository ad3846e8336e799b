import { Matrix, SingularValueDecomposition } from 'ml-matrix';

/** Singular values below this share of the largest count as zero. */
const NULL_TOLERANCE = 1e-10;

/**
 * Orthonormal basis of { x : M x = 0 } by singular values. For checks and structure, not for loops.
 *
 * @param matrix rows*cols, row-major; not written to.
 * @param tolerance relative to the largest singular value.
 * @returns Basis vectors of length cols, none where the columns are independent; the whole space for a
 *   zero matrix. Empty as well where the matrix holds non-finite numbers.
 */
export function nullspace(
  matrix: ArrayLike<number>,
  rows: number,
  cols: number,
  tolerance = NULL_TOLERANCE,
): Float64Array[] {
  // Padded with zero rows, since the decomposition wants at least as many rows as columns.
  const padded = Matrix.zeros(Math.max(rows, cols), cols);
  for (let i = 0; i < rows; i += 1)
    for (let j = 0; j < cols; j += 1) {
      const value = matrix[i * cols + j];
      if (!Number.isFinite(value)) return [];
      padded.set(i, j, value);
    }
  const decomposition = new SingularValueDecomposition(padded, { autoTranspose: false });
  const values = decomposition.diagonal;
  const vectors = decomposition.rightSingularVectors;
  const basis: Float64Array[] = [];
  for (let j = 0; j < cols; j += 1)
    if (values[j] <= tolerance * values[0]) basis.push(Float64Array.from(vectors.getColumn(j)));
  return basis;
}
