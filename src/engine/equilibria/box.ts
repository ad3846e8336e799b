import type { CompiledSystem } from '../system/contract';

/** The box in which equilibria are sought, one range per state. */
export interface StateBox {
  readonly from: Float64Array;
  readonly to: Float64Array;
  /** Whether the search may go beyond: true for sides that were guessed, not entered. */
  readonly open: readonly boolean[];
}

export const BOX_DEFAULTS = {
  /** A guessed side reaches to this multiple of the largest start value of that state. */
  aboveStart: 4,
  /** Half width for a state of either sign that starts at zero. */
  halfWidth: 10,
} as const;

/**
 * Box from what is known: entered sides as they are, the others from the start values of the state
 * (of its population, where its own start is zero) and, failing that, from the largest start of all.
 */
export function makeBox(
  system: CompiledSystem,
  starts: readonly Float64Array[],
  entered: readonly ({ readonly from: number; readonly to: number } | null)[],
): StateBox {
  const n = system.dimension;
  const largest = new Float64Array(n);
  for (const start of starts)
    for (let i = 0; i < n; i += 1) largest[i] = Math.max(largest[i], Math.abs(start[i]));
  const overall = Math.max(...largest, 0);
  for (const population of system.populations) {
    const own = Math.max(...population.states.map((i) => largest[i]), 0);
    for (const i of population.states) if (largest[i] === 0) largest[i] = own > 0 ? own : overall;
  }
  const from = new Float64Array(n);
  const to = new Float64Array(n);
  const open: boolean[] = [];
  for (let i = 0; i < n; i += 1) {
    const side = entered[i] ?? null;
    open.push(side === null);
    if (side !== null) {
      from[i] = side.from;
      to[i] = side.to;
    } else if (system.nonnegative[i]) {
      to[i] = BOX_DEFAULTS.aboveStart * (largest[i] > 0 ? largest[i] : 1);
    } else {
      const half = Math.max(BOX_DEFAULTS.halfWidth, BOX_DEFAULTS.aboveStart * largest[i]);
      from[i] = -half;
      to[i] = half;
    }
  }
  return { from, to, open };
}

/** Typical size of each state: the larger side of its range. */
export function boxScale(box: StateBox): Float64Array {
  return box.from.map((low, i) => Math.max(Math.abs(low), Math.abs(box.to[i]), Number.MIN_VALUE));
}

/** The box widened so that `state` lies well inside; null where no open side is too near. */
export function widenedBox(system: CompiledSystem, box: StateBox, state: Float64Array): StateBox | null {
  const from = Float64Array.from(box.from);
  const to = Float64Array.from(box.to);
  let widened = false;
  for (let i = 0; i < state.length; i += 1) {
    if (!box.open[i]) continue;
    if (state[i] > box.to[i] / 1.5) {
      to[i] = 2 * state[i];
      widened = true;
    }
    if (!system.nonnegative[i] && state[i] < box.from[i] / 1.5) {
      from[i] = 2 * state[i];
      widened = true;
    }
  }
  return widened ? { from, to, open: box.open } : null;
}

/** Whether a state lies in the box; open sides do not bind. `slack` is relative to the side's length. */
export function insideBox(box: StateBox, state: Float64Array, slack: number): boolean {
  for (let i = 0; i < state.length; i += 1) {
    if (box.open[i]) continue;
    const margin = slack * (box.to[i] - box.from[i]);
    if (state[i] < box.from[i] - margin || state[i] > box.to[i] + margin) return false;
  }
  return true;
}
