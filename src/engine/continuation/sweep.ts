import type { CompiledSystem } from '../system/contract';
import { integrateBands } from './bands';
import { BranchSet } from './branch-set';
import type { Band, Progress, SweepResult } from './contract';
import { STEP_DEFAULTS } from './pseudo-arclength';
import { scaleOfStates, SeedSearch, seedValues, type Seed, type SeedValues } from './seeds';
import { SpecialPointList } from './special-point-list';
import {
  NEEDS_PERIOD_MAP,
  NO_RANGE,
  NO_SUCH_PARAMETER,
  NOT_FOLLOWED,
  NOT_ISOLATED,
  STOPPED,
  summarise,
} from './sweep-message';
import type { SweepOptions } from './sweep-options';
import { SweepScope } from './sweep-scope';
import { treatCrossing, type Entry } from './treat-crossing';
import { followWholeBranch } from './whole-branch';

export type { SweepOptions } from './sweep-options';

export const SWEEP_DEFAULTS = {
  pointBudget: 20_000,
  branchBudget: 60,
  largestStep: STEP_DEFAULTS.largest,
} as const;

/** Share of the range that a line of states at one value may differ by rounding. */
const UPRIGHT_WIDTH = 1e-9;

/** Share of the progress at which equilibria are sought no more. */
const SOUGHT = 0.7;
const SEEKING = 'looking for equilibria along the range';
const FOLLOWING = 'following branches';
const INTEGRATING = 'following the long run past Hopf points';

/**
 * Sweeps one parameter: every equilibrium found is followed in both directions by pseudo-arclength
 * continuation, special points are located on the way and other branches entered there, then long-run
 * bands are integrated past Hopf points. Equilibria are sought at the current value first and followed at
 * once, so that there is soon something to see, and then elsewhere along the range. A generator whose
 * progress holds the result so far; leaving it early loses nothing that was found. Trouble is a value:
 * every branch says why it ends.
 *
 * @param p all parameters, in the order of `system.parameterKeys`; not written to
 */
export function* sweep(
  system: CompiledSystem,
  p: Float64Array,
  options: SweepOptions,
): Generator<Progress<SweepResult>, SweepResult> {
  const run = new SweepRun(system, p, options);
  if (!system.autonomous) return run.result('needs-period-map', NEEDS_PERIOD_MAP);
  if (!(options.parameterIndex >= 0 && options.parameterIndex < p.length))
    return run.result('failed', NO_SUCH_PARAMETER);
  if (!Number.isFinite(options.from) || !Number.isFinite(options.to) || options.from === options.to)
    return run.result('failed', NO_RANGE);
  yield* run.followCurrent();
  yield* run.followElsewhere();
  if (options.bands !== false) yield* run.integrateBands();
  return run.result('complete', run.summary());
}

