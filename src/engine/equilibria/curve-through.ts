import { nullVector } from '../linalg/null-vector';
import type { CompiledSystem } from '../system/contract';
import { dropState, faceProblem, liftState, type Face } from './face-system';
import { newton } from './newton';

/**
 * Whether equilibria continue on a curve through u: from points off u along the null vector of J,
 * Newton's method must arrive at other equilibria near by, at two distances.
 * A fold or a branch point sends it back to u or nowhere.
 */
const DISTANCES = [1e-5, 1e-4];

export function curveThrough(
  system: CompiledSystem,
  u: Float64Array,
  face: Face,
  J: Float64Array,
  scale: Float64Array,
): boolean {
  const n = system.dimension;
  const m = face.free.length;
  if (m === 0) return false;
  const block = new Float64Array(m * m);
  for (let a = 0; a < m; a += 1)
    for (let b = 0; b < m; b += 1) block[a * m + b] = J[face.free[a] * n + face.free[b]];
  const direction = nullVector(block, m).vector;
  const problem = faceProblem(system, face, false);
  const x = dropState(face, u);
  const size = dropState(face, scale);
  const reach = Math.max(...direction.map((d, a) => Math.abs(d) / size[a]));
  const arrives = (distance: number): boolean => {
    const start = x.map((value, a) => value + (distance / reach) * direction[a]);
    const outcome = newton(problem, start, { scale: size, maximumIterations: 20 });
    if (outcome.status !== 'converged') return false;
    const state = liftState(face, outcome.state, n);
    if (state.some((value, i) => system.nonnegative[i] && value < 0)) return false;
    const moved = Math.max(...outcome.state.map((value, a) => Math.abs(value - x[a]) / size[a]));
    return moved > distance / 3 && moved < 3 * distance;
  };
  return [1, -1].some((side) => DISTANCES.every((distance) => arrives(side * distance)));
}
