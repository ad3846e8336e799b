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
  if (cols === 0) return [];
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

/** Entries below this share of the largest of all count as zero during elimination. */
const ECHELON_TOLERANCE = 1e-9;

/**
 * Brings vectors to reduced row echelon form in place: each has a leading 1 where the others have 0, so
 * that a basis found by singular values becomes one that can be read. Vectors that depend on earlier
 * ones become zero. Gauss-Jordan elimination with the largest entry of each column as pivot.
 */
export function reduceToEchelon(vectors: readonly Float64Array[]): void {
  const cols = vectors[0]?.length ?? 0;
  const rows = [...vectors];
  let size = 0;
  for (const row of rows) for (const value of row) size = Math.max(size, Math.abs(value));
  let rank = 0;
  for (let j = 0; j < cols && rank < rows.length; j += 1) {
    let best = rank;
    for (let i = rank + 1; i < rows.length; i += 1)
      if (Math.abs(rows[i][j]) > Math.abs(rows[best][j])) best = i;
    if (!(Math.abs(rows[best][j]) > ECHELON_TOLERANCE * size)) {
      for (let i = rank; i < rows.length; i += 1) rows[i][j] = 0;
      continue;
    }
    [rows[rank], rows[best]] = [rows[best], rows[rank]];
    const lead = rows[rank];
    const pivot = lead[j];
    for (let k = 0; k < cols; k += 1) lead[k] /= pivot;
    for (const row of rows) {
      const factor = row[j];
      if (row === lead || factor === 0) continue;
      for (let k = 0; k < cols; k += 1) row[k] -= factor * lead[k];
      row[j] = 0;
    }
    rank += 1;
  }
}
