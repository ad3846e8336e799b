/**
 * Nonzero weights of a row of coefficients, and where the stages they belong to begin in a flat array
 * of slopes. Padded with zero weights to a multiple of four.
 */
export interface SparseRow {
  readonly offsets: Int32Array;
  readonly weights: Float64Array;
}

/** Terms taken together in `addWeighted`. */
const BLOCK = 4;

/** @param n length of one slope */
export function sparseRow(row: readonly number[], n: number): SparseRow {
  const stages = row.flatMap((weight, j) => (weight === 0 ? [] : [j]));
  const length = Math.ceil(stages.length / BLOCK) * BLOCK;
  const offsets = new Int32Array(length);
  const weights = new Float64Array(length);
  stages.forEach((j, q) => {
    offsets[q] = j * n;
    weights[q] = row[j];
  });
  return { offsets, weights };
}

/**
 * out[at + i] += h sum of weight * slopes[offset + i]. Four terms at a time: with the few states of a
 * population model a loop over single terms costs more than its arithmetic.
 */
export function addWeighted(
  { offsets, weights }: SparseRow,
  h: number,
  slopes: Float64Array,
  n: number,
  out: Float64Array,
  at = 0,
): void {
  for (let q = 0; q < offsets.length; q += BLOCK) {
    const a = offsets[q];
    const b = offsets[q + 1];
    const c = offsets[q + 2];
    const d = offsets[q + 3];
    const wa = h * weights[q];
    const wb = h * weights[q + 1];
    const wc = h * weights[q + 2];
    const wd = h * weights[q + 3];
    for (let i = 0; i < n; i += 1)
      out[at + i] += wa * slopes[a + i] + wb * slopes[b + i] + wc * slopes[c + i] + wd * slopes[d + i];
  }
}
