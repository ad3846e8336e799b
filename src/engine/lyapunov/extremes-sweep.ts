import type { Progress } from '../continuation/contract';
import type { CompiledSystem } from '../system/contract';
import type { ExtremesResult, ExtremesSweep } from './contract';
import { findHysteresis } from './hysteresis';
import { observeLongRun, type LongRunExtremes } from './observe-long-run';
import { quantitiesOf, type Quantity } from './quantities';

export interface ExtremesRequest {
  readonly parameterIndex: number;
  readonly parameterKey: string;
  readonly from: number;
  readonly to: number;
  /** Values of the parameter, ends included. */
  readonly values: number;
  readonly directions: readonly ExtremesSweep['direction'][];
  /** Whose local maxima are listed. */
  readonly observe: Quantity;
  readonly starts: Float64Array;
  readonly transient: number;
  readonly observed: number;
  /** Density to which lower ones are lifted at each new value, so that what was lost can come back; 0 for none. */
  readonly floor: number;
  readonly maximumSteps?: number;
  /** Milliseconds; the engine has no clock of its own. */
  readonly clock?: () => number;
}

/** Copies of the result that the progress of one direction holds. */
const PARTIALS = 100;

/**
 * Long-run extremes along a parameter, upward and downward, each value begun from the state at the last one, so
 * that coexisting attractors show as a difference between the directions. A class that was there at the
 * start and has sunk below the floor is lifted to it at each new value: without that a population once lost could
 * never come back where it can invade again. A generator; partial results hold what was swept so far.
 *
 * @param p parameters in the order of the system, set on it and written to
 */
export function* extremesSweep(
  system: CompiledSystem,
  p: Float64Array,
  request: ExtremesRequest,
): Generator<Progress<ExtremesResult>, ExtremesResult> {
  const began = request.clock?.() ?? 0;
  const quantities = quantitiesOf(system);
  const observed = request.observe.states.join();
  const watched = quantities.findIndex(({ states }) => states.join() === observed);
  const done: ExtremesSweep[] = [];
  const result = (status: ExtremesResult['status'], sweeps: readonly ExtremesSweep[]): ExtremesResult => {
    const hysteresis = findHysteresis(sweeps);
    return {
      status,
      message: status === 'complete' ? inWords(sweeps, hysteresis, request.floor) : 'Stopped before the end.',
      parameterKey: request.parameterKey,
      from: request.from,
      to: request.to,
      observed: request.observe.symbol,
      sweeps,
      hysteresis,
      milliseconds: (request.clock?.() ?? 0) - began,
    };
  };
  const total = request.values * request.directions.length;
  for (const direction of request.directions) {
    const rows = new SweepRows(direction, quantities);
    let state = request.starts;
    for (let k = 0; k < request.values; k += 1) {
      const value = valueAt(request, direction, k);
      p[request.parameterIndex] = value;
      system.setParameters(p);
      const run = observeLongRun(system, k === 0 ? state : lifted(system, state, request), {
        quantities,
        watched,
        transient: request.transient,
        observed: request.observed,
        ...(request.maximumSteps === undefined ? {} : { maximumSteps: request.maximumSteps }),
      });
      let step = run.next();
      while (!step.done) {
        yield {
          fraction: (done.length * request.values + k) / total,
          stage: stageOf(direction),
          partial: null,
        };
        step = run.next();
      }
      rows.add(value, step.value);
      if (step.value.bounded) state = step.value.state;
      const fraction = (done.length * request.values + k + 1) / total;
      const due = k % Math.ceil(request.values / PARTIALS) === 0;
      const partial = due ? result('cancelled', [...done, rows.sweep()]) : null;
      yield { fraction, stage: stageOf(direction), partial };
    }
    done.push(rows.sweep());
  }
  return result('complete', done);
}

/** Values rise upward and fall downward, whichever end the range names first. */
function valueAt(
  { from, to, values }: ExtremesRequest,
  direction: ExtremesSweep['direction'],
  k: number,
): number {
  const [low, high] = [Math.min(from, to), Math.max(from, to)];
  const share = k / (values - 1);
  return direction === 'upward' ? low + share * (high - low) : high - share * (high - low);
}

function lifted(
  system: CompiledSystem,
  state: Float64Array,
  { starts, floor }: ExtremesRequest,
): Float64Array {
  return state.map((x, i) => (system.nonnegative[i] && starts[i] > 0 ? Math.max(x, floor) : x));
}

function stageOf(direction: ExtremesSweep['direction']): string {
  return `Following the long run ${direction}`;
}

/** Collects the rows of one direction. */
class SweepRows {
  private readonly parameters: number[] = [];
  private readonly lowest: number[] = [];
  private readonly highest: number[] = [];
  private readonly maxima: number[] = [];
  private readonly starts: number[] = [0];
  private readonly settled: number[] = [];

  constructor(
    private readonly direction: ExtremesSweep['direction'],
    private readonly quantities: readonly Quantity[],
  ) {}

  add(value: number, run: LongRunExtremes): void {
    this.parameters.push(value);
    this.lowest.push(...run.lowest);
    this.highest.push(...run.highest);
    this.maxima.push(...run.maxima);
    this.starts.push(this.maxima.length);
    this.settled.push(run.settled ? 1 : 0);
  }

  sweep(): ExtremesSweep {
    return {
      direction: this.direction,
      parameters: Float64Array.from(this.parameters),
      quantities: this.quantities.map(({ symbol }) => symbol),
      lowest: Float64Array.from(this.lowest),
      highest: Float64Array.from(this.highest),
      maxima: Float64Array.from(this.maxima),
      maximaStart: Uint32Array.from(this.starts),
      settled: Uint8Array.from(this.settled),
    };
  }
}

function inWords(
  sweeps: readonly ExtremesSweep[],
  hysteresis: ExtremesResult['hysteresis'],
  floor: number,
): string {
  const count = sweeps.reduce((sum, one) => sum + one.parameters.length, 0);
  const open = sweeps.reduce((sum, one) => sum + one.settled.filter((flag) => flag === 0).length, 0);
  const shown = (value: number): string => String(Number(value.toPrecision(6)));
  const parts = [`Followed the long run at ${count} values.`];
  if (hysteresis.length > 0)
    parts.push(
      `Upward and downward differ from ${hysteresis.map(({ from, to }) => `${shown(from)} to ${shown(to)}`).join(', and from ')}: there the long run depends on where it comes from.`,
    );
  else if (sweeps.length > 1) parts.push('Upward and downward agree.');
  if (open > 0)
    parts.push(
      `At ${open === 1 ? 'one value' : `${open} values`} the range had not settled in the time observed.`,
    );
  if (floor > 0)
    parts.push(
      `Densities below ${shown(floor)} were lifted to it at each new value, so that what can invade comes back.`,
    );
  return parts.join(' ');
}
