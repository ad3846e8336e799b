import type { CompiledSystem } from '../system/contract';
import type { StateBox } from './box';
import type { Face } from './face-system';
import { lowDiscrepancyPoint } from './low-discrepancy';

export const START_DEFAULTS = {
  /** Log-scaled starts run from this share of a side ... */
  smallest: 1e-4,
  /** ... to this multiple of it, where the side is open. */
  beyond: 100,
} as const;

/**
 * Start points of Newton's method on a face: even ones fill the box linearly, odd ones by magnitude,
 * so that equilibria of very different densities are met. Writes the free coordinates into `out`.
 */
export function startPoint(
  system: CompiledSystem,
  face: Face,
  box: StateBox,
  index: number,
  seed: number,
  out: Float64Array,
): void {
  lowDiscrepancyPoint(index, seed, out);
  const byMagnitude = index % 2 === 1;
  for (let a = 0; a < face.free.length; a += 1) {
    const i = face.free[a];
    const from = box.from[i];
    const to = box.to[i];
    if (!byMagnitude || (!system.nonnegative[i] && !box.open[i])) {
      out[a] = from + (0.01 + 0.98 * out[a]) * (to - from);
      continue;
    }
    const beyond = box.open[i] ? START_DEFAULTS.beyond : 1;
    const span = Math.log(beyond / START_DEFAULTS.smallest);
    const size = START_DEFAULTS.smallest * Math.exp(span * out[a]);
    if (system.nonnegative[i]) {
      const low = Math.max(from, 0);
      out[a] = low + size * (to - low);
    } else {
      // Magnitude from the part of the unit interval within each half, sign from the half.
      const half = out[a] < 0.5 ? -1 : 1;
      const within = out[a] < 0.5 ? 1 - 2 * out[a] : 2 * out[a] - 1;
      const reach = half < 0 ? -from : to;
      out[a] = half * START_DEFAULTS.smallest * Math.exp(span * within) * Math.max(Math.abs(reach), 1e-3);
    }
  }
}