class SweepRun {
  private scope: SweepScope;
  private set: BranchSet;
  private points: SpecialPointList;
  private readonly queue: Entry[] = [];
  private readonly bands: Band[] = [];
  private readonly seeds: SeedSearch;
  private readonly values: SeedValues;
  private readonly atEnds: (readonly Seed[])[] = [];
  private readonly notes = new Set<string>();
  private readonly began: number;
  private count = 0;
  private budgetSpent = false;
  private fraction = 0;
  private searches = 0;

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: SweepOptions,
  ) {
    this.began = options.clock?.() ?? 0;
    this.seeds = new SeedSearch(system, p, options);
    this.values = seedValues(p[options.parameterIndex], options);
    this.scope = this.scopeFor([]);
    this.set = new BranchSet(this.scope);
    this.points = new SpecialPointList(this.scope);
  }

  /** The branches through the current equilibria. The ends are looked at before, for the scales of the states. */
  *followCurrent(): Generator<Progress<SweepResult>, void> {
    const current = yield* this.seek(this.values.first, 'full');
    for (const end of this.values.ends) this.atEnds.push(yield* this.seek(end, 'quick'));
    this.scope = this.scopeFor(this.seeds.found.map((one) => one.state));
    this.set = new BranchSet(this.scope);
    this.points = new SpecialPointList(this.scope);
    yield* this.follow(current);
  }

  /** Branches that do not reach the current value; where a quick search finds one, a full one looks for more. */
  *followElsewhere(): Generator<Progress<SweepResult>, void> {
    const { between, ends } = this.values;
    for (const [k, end] of ends.entries())
      if (yield* this.follow(this.atEnds[k])) yield* this.follow(yield* this.seek(end, 'full'));
    for (const value of between)
      if (yield* this.follow(yield* this.seek(value, 'quick')))
        yield* this.follow(yield* this.seek(value, 'full'));
  }

  *integrateBands(): Generator<Progress<SweepResult>, void> {
    const { system, p, options, set, points, bands } = this;
    const run = integrateBands(system, p, options.parameterIndex, points.list(), set.branches, bands);
    for (const share of run) yield this.progress(SOUGHT + (1 - SOUGHT) * share, INTEGRATING);
  }

  summary(): string {
    return summarise(this.set.branches, this.count, this.budgetSpent, [...this.seeds.notes, ...this.notes]);
  }

  result(status: SweepResult['status'], message: string): SweepResult {
    const { options, system } = this;
    return {
      status,
      message,
      parameterKey: system.parameterKeys[options.parameterIndex] ?? '',
      from: options.from,
      to: options.to,
      stateSymbols: system.stateSymbols,
      branches: this.set.branches.slice(),
      specialPoints: this.points.list(),
      bands: this.bands.slice(),
      points: this.count,
      milliseconds: (options.clock?.() ?? 0) - this.began,
    };
  }

  private scopeFor(states: readonly Float64Array[]): SweepScope {
    const { system, options } = this;
    const scale = scaleOfStates(system.dimension, [...states, ...options.starts]);
    const label = options.parameterLabel ?? system.parameterKeys[options.parameterIndex] ?? 'the parameter';
    return new SweepScope(system, this.p, options.parameterIndex, options, scale, label);
  }

  private *seek(value: number, extent: 'full' | 'quick'): Generator<Progress<SweepResult>, readonly Seed[]> {
    if (this.budgetSpent) return [];
    const search = this.seeds.at(value, extent);
    for (;;) {
      const step = search.next();
      if (step.done) {
        this.searches += 1;
        return step.value;
      }
      yield this.progress(this.shareSought(), SEEKING);
    }
  }

  /** Follows what is not known yet from these equilibria on; says whether anything was. */
  private *follow(seeds: readonly Seed[]): Generator<Progress<SweepResult>, boolean> {
    const before = this.set.branches.length;
    for (const one of seeds) this.enqueue(one);
    yield this.progress(this.shareSought(), FOLLOWING);
    for (let entry = this.queue.shift(); entry !== undefined; entry = this.queue.shift()) {
      if (this.isKnown(entry)) continue;
      this.budgetSpent =
        this.set.branches.length >= SWEEP_DEFAULTS.branchBudget || this.count >= SWEEP_DEFAULTS.pointBudget;
      if (this.budgetSpent) break;
      yield* this.followOne(entry);
    }
    // What was followed is seen before anything else is sought.
    yield this.progress(this.shareSought(), SEEKING);
    return this.set.branches.length > before;
  }

  /** Full searches are not foreseen: their share is that of the quick ones still to come. */
  private shareSought(): number {
    const { between, ends } = this.values;
    return (SOUGHT * this.searches) / Math.max(this.searches + 1, 1 + ends.length + between.length);
  }

  private enqueue({ state, parameter }: Seed): void {
    const active = this.scope.activeOf(state);
    const exact = state.map((value, i) => (active.includes(i) ? value : 0));
    this.queue.push({ state: exact, parameter, active, w: null });
  }

  /** Whether there is nothing new to follow from here. */
  private isKnown(entry: Entry): boolean {
    const { state, parameter, active } = entry;
    // Entered beyond an end of the range, a branch is not seen within it.
    if (parameter < this.scope.lower || parameter > this.scope.upper) return true;
    if (this.set.holds(state, parameter, active)) return true;
    // A corrector that slid onto a smaller face has found a branch of that face.
    if (entry.w === null || this.scope.activeOf(state).length === active.length) return false;
    this.enqueue(entry);
    return true;
  }

  private *followOne(entry: Entry): Generator<Progress<SweepResult>, void> {
    const follow = followWholeBranch(this.scope, entry, {
      largestStep: this.options.largestStep ?? SWEEP_DEFAULTS.largestStep,
      pointBudget: SWEEP_DEFAULTS.pointBudget - this.count,
    });
    let step = follow.next();
    while (!step.done) {
      yield this.progress(this.shareSought(), FOLLOWING);
      step = follow.next();
    }
    const found = step.value;
    if (found === null) {
      this.notes.add(NOT_FOLLOWED);
      return;
    }
    if (this.isUpright(found.branch.parameters)) {
      this.notes.add(NOT_ISOLATED);
      return;
    }
    const branch = this.set.add(found.branch, entry.active);
    this.count += found.branch.parameters.length;
    for (const { crossing, place } of found.crossings) {
      const treated = treatCrossing(this.scope, found.monitor, crossing, { ...place, branch });
      if (treated.point) this.points.record(treated.point);
      this.queue.push(...treated.entries);
    }
  }

  /** Whether a whole line of states rests at one value of the parameter, which is no branch. */
  private isUpright(parameters: Float64Array): boolean {
    const width = Math.max(...parameters) - Math.min(...parameters);
    return parameters.length >= STEP_DEFAULTS.upright && width < UPRIGHT_WIDTH * this.scope.parameterScale;
  }

  private progress(fraction: number, stage: string): Progress<SweepResult> {
    this.fraction = Math.max(this.fraction, fraction);
    return { fraction: this.fraction, stage, partial: this.result('cancelled', STOPPED) };
  }
}
