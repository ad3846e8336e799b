import type { CompiledSystem } from '../system/contract';
import type { NewtonProblem } from './newton';

/**
 * Size given to an absent state where the model is 0/0 at exact zero (a mating function of degree one):
 * small enough that every term beyond the first order vanishes, large enough that a product of
 * four such sizes does not underflow.
 */
export const WHISKER = 1e-60;

/** A face of the state space: the free states vary, the absent ones rest at zero. */
export interface Face {
  readonly free: readonly number[];
  readonly absent: readonly number[];
  /** True where the model is 0/0 on the face, so that it is evaluated a hair off it. */
  readonly whisker: boolean;
  /** Free states whose own absence lasts too: f_i = u_i g_i, so that g can be solved instead of f. */
  readonly ownZero: readonly boolean[];
}

/** The face that is the whole space. */
export function wholeSpace(system: CompiledSystem): Face {
  const free = Array.from({ length: system.dimension }, (_, i) => i);
  return { free, absent: [], whisker: false, ownZero: free.map(() => false) };
}

/**
 * The system restricted to a face, as a square problem for Newton's method.
 * With `perCapita` the rows of states that breed true are divided by the state, g_i = f_i/u_i, which
 * takes the zero of that state out of the problem: J_g[i][j] = (J_ij - delta_ij g_i)/u_i.
 */
export function faceProblem(system: CompiledSystem, face: Face, perCapita: boolean): NewtonProblem {
  const n = system.dimension;
  const m = face.free.length;
  const u = new Float64Array(n);
  const f = new Float64Array(n);
  const J = new Float64Array(n * n);
  const divided = face.free.map((_, a) => perCapita && face.ownZero[a]);

  const lift = (x: Float64Array): void => {
    u.fill(0);
    if (face.whisker) for (const i of face.absent) u[i] = WHISKER;
    for (let a = 0; a < m; a += 1) u[face.free[a]] = x[a];
  };
  return {
    dimension: m,
    residual(x, out) {
      lift(x);
      system.rhs(0, u, f);
      for (let a = 0; a < m; a += 1) {
        const i = face.free[a];
        out[a] = divided[a] ? f[i] / u[i] : f[i];
      }
    },
    jacobian(x, out) {
      lift(x);
      system.jacobian(0, u, J);
      if (perCapita) system.rhs(0, u, f);
      for (let a = 0; a < m; a += 1) {
        const i = face.free[a];
        for (let b = 0; b < m; b += 1) out[a * m + b] = J[i * n + face.free[b]];
        if (!divided[a]) continue;
        out[a * m + a] = out[a * m + a] - f[i] / u[i];
        for (let b = 0; b < m; b += 1) out[a * m + b] = out[a * m + b] / u[i];
      }
    },
  };
}

/** Full state of a point on a face. */
export function liftState(face: Face, x: Float64Array, dimension: number): Float64Array {
  const u = new Float64Array(dimension);
  face.free.forEach((i, a) => {
    u[i] = x[a];
  });
  return u;
}

/** Coordinates on a face of a full state. */
export function dropState(face: Face, u: Float64Array): Float64Array {
  return Float64Array.from(face.free, (i) => u[i]);
}
