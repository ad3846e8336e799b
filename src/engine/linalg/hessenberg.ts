/**
 * Reduces A to upper Hessenberg form by Householder reflections, a similarity, in place; entries
 * below the subdiagonal are set to zero.
 * Source: Golub & Van Loan, algorithm 7.4.2 (from memory). Cost about 10 n^3 / 3.
 *
 * @param work length n, overwritten.
 */
export function reduceToHessenberg(a: Float64Array, n: number, work: Float64Array): void {
  for (let k = 0; k < n - 2; k += 1) {
    let scale = 0;
    for (let i = k + 2; i < n; i += 1) scale += Math.abs(a[i * n + k]);
    if (scale === 0) continue;
    scale += Math.abs(a[(k + 1) * n + k]);
    let squares = 0;
    for (let i = k + 1; i < n; i += 1) {
      work[i] = a[i * n + k] / scale;
      squares += work[i] * work[i];
    }
    const length = work[k + 1] > 0 ? -Math.sqrt(squares) : Math.sqrt(squares);
    // v'v / 2 for v = x - length e1.
    const half = squares - work[k + 1] * length;
    work[k + 1] -= length;
    for (let j = k + 1; j < n; j += 1) {
      let dot = 0;
      for (let i = k + 1; i < n; i += 1) dot += work[i] * a[i * n + j];
      dot /= half;
      for (let i = k + 1; i < n; i += 1) a[i * n + j] -= dot * work[i];
    }
    for (let i = 0; i < n; i += 1) {
      let dot = 0;
      for (let j = k + 1; j < n; j += 1) dot += work[j] * a[i * n + j];
      dot /= half;
      for (let j = k + 1; j < n; j += 1) a[i * n + j] -= dot * work[j];
    }
    a[(k + 1) * n + k] = scale * length;
    for (let i = k + 2; i < n; i += 1) a[i * n + k] = 0;
  }
}
