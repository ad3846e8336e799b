import { ScaledWalk, type WalkOptions } from '../lyapunov/scaled-walk';
import type { CompiledSystem } from '../system/contract';
import { Returns, type Closure, type ReturnRule } from './returns';

export const ATTRACTS_DEFAULTS = {
  /** How far a neighbour is set off, as a share of each state. */
  offset: 0.01,
  /** Periods that a neighbour is followed for. */
  periods: 30,
  /** It has come back where so little of its first distance is left. */
  left: 0.1,
  /** The same share of the offset itself, of which the direction of the orbit takes a part. */
  leftOfOffset: 1e-3,
  /** Or where the second half of the time still brought it nearer by this share. */
  nearer: 0.01,
} as const;

/**
 * Whether a closed orbit attracts: a neighbour set off from it comes back in its returns. Closed orbits of a model
 * with a constant of motion do not; such a neighbour keeps its distance.
 *
 * @param state on the orbit at `time`. @param returns of the orbit itself, latest last
 */
export function* attractsNeighbours(
  system: CompiledSystem,
  orbit: {
    readonly state: Float64Array;
    readonly time: number;
    readonly returns: Returns;
    readonly closure: Closure;
    readonly rule: ReturnRule;
    readonly range: Float64Array;
  },
  options: WalkOptions,
): Generator<void, boolean> {
  const { returns, closure, rule, range } = orbit;
  const { offset, periods, left, leftOfOffset, nearer } = ATTRACTS_DEFAULTS;
  const aside = orbit.state.map((x, i) => (range[i] > 0 ? x * (1 + offset * (i % 2 === 0 ? 1 : -1)) : x));
  const walk = new ScaledWalk(system, aside, { ...options, startTime: orbit.time });
  const own = new Returns(walk, rule, range);
  const first = own.apart(inScale(walk, aside), inScale(walk, orbit.state));
  const gaps: number[] = [];
  for (let k = 1; k <= periods; k += 1) {
    if ((yield* walk.to(orbit.time + k * closure.period, [own])) !== 'complete') return true;
    const gap = own.gapTo(returns, closure.lag);
    if (gap === null) continue;
    gaps.push(gap);
    if (gap < Math.max(left * gaps[0], leftOfOffset * first)) return true;
  }
  const middle = gaps[Math.floor(gaps.length / 2)];
  return gaps.length < 2 || gaps[gaps.length - 1] < (1 - nearer) * middle;
}

function inScale(walk: ScaledWalk, state: Float64Array): Float64Array {
  const out = new Float64Array(state.length);
  walk.scaled.toScale(state, out);
  return out;
}
