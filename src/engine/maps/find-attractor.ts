import { FadingWatch } from '../lyapunov/fading';
import { lyapunovSpectrum } from '../lyapunov/lyapunov-spectrum';
import { quantitiesOf, sumOf, type Quantity } from '../lyapunov/quantities';
import { ScaledWalk, type StepObserver, type WalkStatus } from '../lyapunov/scaled-walk';
import { TurningPoints } from '../lyapunov/turning-points';
import type { CompiledSystem } from '../system/contract';
import { attractorClass, type LongRunKind } from './attractor-class';
import type { AttractorClass } from './contract';
import { restingAt } from './rest-check';
import { Returns, type ReturnRule } from './returns';

export interface AttractorRequest {
  /** Time before anything is observed. */
  readonly transient: number;
  /** Time in which a pattern is waited for; exponents are averaged over as much again where there is none. */
  readonly observed: number;
  /** Total of each population below which it counts as extinct, in the order of the populations. */
  readonly extinctBelow: Float64Array;
  readonly relativeTolerance?: number;
  readonly maximumSteps?: number;
}

export interface Attractor {
  readonly class: AttractorClass;
  /** Of every class, then of every total of more than one class, on the attractor as far as it was seen. */
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  readonly period: number | null;
  /** State at the end. */
  readonly state: Float64Array;
}

export const ATTRACTOR_DEFAULTS = {
  relativeTolerance: 1e-8,
  maximumSteps: 200_000,
  /** Looks for rest during the transient, and for closed patterns during the time observed. */
  looks: 12,
  /** Share of the time observed in which the ranges are taken. */
  rangeShare: 0.25,
  /** Ranges below this, of logarithms or relative to the state, are none. */
  flat: 1e-6,
} as const;

const REASONS: Readonly<Record<Exclude<WalkStatus, 'complete' | 'unbounded'>, string>> = {
  'not-finite': 'left the finite numbers',
  'step-too-small': 'could not be followed further',
  'steps-spent': 'step budget spent',
};

/**
 * What a solution settles to. In order: rest, where Newton's method finds an attracting equilibrium next to the
 * state; a cycle, where the returns to a section (or at every period of the forcing) repeat after up to 16
 * turns; else chaos, torus or undecided by the three largest Lyapunov exponents. Populations whose total
 * stayed below the given densities and never came back are extinct. A generator that yields between slices.
 */
export function* findAttractor(
  system: CompiledSystem,
  start: Float64Array,
  request: AttractorRequest,
): Generator<void, Attractor> {
  const run = new AttractorRun(system, start, { ...ATTRACTOR_DEFAULTS, ...request });
  return yield* run.find();
}

class AttractorRun {
  private readonly walk: ScaledWalk;
  private readonly quantities: readonly Quantity[];
  private readonly turns: TurningPoints;
  private readonly fading: FadingWatch;
  private readonly watch: StepObserver;
  private readonly begunWith: readonly boolean[];

  constructor(
    private readonly system: CompiledSystem,
    start: Float64Array,
    private readonly request: AttractorRequest & {
      readonly maximumSteps: number;
      readonly relativeTolerance: number;
    },
  ) {
    this.walk = new ScaledWalk(system, start, request);
    this.quantities = quantitiesOf(system);
    this.turns = new TurningPoints(this.walk, this.quantities);
    this.fading = new FadingWatch(system.nonnegative);
    this.watch = { note: ({ state }) => this.fading.note(state) };
    this.begunWith = system.populations.map(({ states }) => states.some((i) => start[i] > 0));
  }

  *find(): Generator<void, Attractor> {
    const { walk, turns, request } = this;
    const { looks, rangeShare } = ATTRACTOR_DEFAULTS;
    for (let k = 1; k <= looks; k += 1) {
      const status = yield* walk.to((request.transient * k) / looks, [this.watch]);
      if (status !== 'complete') return this.stopped(status);
      const rest = this.rest();
      if (rest) return rest;
    }
    turns.reset(walk);
    const until = request.transient + rangeShare * request.observed;
    const ranged = yield* walk.to(until, [this.watch, turns]);
    if (ranged !== 'complete') return this.stopped(ranged);
    const range = this.ranges();
    if (range.every((one) => one === 0)) return this.rest() ?? this.flat();
    const returns = new Returns(walk, this.rule(range), range);
    const end = request.transient + request.observed;
    for (let k = 1; k <= looks; k += 1) {
      const status = yield* walk.to(until + ((end - until) * k) / looks, [this.watch, turns, returns]);
      if (status !== 'complete') return this.stopped(status);
      const closed = returns.closure();
      if (closed) {
        turns.reset(walk);
        const whole = yield* walk.to(walk.time + 1.01 * closed.period, [turns]);
        if (whole !== 'complete') return this.stopped(whole);
        return this.answer('cycle', { windings: closed.lag, period: closed.period });
      }
      const rest = this.rest();
      if (rest) return rest;
    }
    return yield* this.byExponents();
  }

