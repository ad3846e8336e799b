import type { CompiledSystem } from '../system/contract';
import { sumOf, type Quantity } from './quantities';
import { restingAt } from './resting-at';
import { ScaledWalk, type WalkOptions } from './scaled-walk';
import { TurningPoints } from './turning-points';

export interface ObserveRequest extends WalkOptions {
  readonly quantities: readonly Quantity[];
  /** Index of the quantity whose maxima are listed. */
  readonly watched: number;
  readonly transient: number;
  readonly observed: number;
}

export interface LongRunExtremes {
  /** Of every quantity; NaN where the solution left every bound. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  /** Local maxima in the time observed; the one value where it rests. */
  readonly maxima: readonly number[];
  /** Whether both halves of the time observed had the same range. */
  readonly settled: boolean;
  readonly bounded: boolean;
  readonly state: Float64Array;
}

const OBSERVE_DEFAULTS = {
  /** Looks for rest before and during the time observed. */
  looks: 8,
  /** Halves agree where extremes differ by less than this share of the range. */
  agree: 1e-2,
  flat: 1e-7,
  /** Maxima kept of one value. */
  maxima: 500,
} as const;

/**
 * Range and local maxima of the long run from a state: rest where Newton's method finds an attracting
 * equilibrium next to it, else what the time observed shows, in two halves that say whether it has settled.
 * The parameters are those set on the system. A generator that yields between slices.
 */
export function* observeLongRun(
  system: CompiledSystem,
  start: Float64Array,
  request: ObserveRequest,
): Generator<void, LongRunExtremes> {
  const { quantities, watched, transient, observed } = request;
  const walk = new ScaledWalk(system, start, request);
  const rest = (): LongRunExtremes | null => {
    const at = system.autonomous ? restingAt(system, walk.time, walk.state, walk.size) : null;
    return at && resting(quantities, watched, at);
  };
  const { looks } = OBSERVE_DEFAULTS;
  for (let k = 1; k <= looks; k += 1) {
    if ((yield* walk.to((transient * k) / looks)) !== 'complete') return lost(quantities, walk);
    const found = rest();
    if (found) return found;
  }
  const turns = new TurningPoints(walk, quantities, watched);
  if ((yield* walk.to(transient + observed / 2, [turns])) !== 'complete') return lost(quantities, walk);
  const first = { lowest: turns.lowest.slice(), highest: turns.highest.slice() };
  const maxima = [...turns.maxima];
  turns.reset(walk);
  if ((yield* walk.to(transient + observed, [turns])) !== 'complete') return lost(quantities, walk);
  maxima.push(...turns.maxima);
  return (
    rest() ?? {
      lowest: turns.lowest.map((low, q) => Math.min(low, first.lowest[q])),
      highest: turns.highest.map((high, q) => Math.max(high, first.highest[q])),
      maxima: maxima.slice(-OBSERVE_DEFAULTS.maxima),
      settled: agree(first, turns),
      bounded: true,
      state: walk.state.slice(),
    }
  );
}

function resting(quantities: readonly Quantity[], watched: number, at: Float64Array): LongRunExtremes {
  const values = Float64Array.from(quantities, ({ states }) => sumOf(states, at));
  const maxima = watched >= 0 ? [values[watched]] : [];
  return { lowest: values, highest: values.slice(), maxima, settled: true, bounded: true, state: at };
}

function lost(quantities: readonly Quantity[], walk: ScaledWalk): LongRunExtremes {
  const none = new Float64Array(quantities.length).fill(Number.NaN);
  return {
    lowest: none,
    highest: none.slice(),
    maxima: [],
    settled: false,
    bounded: false,
    state: walk.state.slice(),
  };
}

interface Range {
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
}

function agree(a: Range, b: Range): boolean {
  return a.lowest.every((low, q) => {
    const range = Math.max(a.highest[q], b.highest[q]) - Math.min(low, b.lowest[q]);
    const size = Math.max(Math.abs(a.highest[q]), Math.abs(b.highest[q]));
    const slack = OBSERVE_DEFAULTS.agree * range + OBSERVE_DEFAULTS.flat * size;
    return Math.abs(low - b.lowest[q]) <= slack && Math.abs(a.highest[q] - b.highest[q]) <= slack;
  });
}
