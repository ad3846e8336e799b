import type { CompiledSystem } from '../system/contract';
import type { PlaneRequest } from './contract';

/** One axis of the plane: states that move along it, each by its share. */
interface PlaneAxis {
  readonly symbol: string;
  readonly states: readonly number[];
  readonly shares: readonly number[];
  /** Whether growth is judged per head, so that the empty edge counts as no line of its own. */
  readonly perHead: boolean;
}

/** A plane through state space: puts a point of the plane into a state and gives the growth along both axes. */
export interface PlaneSlice {
  readonly x: string;
  readonly y: string;
  readonly note: string;
  /** Writes dX/dt and dY/dt at (x, y) to out[0..1]. */
  growth(x: number, y: number, out: Float64Array): void;
  /**
   * The same per head where an axis cannot go below zero: the sign of growth survives at the empty edge,
   * where growth itself vanishes.
   */
  growthPerHead(x: number, y: number, out: Float64Array): void;
}

/** Shares of a population at the edge, relative to the range of the axis, that stand for "nearly none". */
const NEARLY_NONE = 1e-9;

/**
 * Slices the state space along two axes through `held`.
 *
 * @param held state that gives the values of what does not vary and the composition of totals.
 * @param t time at which the slice is taken, for systems with explicit time.
 * @returns Null where an axis names no state or population, or both name the same.
 */
export function makePlaneSlice(
  system: CompiledSystem,
  request: PlaneRequest,
  held: Float64Array,
  t = 0,
): PlaneSlice | null {
  const xAxis = resolveAxis(system, request.x, held);
  const yAxis = resolveAxis(system, request.y, held);
  if (!xAxis || !yAxis || xAxis.states.some((i) => yAxis.states.includes(i))) return null;
  const u = held.slice(0, system.dimension);
  const f = new Float64Array(system.dimension);
  const nearX = NEARLY_NONE * Math.abs(request.xRange[1] - request.xRange[0]);
  const nearY = NEARLY_NONE * Math.abs(request.yRange[1] - request.yRange[0]);

  const growth = (x: number, y: number, out: Float64Array): void => {
    place(xAxis, x, u);
    place(yAxis, y, u);
    system.rhs(t, u, f);
    out[0] = sumOver(xAxis, f);
    out[1] = sumOver(yAxis, f);
  };
  return {
    x: request.x,
    y: request.y,
    note: describeHeld(system, [xAxis, yAxis], held, t),
    growth,
    growthPerHead(x, y, out) {
      const px = xAxis.perHead ? Math.max(x, nearX) : x;
      const py = yAxis.perHead ? Math.max(y, nearY) : y;
      growth(px, py, out);
      if (xAxis.perHead) out[0] /= px;
      if (yAxis.perHead) out[1] /= py;
    },
  };
}

function resolveAxis(system: CompiledSystem, symbol: string, held: Float64Array): PlaneAxis | null {
  const state = system.stateSymbols.indexOf(symbol);
  if (state >= 0)
    return { symbol, states: [state], shares: [1], perHead: system.nonnegative[state] === true };
  const population = system.populations.find((one) => one.symbol === symbol);
  if (!population) return null;
  const { states } = population;
  const total = states.reduce((sum, i) => sum + held[i], 0);
  const shares = states.map((i) => (total > 0 ? held[i] / total : 1 / states.length));
  return { symbol, states, shares, perHead: states.every((i) => system.nonnegative[i] === true) };
}

function place(axis: PlaneAxis, value: number, u: Float64Array): void {
  for (let k = 0; k < axis.states.length; k += 1) u[axis.states[k]] = axis.shares[k] * value;
}

function sumOver(axis: PlaneAxis, f: Float64Array): number {
  let sum = 0;
  for (let k = 0; k < axis.states.length; k += 1) sum += f[axis.states[k]];
  return sum;
}

function describeHeld(
  system: CompiledSystem,
  axes: readonly PlaneAxis[],
  held: Float64Array,
  t: number,
): string {
  const varied = new Set(axes.flatMap((axis) => axis.states));
  const fixed = system.stateSymbols.flatMap((symbol, i) =>
    varied.has(i) ? [] : [`${symbol} = ${short(held[i])}`],
  );
  const composed = axes.flatMap((axis) =>
    axis.states.length < 2
      ? []
      : [`${axis.symbol} is a total with shares ${axis.shares.map((share) => short(share)).join(' : ')}`],
  );
  const parts = [...(fixed.length > 0 ? [`held at ${fixed.join(', ')}`] : []), ...composed];
  if (!system.autonomous) parts.push(`at time ${short(t)}`);
  if (parts.length === 0) return 'All states vary in this plane.';
  const sentence = parts.join('; ');
  return `${sentence.charAt(0).toUpperCase()}${sentence.slice(1)}.`;
}

const short = (value: number): string => String(Number(value.toPrecision(4)));
