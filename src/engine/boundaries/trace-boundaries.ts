import type { Progress } from '../continuation/contract';
import { scaleOfStates } from '../continuation/seeds';
import { sweep } from '../continuation/sweep';
import type { CompiledSystem } from '../system/contract';
import { assembleBoundary, assembleSpecialPoints } from './assemble-boundary';
import { BoundaryScope } from './boundary-scope';
import { prepareStart, startOf } from './boundary-starts';
import type {
  BoundariesResult,
  BoundaryCurve,
  BoundaryKind,
  BoundarySpecialPoint,
  BoundaryStart,
} from './contract';
import { BOUNDARY_NAMES } from './describe-boundary';
import { followBoundary, type BoundaryFollowed } from './follow-boundary';

export interface BoundariesOptions {
  readonly firstIndex: number;
  readonly firstRange: readonly [number, number];
  readonly secondIndex: number;
  readonly secondRange: readonly [number, number];
  readonly kinds: readonly BoundaryKind[];
  /** One point to trace alone; else a sweep of the first parameter finds them. */
  readonly start?: BoundaryStart;
  readonly starts: readonly Float64Array[];
  readonly box?: readonly ({ readonly from: number; readonly to: number } | null)[];
  readonly maximumPoints?: number;
  readonly clock?: () => number;
}

export const BOUNDARIES_DEFAULTS = { maximumPoints: 1_000, curveBudget: 24 } as const;

const STOPPED = 'Stopped before the end; what was found is kept.';
const NEEDS_PERIOD_MAP =
  'Explicit time enters this model: boundaries of equilibria need it to be constant; follow the period map along one parameter instead.';
const NO_PARAMETERS = 'Two different parameters of the model are needed.';
const NO_RANGE = 'Each range needs two different finite ends.';
/** Share of the progress before any curve is traced. */
const STARTED = 0.4;
/** Distance in scaled parameters, and of states, within which a start lies on a curve already traced. */
const ON_CURVE = 2e-3;
/** Points between two reports of progress. */
const POINTS_PER_SLICE = 8;

/**
 * Curves of special points in two parameters: from every fold, Hopf point, boundary crossing and pitchfork that a
 * sweep of the first parameter finds at the present value of the second (or from one given point), and from the
 * Bogdanov-Takens points met on folds. A generator whose progress holds the result so far.
 *
 * @param p all parameters, in the order of `system.parameterKeys`; not written to
 */
export function* traceBoundaries(
  system: CompiledSystem,
  p: Float64Array,
  options: BoundariesOptions,
): Generator<Progress<BoundariesResult>, BoundariesResult> {
  const run = new BoundariesRun(system, p, options);
  const refusal = run.refusal();
  if (refusal) return run.result(system.autonomous ? 'failed' : 'needs-period-map', refusal);
  const starts = options.start ? [options.start] : yield* run.sweepForStarts();
  run.setScope(starts);
  for (const [k, start] of starts.entries())
    yield* run.trace(start, STARTED + ((1 - STARTED) * k) / starts.length);
  yield* run.traceFromBogdanovTakens();
  return run.result('complete', run.summary());
}

