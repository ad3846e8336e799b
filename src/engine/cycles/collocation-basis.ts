/**
 * Lagrange basis of degree m on one mesh interval [0, 1] with nodes j/m, evaluated at the m Gauss points.
 * Polynomials of degree m that satisfy u' = f at the Gauss points are accurate to order 2m at the mesh
 * points and m + 1 between them (de Boor & Swartz 1973, from memory).
 */
export interface CollocationBasis {
  /** Degree m, and number of Gauss points. */
  readonly m: number;
  /** Gauss points and weights on [0, 1], length m. */
  readonly points: Float64Array;
  readonly weights: Float64Array;
  /** values[i*(m+1) + j] = L_j(c_i); slopes[i*(m+1) + j] = L_j'(c_i). */
  readonly values: Float64Array;
  readonly slopes: Float64Array;
  /** Coefficient of x^m of each L_j, times m!: the m-th derivative of the interpolant, length m + 1. */
  readonly highest: Float64Array;
}

const NEWTON_STEPS = 50;

/** Zeros of the Legendre polynomial P_m and weights, moved to [0, 1], by Newton's method (textbook). */
function gaussRule(m: number): { points: Float64Array; weights: Float64Array } {
  const points = new Float64Array(m);
  const weights = new Float64Array(m);
  for (let k = 0; k < m; k += 1) {
    let x = -Math.cos((Math.PI * (k + 0.75)) / (m + 0.5));
    let slope = 1;
    for (let step = 0; step < NEWTON_STEPS; step += 1) {
      let [before, value] = [1, x];
      for (let j = 2; j <= m; j += 1)
        [before, value] = [value, ((2 * j - 1) * x * value - (j - 1) * before) / j];
      slope = (m * (x * value - before)) / (x * x - 1);
      const move = value / slope;
      x -= move;
      if (Math.abs(move) < 1e-16) break;
    }
    points[k] = (1 + x) / 2;
    weights[k] = 1 / ((1 - x * x) * slope * slope);
  }
  return { points, weights };
}

/** L_j(x) for all j into `out` (m + 1). */
export function lagrangeValues(m: number, x: number, out: Float64Array): void {
  for (let j = 0; j <= m; j += 1) {
    let product = 1;
    for (let k = 0; k <= m; k += 1) if (k !== j) product *= (m * x - k) / (j - k);
    out[j] = product;
  }
}

/** L_j'(x) for all j into `out` (m + 1). */
export function lagrangeSlopes(m: number, x: number, out: Float64Array): void {
  for (let j = 0; j <= m; j += 1) {
    let sum = 0;
    for (let l = 0; l <= m; l += 1) {
      if (l === j) continue;
      let product = m / (j - l);
      for (let k = 0; k <= m; k += 1) if (k !== j && k !== l) product *= (m * x - k) / (j - k);
      sum += product;
    }
    out[j] = sum;
  }
}

export function createBasis(m: number): CollocationBasis {
  const { points, weights } = gaussRule(m);
  const values = new Float64Array(m * (m + 1));
  const slopes = new Float64Array(m * (m + 1));
  for (let i = 0; i < m; i += 1) {
    lagrangeValues(m, points[i], values.subarray(i * (m + 1), (i + 1) * (m + 1)));
    lagrangeSlopes(m, points[i], slopes.subarray(i * (m + 1), (i + 1) * (m + 1)));
  }
  const highest = new Float64Array(m + 1);
  for (let j = 0; j <= m; j += 1) {
    let product = 1;
    for (let k = 1; k <= m; k += 1) product *= k;
    for (let k = 0; k <= m; k += 1) if (k !== j) product *= m / (j - k);
    highest[j] = product;
  }
  return { m, points, weights, values, slopes, highest };
}
