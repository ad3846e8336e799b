import { createEigenWorkspace, eigenvaluesInto } from '../linalg/eigenvalues';
import { luFactor, luSolve } from '../linalg/lu';
import type { CompiledSystem } from '../system/contract';

/**
 * Equilibria and their stability margins in many cells of a map at once: the inner loop of a margin map,
 * behind a shape that compiled code can take over.
 */
export interface MarginCells {
  /**
   * For each k below `count`: sets the two parameters to x[k] and y[k], goes by Newton's method from
   * states[k*n ...] to an equilibrium and writes it there, with its margin to margins[k]. NaN, and the state
   * as it was, where Newton's method did not converge.
   */
  solve(count: number, x: Float64Array, y: Float64Array, states: Float64Array, margins: Float64Array): void;
}

export const MARGIN_CELL_DEFAULTS = {
  maximumIterations: 12,
  /** A correction this small, relative to the state, is the last; the Jacobian need not be taken anew. */
  last: 1e-11,
  /** After a correction this small the next would be below rounding. */
  nearLast: 1e-6,
  /** States below this share of the largest are measured against it. */
  floor: 1e-9,
} as const;

/**
 * Margin = - max Re lambda(J(u*)), u* from u <- u - J^-1 f. Nothing is allocated after construction.
 *
 * @param p parameters in the order of the system, owned by the caller; the entries at the two columns are written
 */
export function marginCells(
  system: CompiledSystem,
  p: Float64Array,
  columns: readonly [number, number],
): MarginCells {
  const n = system.dimension;
  const u = new Float64Array(n);
  const f = new Float64Array(n);
  const J = new Float64Array(n * n);
  const lu = new Float64Array(n * n);
  const pivots = new Int32Array(n);
  const workspace = createEigenWorkspace(n);
  const re = new Float64Array(n);
  const im = new Float64Array(n);

  /** Brings `u` to an equilibrium and leaves its Jacobian in J; false where that fails. */
  const settle = (): boolean => {
    for (let iteration = 0; iteration < MARGIN_CELL_DEFAULTS.maximumIterations; iteration += 1) {
      system.rhs(0, u, f);
      system.jacobian(0, u, J);
      lu.set(J);
      if (luFactor(lu, n, pivots) === 0) return false;
      luSolve(lu, n, pivots, f);
      let size = 0;
      for (let i = 0; i < n; i += 1) size = Math.max(size, Math.abs(u[i]));
      let length = 0;
      for (let i = 0; i < n; i += 1) {
        const own = Math.max(Math.abs(u[i]), MARGIN_CELL_DEFAULTS.floor * size);
        const move = Math.abs(f[i]) / own;
        if (!(move <= length)) length = move;
        u[i] -= f[i];
      }
      if (!Number.isFinite(length)) return false;
      if (length <= MARGIN_CELL_DEFAULTS.last) return true;
      if (length > MARGIN_CELL_DEFAULTS.nearLast) continue;
      system.jacobian(0, u, J);
      return true;
    }
    return false;
  };

  return {
    solve(count, x, y, states, margins) {
      for (let k = 0; k < count; k += 1) {
        p[columns[0]] = x[k];
        p[columns[1]] = y[k];
        system.setParameters(p);
        for (let i = 0; i < n; i += 1) u[i] = states[k * n + i];
        margins[k] = Number.NaN;
        if (!settle() || !eigenvaluesInto(J, workspace, re, im)) continue;
        for (let i = 0; i < n; i += 1) states[k * n + i] = u[i];
        margins[k] = -re[0];
      }
    },
  };
}