class BoundariesRun {
  private readonly curves: BoundaryCurve[] = [];
  private readonly points: BoundarySpecialPoint[] = [];
  private readonly notes = new Set<string>();
  private readonly began: number;
  private scope: BoundaryScope | null = null;
  private fraction = 0;
  private count = 0;

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: BoundariesOptions,
  ) {
    this.began = options.clock?.() ?? 0;
  }

  /** Why nothing can be traced, or null. */
  refusal(): string | null {
    const { system, options } = this;
    const { firstIndex, secondIndex, firstRange, secondRange } = options;
    if (!system.autonomous) return NEEDS_PERIOD_MAP;
    const known = (k: number): boolean => k >= 0 && k < system.parameterKeys.length;
    if (!known(firstIndex) || !known(secondIndex) || firstIndex === secondIndex) return NO_PARAMETERS;
    const whole = ([a, b]: readonly [number, number]): boolean =>
      Number.isFinite(a) && Number.isFinite(b) && a !== b;
    return whole(firstRange) && whole(secondRange) ? null : NO_RANGE;
  }

  *sweepForStarts(): Generator<Progress<BoundariesResult>, readonly BoundaryStart[]> {
    const { system, p, options } = this;
    const { firstIndex, firstRange, secondIndex, secondRange, starts, box } = options;
    const parameters = Float64Array.from(p);
    const [low, high] = [Math.min(...secondRange), Math.max(...secondRange)];
    parameters[secondIndex] = Math.min(Math.max(p[secondIndex], low), high);
    const search = sweep(system, parameters, {
      parameterIndex: firstIndex,
      from: firstRange[0],
      to: firstRange[1],
      starts,
      bands: false,
      ...(box ? { box } : {}),
    });
    for (;;) {
      const step = search.next();
      if (step.done) {
        const found = step.value.specialPoints
          .filter((one) => one.feasible)
          .map((one) => startOf(one, parameters[secondIndex]))
          .filter((one) => one !== null);
        return found.filter((one) => options.kinds.includes(one.kind));
      }
      yield this.progress(STARTED * step.value.fraction, 'looking for special points');
    }
  }

  setScope(starts: readonly BoundaryStart[]): void {
    const { system, p, options } = this;
    const scale = scaleOfStates(system.dimension, [...starts.map((one) => one.state), ...options.starts]);
    this.scope = new BoundaryScope(
      system,
      p,
      options.firstIndex,
      options.firstRange,
      options.secondIndex,
      options.secondRange,
      scale,
    );
  }

  *trace(start: BoundaryStart, fraction: number): Generator<Progress<BoundariesResult>, void> {
    const { scope, options } = this;
    if (scope === null || this.isKnown(start)) return;
    if (this.curves.length >= BOUNDARIES_DEFAULTS.curveBudget) {
      this.notes.add('The budget of curves was spent.');
      return;
    }
    const prepared = prepareStart(scope, start);
    if (prepared === null) {
      this.notes.add(
        `The ${start.kind} point at ${Number(start.first.toPrecision(6))} could not be followed in the second parameter.`,
      );
      return;
    }
    const { curve, monitor, point } = prepared;
    const budget = options.maximumPoints ?? BOUNDARIES_DEFAULTS.maximumPoints;
    const forth = yield* this.drive(followBoundary(curve, monitor, point, budget), fraction);
    let back: BoundaryFollowed | null = null;
    if (forth.end.reason !== 'closed on itself') {
      monitor.system.refer(point.x);
      const turned = { ...point, tangent: point.tangent.map((value) => -value) };
      back = yield* this.drive(followBoundary(curve, monitor, turned, budget), fraction);
    }
    const index = this.curves.length;
    const traced = assembleBoundary(monitor, start, back, forth);
    this.curves.push(traced);
    this.count += traced.first.length;
    let number = this.points.length;
    const nextId = (): string => `boundary-${(number += 1)}`;
    this.points.push(...assembleSpecialPoints(monitor, index, back, forth, nextId));
    yield this.progress(fraction, `tracing ${BOUNDARY_NAMES[start.kind]}`);
  }

  /** A Hopf curve begins at each Bogdanov-Takens point met on a fold, unless it is traced already. */
  *traceFromBogdanovTakens(): Generator<Progress<BoundariesResult>, void> {
    if (!this.options.kinds.includes('Hopf') && !this.options.start) return;
    for (const one of [...this.points]) {
      if (one.kind !== 'Bogdanov-Takens' || this.curves[one.curve].kind !== 'fold' || !one.feasible) continue;
      const { first, second, state, id } = one;
      yield* this.trace({ kind: 'Hopf', first, second, state, omega: null, specialPoint: id }, this.fraction);
    }
  }

  progress(fraction: number, stage: string): Progress<BoundariesResult> {
    this.fraction = Math.max(this.fraction, fraction);
    return { fraction: this.fraction, stage, partial: this.result('cancelled', STOPPED) };
  }

  summary(): string {
    const { curves, count } = this;
    const found =
      curves.length === 0
        ? 'No special point was found to trace.'
        : `${curves.length === 1 ? 'One curve' : `${curves.length} curves`}, ${count} points.`;
    return [found, ...this.notes].join(' ');
  }

  result(status: BoundariesResult['status'], message: string): BoundariesResult {
    const { system, options } = this;
    return {
      status,
      message,
      firstKey: system.parameterKeys[options.firstIndex] ?? '',
      secondKey: system.parameterKeys[options.secondIndex] ?? '',
      firstRange: options.firstRange,
      secondRange: options.secondRange,
      stateSymbols: system.stateSymbols,
      curves: [...this.curves],
      specialPoints: [...this.points],
      points: this.count,
      milliseconds: (options.clock?.() ?? 0) - this.began,
    };
  }

  private *drive(
    work: Generator<number, BoundaryFollowed>,
    fraction: number,
  ): Generator<Progress<BoundariesResult>, BoundaryFollowed> {
    for (;;) {
      const step = work.next();
      if (step.done) return step.value;
      if (step.value % POINTS_PER_SLICE === 0) yield this.progress(fraction, 'tracing a curve');
    }
  }

  /** Whether a curve of the same kind already passes through a start. */
  private isKnown({ kind, first, second, state }: BoundaryStart): boolean {
    const { scope } = this;
    if (scope === null) return false;
    return this.curves.some((curve) => {
      if (curve.kind !== kind) return false;
      for (let k = 0; k + 1 < curve.first.length; k += 1)
        if (this.isBetween(curve, k, first, second, state)) return true;
      return false;
    });
  }

  private isBetween(
    curve: BoundaryCurve,
    k: number,
    first: number,
    second: number,
    state: Float64Array,
  ): boolean {
    const { firstScale, secondScale, stateScale } = this.scope as BoundaryScope;
    const [ax, ay] = [curve.first[k] / firstScale, curve.second[k] / secondScale];
    const [bx, by] = [curve.first[k + 1] / firstScale, curve.second[k + 1] / secondScale];
    const [px, py] = [first / firstScale, second / secondScale];
    const length = (bx - ax) ** 2 + (by - ay) ** 2;
    const along = length > 0 ? ((px - ax) * (bx - ax) + (py - ay) * (by - ay)) / length : 0;
    const share = Math.min(Math.max(along, 0), 1);
    if (Math.hypot(ax + share * (bx - ax) - px, ay + share * (by - ay) - py) > ON_CURVE) return false;
    const n = curve.dimension;
    return state.every((value, i) => {
      const between = (1 - share) * curve.states[k * n + i] + share * curve.states[(k + 1) * n + i];
      return Math.abs(between - value) < 5 * ON_CURVE * stateScale[i];
    });
  }
}
