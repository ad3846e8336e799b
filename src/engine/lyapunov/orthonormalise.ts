/**
 * Makes the columns of an n x m matrix orthonormal, Q R = W, by modified Gram-Schmidt done twice, which
 * keeps them orthogonal to rounding (Giraud, Langou & Rozloznik, Computers & Mathematics with
 * Applications 50 (2005) 1069, from memory).
 *
 * @param columns column after column, each of length n; overwritten by Q
 * @param logs length m; receives log R_jj, the growth of the j-th axis of the displacements
 * @returns False where a column vanished or was not finite; it is then replaced by a unit vector that
 *   is orthogonal to those before it, and its logarithm is -Infinity or NaN.
 */
export function orthonormalise(columns: Float64Array, n: number, m: number, logs: Float64Array): boolean {
  let sound = true;
  for (let j = 0; j < m; j += 1) {
    const at = j * n;
    const before = norm(columns, at, n);
    for (let pass = 0; pass < 2; pass += 1) subtractEarlier(columns, n, j);
    const length = norm(columns, at, n);
    logs[j] = Math.log(length);
    if (length > 0 && length > before * Number.EPSILON && Number.isFinite(length)) {
      for (let i = 0; i < n; i += 1) columns[at + i] /= length;
      continue;
    }
    sound = false;
    replaceColumn(columns, n, j);
  }
  return sound;
}

function subtractEarlier(columns: Float64Array, n: number, j: number): void {
  const at = j * n;
  for (let k = 0; k < j; k += 1) {
    let along = 0;
    for (let i = 0; i < n; i += 1) along += columns[k * n + i] * columns[at + i];
    for (let i = 0; i < n; i += 1) columns[at + i] -= along * columns[k * n + i];
  }
}

function replaceColumn(columns: Float64Array, n: number, j: number): void {
  const at = j * n;
  for (let axis = 0; axis < n; axis += 1) {
    columns.fill(0, at, at + n);
    columns[at + axis] = 1;
    for (let pass = 0; pass < 2; pass += 1) subtractEarlier(columns, n, j);
    const length = norm(columns, at, n);
    // Among n unit vectors one always keeps at least this much outside the span of the others.
    if (length * length < 0.5 / n) continue;
    for (let i = 0; i < n; i += 1) columns[at + i] /= length;
    return;
  }
}

function norm(values: Float64Array, at: number, n: number): number {
  let sum = 0;
  for (let i = 0; i < n; i += 1) sum += values[at + i] * values[at + i];
  return Math.sqrt(sum);
}

/** Fills n x m columns with the first m unit vectors turned a little, so that none lies in an invariant face. */
export function initialColumns(n: number, m: number): Float64Array {
  const columns = new Float64Array(n * m);
  for (let j = 0; j < m; j += 1)
    for (let i = 0; i < n; i += 1) columns[j * n + i] = (i === j ? 1 : 0) + 0.1 * Math.sin(1 + i + 3 * j);
  orthonormalise(columns, n, m, new Float64Array(m));
  return columns;
}
