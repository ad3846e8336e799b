import { CONTROL } from './contract';

/** Output times handed to the step loop at once. */
export const OUTPUT_WINDOW = 128;
/** Cells handed to the map kernel at once. */
export const CELL_WINDOW = 128;
/** Most slopes and rows of dense output of any method, with the five vectors beside them. */
const VECTORS = 5 + 16 + 8;

/** Doubles that the kernels need for a model of n states. */
export function workspaceFor(n: number): number {
  const steps = CONTROL.length + VECTORS * n + OUTPUT_WINDOW * (n + 1);
  const cells = CELL_WINDOW * (n + 3) + 2 * n * n + 6 * n;
  return Math.max(steps, cells) + n;
}
