import type { Progress } from '../continuation/contract';
import { quantitiesOf } from '../lyapunov/quantities';
import type { CompiledSystem } from '../system/contract';
import type { AttractorClass, MapAxis, MapResult } from './contract';
import { fillSheet } from './fill-sheet';
import { findAttractor, type Attractor, type AttractorRequest } from './find-attractor';
import { axisValues, MapSheet } from './map-sheet';

export interface BasinsRequest extends AttractorRequest {
  readonly x: MapAxis;
  readonly y: MapAxis;
  /** State that a cell begins from. */
  startAt(x: number, y: number): Float64Array;
  /** Milliseconds; the engine has no clock of its own. */
  readonly clock?: () => number;
}

export const BASIN_DEFAULTS = {
  /** Attractors are one where extremes differ by less than this share of the range, and periods of the period. */
  same: 0.02,
  /** The same for chaos and tori, whose extremes depend on the time seen. */
  sameIrregular: 0.2,
  /** Differences below this share of the largest value seen are none. */
  small: 1e-4,
  /** Populations named in a label. */
  named: 3,
} as const;

/**
 * Basins of attraction on a plane of two start values: in each cell the number of the attractor that the
 * solution from there settles to, attractors counted as the same by kind, extremes and period. Coarse cells first.
 * The parameters are those set on the system.
 */
export function* basinsOfAttraction(
  system: CompiledSystem,
  request: BasinsRequest,
): Generator<Progress<MapResult>, MapResult> {
  const sheet = new MapSheet('basin', request.x, request.y, request.clock);
  const found = new AttractorList(system);
  const [xs, ys] = [axisValues(request.x), axisValues(request.y)];
  function* solve(ix: number, iy: number): Generator<void, number> {
    return found.indexOf(yield* findAttractor(system, request.startAt(xs[ix], ys[iy]), request));
  }
  yield* fillSheet(sheet, solve, 'Looking where solutions settle', () => found.classes());
  const count = found.classes().filter(({ kind }) => kind !== 'undecided' && kind !== 'unbounded').length;
  const message =
    count === 0
      ? 'No start was decided: a longer time observed may tell where they settle.'
      : count === 1
        ? 'One attractor takes every start that was decided.'
        : `${count} attractors share the starts; the colour of a cell tells which one its centre goes to.`;
  return sheet.result('complete', message, found.classes());
}

/** Attractors met so far, numbered in the order in which they were met. */
class AttractorList {
  private readonly known: Attractor[] = [];

  constructor(private readonly system: CompiledSystem) {}

  indexOf(one: Attractor): number {
    const at = this.known.findIndex((other) => this.same(other, one));
    if (at >= 0) return at;
    this.known.push(one);
    return this.known.length - 1;
  }

  /** Their classes, told apart by number and by where they lie. */
  classes(): AttractorClass[] {
    return this.known.map((one, k) => ({
      ...one.class,
      label: `${k + 1}: ${one.class.label}${this.place(one)}`,
    }));
  }

  private same(a: Attractor, b: Attractor): boolean {
    if (a.class.label !== b.class.label) return false;
    if (a.class.kind === 'undecided' || a.class.kind === 'unbounded') return true;
    const irregular = a.class.kind === 'chaos' || a.class.kind === 'torus';
    const tolerance = irregular ? BASIN_DEFAULTS.sameIrregular : BASIN_DEFAULTS.same;
    if (a.period !== null && b.period !== null && Math.abs(a.period - b.period) > tolerance * a.period)
      return false;
    const most = Math.max(...a.highest.map(Math.abs), ...b.highest.map(Math.abs));
    return a.lowest.every((low, q) => {
      const range = Math.max(a.highest[q], b.highest[q]) - Math.min(low, b.lowest[q]);
      const rests = a.class.kind !== 'cycle' && !irregular;
      const slack = (rests ? 0 : tolerance * range) + BASIN_DEFAULTS.small * most;
      return Math.abs(low - b.lowest[q]) <= slack && Math.abs(a.highest[q] - b.highest[q]) <= slack;
    });
  }

  /** Densities of the first populations, as one value where they rest. */
  private place(one: Attractor): string {
    if (one.class.kind === 'undecided' || one.class.kind === 'unbounded') return '';
    const quantities = quantitiesOf(this.system);
    const places = this.system.populations.slice(0, BASIN_DEFAULTS.named).map(({ symbol, states }) => {
      const q = states.length === 1 ? states[0] : quantities.findIndex((other) => other.symbol === symbol);
      const [low, high] = [shown(one.lowest[q]), shown(one.highest[q])];
      return low === high ? `${symbol} = ${low}` : `${symbol} from ${low} to ${high}`;
    });
    return `, ${places.join(', ')}`;
  }
}

function shown(value: number): string {
  return String(Number(value.toPrecision(3)));
}
