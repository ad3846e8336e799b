/** Steps of the root search: bisection alone would get from 1 to rounding in 53. */
const MOST_STEPS = 60;

/**
 * Root of g in [0, 1] from its values of different sign at the ends, by false position with halving
 * (Illinois rule), with a bisection wherever that does not shrink the bracket fast enough.
 *
 * @param atStart g(0). @param atEnd g(1). @returns theta, within `tolerance`.
 */
export function rootInStep(
  g: (theta: number) => number,
  atStart: number,
  atEnd: number,
  tolerance = 4 * Number.EPSILON,
): number {
  let low = 0;
  let high = 1;
  let gLow = atStart;
  let gHigh = atEnd;
  let width = 1;
  for (let k = 0; k < MOST_STEPS && high - low > tolerance; k += 1) {
    const slow = k % 3 === 2 && high - low > width / 8;
    if (k % 3 === 2) width = high - low;
    const theta = slow ? (low + high) / 2 : low - (gLow * (high - low)) / (gHigh - gLow);
    if (!(theta > low && theta < high)) break;
    const value = g(theta);
    if (value === 0) return theta;
    if (value > 0 === atStart > 0) {
      low = theta;
      gLow = value;
      if (!slow) gHigh /= 2;
    } else {
      high = theta;
      gHigh = value;
      if (!slow) gLow /= 2;
    }
  }
  return Math.abs(gLow) < Math.abs(gHigh) ? low : high;
}
