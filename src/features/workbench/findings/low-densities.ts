/** Which densities fall below a threshold, in the trajectory and on the attracting cycles. */
import type { Trajectory } from '@/engine/integrators/contract';
import type { PresetDocument } from '@/engine/schema/preset';

import type { PresentCycle } from '../cycles/present-cycles';

export interface LowDensity {
  readonly side: 'split' | 'twin';
  /** Class, or population of a lumped twin. */
  readonly symbol: string;
  readonly where: 'trajectory' | 'cycle';
  readonly lowest: number;
  /** For a trajectory, when it first falls below. */
  readonly time: number | null;
}

/** Density to warn below: as set, else that of one individual; null where neither is known. */
export function warningThreshold(
  document: Pick<PresetDocument, 'lowDensity' | 'individualsPerUnit'>,
): number | null {
  if (document.lowDensity !== null) return document.lowDensity;
  return document.individualsPerUnit === null ? null : 1 / document.individualsPerUnit;
}

/** States that are there at the start and fall below the threshold, with when they first do. */
export function lowInTrajectory(
  { times, states, dimension }: Trajectory,
  symbols: readonly string[],
  side: LowDensity['side'],
  threshold: number,
): readonly LowDensity[] {
  return symbols.slice(0, dimension).flatMap((symbol, i): LowDensity[] => {
    let lowest = Infinity;
    let time: number | null = null;
    let before = NaN;
    let present = false;
    for (let k = 0; k < times.length; k++) {
      const value = states[k * dimension + i] ?? NaN;
      if (value > 0) present = true;
      if (value < lowest) lowest = value;
      if (time === null && value < threshold) {
        const t = times[k] ?? NaN;
        const earlier = times[k - 1];
        // Between two samples the solution is taken as a line.
        time =
          earlier === undefined ? t : earlier + ((t - earlier) * (before - threshold)) / (before - value);
      }
      before = value;
    }
    return present && time !== null ? [{ side, symbol, where: 'trajectory', lowest, time }] : [];
  });
}

/** States of attracting cycles whose lowest value lies below the threshold. */
export function lowOnCycles(
  cycles: readonly PresentCycle[],
  symbols: readonly string[],
  side: LowDensity['side'],
  threshold: number,
): readonly LowDensity[] {
  return cycles
    .filter((one) => one.attracts === 1)
    .flatMap((cycle) =>
      symbols.flatMap((symbol, i): LowDensity[] => {
        const lowest = cycle.lowest[i] ?? NaN;
        const present = (cycle.highest[i] ?? NaN) > 0;
        return present && lowest < threshold ? [{ side, symbol, where: 'cycle', lowest, time: null }] : [];
      }),
    );
}
