import type { CompiledSystem } from '../system/contract';
import { integrateBand, repellingStretch } from './bands';
import { BranchSet } from './branch-set';
import type { Band, Progress, SweepResult } from './contract';
import { STEP_DEFAULTS } from './pseudo-arclength';
import { findSeeds, scaleOfStates, type Seed } from './seeds';
import { growsBesidesPair } from './special-points';
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

/** Shares of the progress at which the stages end. */
const STAGES = { seeds: 0.3, branches: 0.7 } as const;

/**
 * Sweeps one parameter: every equilibrium found along the range is followed in both directions by
 * pseudo-arclength continuation, special points are located on the way and other branches entered there,
 * then long-run bands are integrated past Hopf points. A generator whose progress holds the result so far;
 * leaving it early loses nothing that was found. Trouble is a value: every branch says why it ends.
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
  yield* run.seed();
  yield* run.followAll();
  if (options.bands !== false) yield* run.integrateBands();
  return run.result('complete', run.summary());
}

class SweepRun {
  private scope: SweepScope;
  private set: BranchSet;
  private points: SpecialPointList;
  private readonly queue: Entry[] = [];
  private readonly bands: Band[] = [];
  private readonly notes = new Set<string>();
  private readonly began: number;
  private count = 0;
  private budgetSpent = false;

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: SweepOptions,
  ) {
    this.began = options.clock?.() ?? 0;
    this.scope = this.scopeFor([]);
    this.set = new BranchSet(this.scope);
    this.points = new SpecialPointList(this.scope);
  }

  /** Finds equilibria along the range; they set the scales of the states. */
  *seed(): Generator<Progress<SweepResult>, void> {
    const search = findSeeds(this.system, this.p, this.options);
    let step = search.next();
    while (!step.done) {
      yield this.progress(STAGES.seeds * step.value, 'looking for equilibria along the range');
      step = search.next();
    }
    const { found, notes } = step.value;
    notes.forEach((note) => this.notes.add(note));
    this.scope = this.scopeFor(found.map((one) => one.state));
    this.set = new BranchSet(this.scope);
    this.points = new SpecialPointList(this.scope);
    for (const one of found) this.enqueue(one);
  }

  *followAll(): Generator<Progress<SweepResult>, void> {
    for (let entry = this.queue.shift(); entry !== undefined; entry = this.queue.shift()) {
      if (this.isKnown(entry)) continue;
      if (
        this.set.branches.length >= SWEEP_DEFAULTS.branchBudget ||
        this.count >= SWEEP_DEFAULTS.pointBudget
      ) {
        this.budgetSpent = true;
        return;
      }
      yield* this.followOne(entry);
    }
  }

  *integrateBands(): Generator<Progress<SweepResult>, void> {
    // Where another direction repels as well, the long run near the equilibrium is not the cycle's.
    const hopfs = this.points
      .list()
      .filter(
        ({ feasible, hopf, eigenvalues }) => feasible && hopf && !growsBesidesPair(eigenvalues, hopf.omega),
      );
    for (const [k, hopf] of hopfs.entries()) {
      const stretch = repellingStretch(this.set.branches[hopf.branch], hopf);
      if (stretch === null) continue;
      const run = integrateBand(this.system, this.p, this.options.parameterIndex, stretch);
      let step = run.next();
      while (!step.done) {
        const share = (k + step.value) / hopfs.length;
        yield this.progress(
          STAGES.branches + (1 - STAGES.branches) * share,
          'following the long run past Hopf points',
        );
        step = run.next();
      }
      this.bands.push(step.value);
    }
  }

  summary(): string {
    return summarise(this.set.branches, this.count, this.budgetSpent, [...this.notes]);
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
    const share = 1 - 1 / (1 + this.set.branches.length);
    let step = follow.next();
    while (!step.done) {
      yield this.progress(STAGES.seeds + (STAGES.branches - STAGES.seeds) * share, 'following branches');
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
    return { fraction, stage, partial: this.result('cancelled', STOPPED) };
  }
}
