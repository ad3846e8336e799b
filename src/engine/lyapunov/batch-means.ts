/**
 * Half-width of a 95 % confidence interval of a mean over time, by the method of batch means: the time
 * observed is cut into K batches of equal length, whose means scatter with variance s^2, and
 *
 *     half-width = t(0.975, K - 1) s / sqrt(K).
 *
 * Sound where a batch is longer than the memory of the solution. Source: Law & Kelton, Simulation
 * Modeling and Analysis, sect. 9.5 (from memory).
 *
 * @param means the means of the batches. @returns Infinity for fewer than two batches.
 */
export function batchHalfWidth(means: ArrayLike<number>): number {
  const count = means.length;
  if (count < 2) return Infinity;
  let mean = 0;
  for (let k = 0; k < count; k += 1) mean += means[k] / count;
  let squares = 0;
  for (let k = 0; k < count; k += 1) squares += (means[k] - mean) ** 2;
  return studentQuantile(count - 1) * Math.sqrt(squares / (count - 1) / count);
}

/** Two-sided 95 % quantiles of Student's distribution where the expansion below is too coarse. */
const FEW = [12.706, 4.303, 3.182, 2.776];
const NORMAL = 1.959963984540054;

/**
 * 0.975 quantile of Student's distribution by the expansion of Cornish and Fisher in 1/degrees, good to
 * 0.002 from five degrees on. Source: Abramowitz & Stegun, eq. 26.7.5 (from memory).
 */
export function studentQuantile(degrees: number): number {
  if (degrees <= FEW.length) return FEW[degrees - 1];
  const z = NORMAL;
  const g1 = (z ** 3 + z) / 4;
  const g2 = (5 * z ** 5 + 16 * z ** 3 + 3 * z) / 96;
  const g3 = (3 * z ** 7 + 19 * z ** 5 + 17 * z ** 3 - 15 * z) / 384;
  return z + g1 / degrees + g2 / degrees ** 2 + g3 / degrees ** 3;
}

/**
 * Means of batches from running integrals recorded at evenly spaced times: integrals[k] up to times[k],
 * `from` the time at which they began. At most `most` batches, each of the same number of records; the
 * records left over at the beginning are dropped.
 */
export function batchMeans(
  times: ArrayLike<number>,
  integrals: ArrayLike<number>,
  from: number,
  most: number,
): Float64Array {
  const records = times.length;
  const each = Math.ceil(records / most);
  const count = Math.floor(records / Math.max(each, 1));
  const first = records - count * each;
  const timeAt = (k: number): number => (k < 0 ? from : times[k]);
  const integralAt = (k: number): number => (k < 0 ? 0 : integrals[k]);
  return Float64Array.from({ length: count }, (_, b) => {
    const start = first + b * each - 1;
    const end = start + each;
    return (integralAt(end) - integralAt(start)) / (timeAt(end) - timeAt(start));
  });
}
