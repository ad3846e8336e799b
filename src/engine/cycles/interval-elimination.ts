/**
 * Solves [A | B] by Gaussian elimination with partial pivoting, in place: on return the columns of B hold
 * A^-1 B. Row-major, `rows` rows of `rows + columns` entries.
 *
 * @returns false where A is singular or not finite
 */
export function solveAugmented(a: Float64Array, rows: number, columns: number): boolean {
  const width = rows + columns;
  for (let c = 0; c < rows; c += 1) {
    let pivotRow = c;
    let largest = Math.abs(a[c * width + c]);
    for (let r = c + 1; r < rows; r += 1) {
      const value = Math.abs(a[r * width + c]);
      if (value > largest) {
        largest = value;
        pivotRow = r;
      }
    }
    if (!(largest > 0) || largest === Infinity) return false;
    if (pivotRow !== c)
      for (let j = c; j < width; j += 1) {
        const value = a[c * width + j];
        a[c * width + j] = a[pivotRow * width + j];
        a[pivotRow * width + j] = value;
      }
    const pivot = a[c * width + c];
    for (let r = c + 1; r < rows; r += 1) {
      const factor = a[r * width + c] / pivot;
      if (factor === 0) continue;
      for (let j = c + 1; j < width; j += 1) a[r * width + j] -= factor * a[c * width + j];
    }
  }
  for (let c = rows - 1; c >= 0; c -= 1) {
    const pivot = a[c * width + c];
    for (let j = rows; j < width; j += 1) {
      let sum = a[c * width + j];
      for (let l = c + 1; l < rows; l += 1) sum -= a[c * width + l] * a[l * width + j];
      a[c * width + j] = sum / pivot;
    }
  }
  return true;
}