  /** Rest at an attracting equilibrium next to the state; null where there is none. */
  private rest(): Attractor | null {
    const { system, walk } = this;
    if (!system.autonomous) return null;
    const at = restingAt(system, walk.time, walk.state);
    if (!at) return null;
    const values = Float64Array.from(this.quantities, ({ states }) => sumOf(states, at));
    this.turns.lowest.set(values);
    this.turns.highest.set(values);
    return { ...this.answer('rest', {}), state: at };
  }

  /** Nothing moves, yet no equilibrium attracts for certain: rest on a curve, or forcing that does nothing. */
  private flat(): Attractor {
    return this.answer('rest', {});
  }

  /** Ranges in the walk's scale; 0 for states that do not move or belong to what died out. */
  private ranges(): Float64Array {
    const { walk, turns, system } = this;
    const extinct = this.extinct();
    const gone = system.populations
      .filter(({ symbol }) => extinct.includes(symbol))
      .flatMap(({ states }) => states);
    return Float64Array.from({ length: system.dimension }, (_, i) => {
      const [low, high] = [turns.lowest[i], turns.highest[i]];
      if (gone.includes(i)) return 0;
      const logarithmic = walk.scaled.logarithmic[i];
      const range = logarithmic ? Math.log(high) - Math.log(low) : high - low;
      const size = logarithmic ? 1 : Math.max(Math.abs(low), Math.abs(high));
      return range > ATTRACTOR_DEFAULTS.flat * size ? range : 0;
    });
  }

  private rule(range: Float64Array): ReturnRule {
    const period = this.system.forcingPeriod();
    if (period !== null) return { kind: 'strobe', period };
    const { scaled } = this.walk;
    const size = (i: number): number =>
      scaled.logarithmic[i] ? 1 : Math.max(Math.abs(this.turns.lowest[i]), Math.abs(this.turns.highest[i]));
    let state = 0;
    range.forEach((one, i) => {
      if (one / size(i) > range[state] / size(state)) state = i;
    });
    const low = this.turns.lowest[state];
    const high = this.turns.highest[state];
    const level = scaled.logarithmic[state] ? (Math.log(low) + Math.log(high)) / 2 : (low + high) / 2;
    return { kind: 'section', state, level };
  }

  private *byExponents(): Generator<void, Attractor> {
    const fading = this.fading.fading();
    if (fading.length > 0) return this.answer('undecided', { reason: 'nears a cycle through saddles' });
    const { system, walk, request } = this;
    const run = lyapunovSpectrum(system, walk.state, {
      startTime: walk.time,
      transient: 0,
      horizon: request.observed,
      count: Math.min(3, system.dimension),
      maximumSteps: request.maximumSteps,
    });
    let step = run.next();
    while (!step.done) {
      yield;
      step = run.next();
    }
    const { reading } = step.value;
    if (/chaos$/.test(reading)) return this.answer('chaos', {});
    if (reading.startsWith('torus')) return this.answer('torus', {});
    const reason =
      reading === 'cycle' || reading === 'rest' ? `on its way to a ${reading}` : 'a longer run decides';
    return this.answer('undecided', { reason });
  }

  /** Populations there at the start that stayed below the density that counts, and never came back from below it. */
  private extinct(atRest = false): string[] {
    const { system, turns, request, quantities, fading } = this;
    return system.populations.flatMap(({ symbol, states }, k) => {
      const below = request.extinctBelow[k];
      const at = states.length === 1 ? states[0] : quantities.findIndex((one) => one.symbol === symbol);
      if (!this.begunWith[k] || turns.highest[at] > below) return [];
      return !atRest && states.some((i) => fading.cameBackFrom(i, below)) ? [] : [symbol];
    });
  }

  private stopped(status: Exclude<WalkStatus, 'complete'>): Attractor {
    if (status === 'unbounded') return this.answer('unbounded', {});
    return this.answer('undecided', { reason: REASONS[status] });
  }

  private answer(
    kind: LongRunKind,
    { windings, period, reason }: { windings?: number; period?: number; reason?: string },
  ): Attractor {
    const extinct = kind === 'unbounded' ? [] : this.extinct(kind === 'rest');
    return {
      class: attractorClass(this.system, kind, {
        extinct,
        ...(windings === undefined ? {} : { windings }),
        ...(reason === undefined ? {} : { reason }),
      }),
      lowest: this.turns.lowest.slice(),
      highest: this.turns.highest.slice(),
      period: period ?? null,
      state: this.walk.state.slice(),
    };
  }
}
