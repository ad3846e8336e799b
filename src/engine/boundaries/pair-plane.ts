import { nullVector } from '../linalg/null-vector';
import { solveLinear } from '../linalg/solve';

/**
 * The plane of a double zero eigenvalue of A (m*m): its null vector, and a generalised one with A im ~ re. Used
 * where a Hopf curve begins at a Bogdanov-Takens point.
 */
export function nullspace2(A: Float64Array, m: number): { re: Float64Array; im: Float64Array } {
  const { vector } = nullVector(A, m);
  // Bordered by the null vector, A is regular: A im + b re = re, <re, im> = 0.
  const size = m + 1;
  const bordered = new Float64Array(size * size);
  const right = new Float64Array(size);
  for (let a = 0; a < m; a += 1) {
    for (let b = 0; b < m; b += 1) bordered[a * size + b] = A[a * m + b];
    bordered[a * size + m] = leftOf(A, m)[a];
    bordered[m * size + a] = vector[a];
    right[a] = vector[a];
  }
  const solved = solveLinear(bordered, right, size);
  return { re: vector, im: solved ? solved.slice(0, m) : vector.map((_, a) => (a === 0 ? 1 : 0)) };
}

function leftOf(A: Float64Array, m: number): Float64Array {
  const transposed = new Float64Array(m * m);
  for (let a = 0; a < m; a += 1) for (let b = 0; b < m; b += 1) transposed[b * m + a] = A[a * m + b];
  return nullVector(transposed, m).vector;
}
