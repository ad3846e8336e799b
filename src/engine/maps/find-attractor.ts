import { FadingWatch } from '../lyapunov/fading';
import { lyapunovSpectrum } from '../lyapunov/lyapunov-spectrum';
import { quantitiesOf, sumOf, type Quantity } from '../lyapunov/quantities';
import { ScaledWalk, type StepObserver, type WalkStatus } from '../lyapunov/scaled-walk';
import { TurningPoints } from '../lyapunov/turning-points';
import type { CompiledSystem } from '../system/contract';
import { attractorClass, type LongRunKind } from './attractor-class';
import { attractsNeighbours } from './attracts';
import type { AttractorClass } from './contract';
import { leadingRate, repelsAt, restingAt } from '../lyapunov/resting-at';
import { Returns, type Closure, type ReturnRule } from './returns';

export interface AttractorRequest {
  /** Time left out of extremes and exponents where no rest and no closed pattern ended it before. */
  readonly transient: number;
  /** Time after it in which a pattern is waited for; exponents are averaged over as much again where there is none. */
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
  /** Largest Lyapunov exponent where it is known: leading eigenvalue at rest, 0 on a cycle; null where it was not worked out. */
  readonly exponent: number | null;
  /** State at the end, and when that is. */
  readonly state: Float64Array;
  readonly time: number;
}

export const ATTRACTOR_DEFAULTS = {
  relativeTolerance: 1e-8,
  maximumSteps: 200_000,
  /** Parts of the whole run, after each of which it is asked whether it rests or repeats. */
  parts: 24,
  /** Parts after which the section is laid anew, through the range seen last. */
  freshReturns: [1, 2, 4, 8, 12] as readonly number[],
  /** Share of the time observed in which displacements turn to their directions before they are averaged. */
  turning: 0.3,
  /** Returns this near to an earlier one, as a share of the range, are no sign of a torus. */
  nearlyClosed: 0.02,
  /** Ranges below this, of logarithms or relative to the state, are none. */
  flat: 1e-6,
} as const;

const REASONS: Readonly<Record<Exclude<WalkStatus, 'complete' | 'unbounded'>, string>> = {
  'not-finite': 'left the finite numbers',
  'step-too-small': 'could not be followed further',
  'steps-spent': 'step budget spent',
};

