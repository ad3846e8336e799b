/** Powers of the floating point radix keep the scaling free of rounding. */
const RADIX = 2;
/** A row and column count as balanced when scaling would gain less than this on their sum. */
const WORTH_SCALING = 0.95;

/**
 * Scales A by a diagonal similarity so that rows and columns have sums of like size, in place.
 * Eigenvalues stay; those of badly scaled matrices become far more exact.
 * Source: Parlett & Reinsch, Numer. Math. 13 (1969) 293 (from memory).
 */
export function balanceMatrix(a: Float64Array, n: number): void {
  let settled = false;
  while (!settled) {
    settled = true;
    for (let i = 0; i < n; i += 1) if (balanceRow(a, n, i)) settled = false;
  }
}

function balanceRow(a: Float64Array, n: number, i: number): boolean {
  let column = 0;
  let row = 0;
  for (let j = 0; j < n; j += 1) {
    if (j === i) continue;
    column += Math.abs(a[j * n + i]);
    row += Math.abs(a[i * n + j]);
  }
  if (!(column > 0 && row > 0) || column === Infinity || row === Infinity) return false;
  const sum = column + row;
  let scale = 1;
  while (column < row / RADIX) {
    scale *= RADIX;
    column *= RADIX * RADIX;
  }
  while (column > row * RADIX) {
    scale /= RADIX;
    column /= RADIX * RADIX;
  }
  if (scale === 1 || (column + row) / scale >= WORTH_SCALING * sum) return false;
  for (let j = 0; j < n; j += 1) a[i * n + j] /= scale;
  for (let j = 0; j < n; j += 1) a[j * n + i] *= scale;
  return true;
}