/**
 * What a solution settles to. Asked after each part of the run, in this order: rest, where Newton's method finds an attracting equilibrium next to the
 * state; a cycle, where the returns to a section (or at every period of the forcing) repeat after up to 16
 * turns; at its end chaos, torus or undecided by the three largest Lyapunov exponents. Populations whose total
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

interface AnswerDetails {
  readonly windings?: number;
  readonly period?: number;
  readonly reason?: string;
  readonly exponent?: number;
}

class AttractorRun {
  private readonly walk: ScaledWalk;
  private readonly quantities: readonly Quantity[];
  private readonly turns: TurningPoints;
  private readonly fading: FadingWatch;
  private readonly watch: StepObserver;
  /** Populations that can die out. */
  private readonly begunWith: readonly boolean[];
  private readonly seenLowest: Float64Array;
  private readonly seenHighest: Float64Array;

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
    this.seenLowest = new Float64Array(this.quantities.length).fill(Infinity);
    this.seenHighest = new Float64Array(this.quantities.length).fill(-Infinity);
    this.begunWith = system.populations.map(
      ({ states }) => states.some((i) => start[i] > 0) && states.every((i) => system.nonnegative[i]),
    );
  }

  *find(): Generator<void, Attractor> {
    const { walk, turns, request } = this;
    const { parts, freshReturns } = ATTRACTOR_DEFAULTS;
    const end = request.transient + request.observed;
    let returns: Returns | null = null;
    let gone = 0;
    for (let k = 1; k <= parts; k += 1) {
      turns.reset(walk);
      const observers = returns ? [this.watch, turns, returns] : [this.watch, turns];
      const status = yield* walk.to((end * k) / parts, observers);
      if (status !== 'complete') return this.stopped(status);
      const rest = this.rest();
      if (rest) return rest;
      const closed = returns?.closure();
      if (returns && closed) return yield* this.closed(returns, closed);
      const past = walk.time > request.transient;
      if (past) this.merge();
      const range = this.ranges();
      if (range.every((one) => one === 0)) {
        if (past) return this.flat();
        returns = null;
        continue;
      }
      const extinct = this.extinct().length;
      if (!returns || extinct !== gone || freshReturns.includes(k))
        returns = new Returns(walk, this.rule(range), range);
      gone = extinct;
    }
    return yield* this.byExponents(returns);
  }

  /** A cycle, unless neighbours of the closed orbit keep their distance; asked only where no approach was seen. */
  private *closed(returns: Returns, closure: Closure): Generator<void, Attractor> {
    const { system, walk, request } = this;
    if (returns.repeatedThroughout(closure.lag)) {
      const orbit = { state: walk.state.slice(), time: walk.time, returns, closure, ...returns.setting };
      if (!(yield* attractsNeighbours(system, orbit, request)))
        return this.answer('undecided', { reason: 'closed orbits of every size, none of which attracts' });
    }
    return yield* this.cycle(closure);
  }

  /** Extremes over one whole period. */
  private *cycle({ lag, period }: Closure): Generator<void, Attractor> {
    const { walk, turns } = this;
    turns.reset(walk);
    const status = yield* walk.to(walk.time + 1.01 * period, [turns]);
    if (status !== 'complete') return this.stopped(status);
    // Along a free cycle nothing grows or shrinks; forced ones have no such direction.
    return this.answer('cycle', {
      windings: lag,
      period,
      ...(this.system.autonomous ? { exponent: 0 } : {}),
    });
  }

  /** Adds what the last part of the run has shown to what was seen since the transient. */
  private merge(): void {
    const { lowest, highest } = this.turns;
    this.seenLowest.forEach((low, q) => {
      this.seenLowest[q] = Math.min(low, lowest[q]);
      this.seenHighest[q] = Math.max(this.seenHighest[q], highest[q]);
    });
  }

  /** Rest at an attracting equilibrium next to the state; null where there is none. */
  private rest(): Attractor | null {
    const { system, walk } = this;
    if (!system.autonomous) return null;
    const at = restingAt(system, walk.time, walk.state, walk.size);
    if (!at) return null;
    const values = Float64Array.from(this.quantities, ({ states }) => sumOf(states, at));
    this.turns.lowest.set(values);
    this.turns.highest.set(values);
    return { ...this.answer('rest', { exponent: leadingRate(system, walk.time, at) }), state: at };
  }

  /** Nothing moves, yet no equilibrium attracts for certain: a curve of them, forcing that does nothing, or a saddle. */
  private flat(): Attractor {
    const { system, walk } = this;
    if (system.autonomous && repelsAt(system, walk.time, walk.state))
      return this.answer('undecided', { reason: 'stays at an equilibrium that repels' });
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

  private *byExponents(returns: Returns | null): Generator<void, Attractor> {
    this.turns.lowest.set(this.seenLowest);
    this.turns.highest.set(this.seenHighest);
    const fading = this.fading.fading();
    if (fading.length > 0) return this.answer('undecided', { reason: 'nears a cycle through saddles' });
    const { system, walk, request } = this;
    const run = lyapunovSpectrum(system, walk.state, {
      startTime: walk.time,
      transient: ATTRACTOR_DEFAULTS.turning * request.observed,
      horizon: request.observed,
      count: Math.min(3, system.dimension),
      maximumSteps: request.maximumSteps,
    });
    let step = run.next();
    while (!step.done) {
      yield;
      step = run.next();
    }
    const { reading, exponents } = step.value;
    const exponent = exponents[0];
    if (/chaos$/.test(reading)) return this.answer('chaos', { exponent });
    // Where returns nearly repeat, zero exponents are those of a cycle about to change.
    const nearly = returns !== null && returns.nearest() < ATTRACTOR_DEFAULTS.nearlyClosed;
    if (reading.startsWith('torus') && !nearly) return this.answer('torus', { exponent });
    const known = reading === 'cycle' || reading === 'rest' || nearly;
    const reason = known
      ? `on its way to a ${reading === 'rest' ? 'rest' : 'cycle'}`
      : 'a longer run decides';
    return this.answer('undecided', { reason, exponent });
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

  private answer(kind: LongRunKind, { windings, period, reason, exponent }: AnswerDetails): Attractor {
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
      exponent: exponent ?? null,
      state: this.walk.state.slice(),
      time: this.walk.time,
    };
  }
}
