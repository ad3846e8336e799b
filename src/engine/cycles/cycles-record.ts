import type { Progress, SpecialPoint } from '../continuation/contract';
import type { CompiledSystem } from '../system/contract';
import type { CycleBranch, CycleBranchEnd, CycleOrigin, CyclesResult, CycleSpecialPoint } from './contract';
import { assembleCycleBranch, isFeasible, sampleOrbit, type BranchParts } from './cycle-branch';
import { CycleCurve, type CyclePoint } from './cycle-curve';
import { cycleExtremes } from './cycle-extremes';
import { CYCLES_DEFAULTS, type CyclesOptions } from './cycles-options';
import { describeCyclePoint } from './describe-cycle';
import { isKnownCycle } from './known-cycles';
import type { CycleCrossing } from './locate-cycle';

/** Share of the range that is rounding. */
const ROUNDING = 1e-12;
const STOPPED = 'Stopped before the end; what was found is kept.';

/** A special point at which another branch is to be entered. */
export interface Switch {
  readonly curve: CycleCurve;
  readonly at: CyclePoint;
  readonly special: CycleSpecialPoint;
  /** Doublings on the way to it. */
  readonly generation: number;
}

/** What one run has found so far: branches, special points, notes, and where other branches are to be entered. */
export class CyclesRecord {
  readonly switches: Switch[] = [];
  private readonly branches: CycleBranch[] = [];
  private readonly points: CycleSpecialPoint[] = [];
  private readonly notes = new Set<string>();
  private readonly began: number;
  private count = 0;
  private reached = 0;

  constructor(
    private readonly system: CompiledSystem,
    private readonly p: Float64Array,
    private readonly options: CyclesOptions,
    private readonly parameterScale: number,
  ) {
    this.began = options.clock?.() ?? 0;
  }

  get branchCount(): number {
    return this.branches.length;
  }

  /** Share of the work done, as far as told. */
  get fraction(): number {
    return this.reached;
  }

  note(sentence: string): void {
    this.notes.add(sentence);
  }

  progress(fraction: number, stage: string): Progress<CyclesResult> {
    this.reached = Math.max(this.reached, fraction);
    return { fraction: this.reached, stage, partial: this.result('cancelled', STOPPED) };
  }

  result(status: CyclesResult['status'], message: string): CyclesResult {
    const { system, options } = this;
    system.setParameters(this.p);
    return {
      status,
      message,
      parameterKey: system.parameterKeys[options.parameterIndex] ?? '',
      from: options.from,
      to: options.to,
      stateSymbols: system.stateSymbols,
      forcingPeriod: system.forcingPeriod(),
      branches: [...this.branches],
      specialPoints: [...this.points],
      points: this.count,
      milliseconds: (options.clock?.() ?? 0) - this.began,
    };
  }

  summary(): string {
    const { branches, count } = this;
    const found =
      branches.length === 0
        ? 'No branch of cycles was found.'
        : `${branches.length === 1 ? 'One branch' : `${branches.length} branches`} of cycles, ${count} cycles.`;
    return [found, ...this.notes].join(' ');
  }

  keep(
    curve: CycleCurve,
    followed: Pick<BranchParts, 'origin' | 'hopf' | 'back' | 'forth'>,
    generation: number,
  ): void {
    const parts: BranchParts = {
      ...followed,
      cycles: curve.cycles,
      m: curve.m,
      startMessage: { reason: START_REASON[followed.origin.kind], message: beginning(followed.origin) },
    };
    const index = this.branches.length;
    const branch = assembleCycleBranch(parts, (point) => sampleOrbit(curve, point));
    this.branches.push(branch);
    this.count += branch.parameters.length;
    const lead = followed.hopf ? 1 : 0;
    const backLength = followed.back ? followed.back.cycles.length - 1 : 0;
    const { back, forth } = followed;
    const placed = [
      ...(back?.crossings ?? []).map((one) => ({ one, at: backLength - one.index - 1 })),
      ...forth.crossings.map((one) => ({ one, at: backLength + one.index + lead })),
    ].sort((a, b) => a.at - b.at);
    for (const { one, at } of placed) this.keepPoint(curve, one, index, at, generation);
  }

  private keepPoint(
    curve: CycleCurve,
    { kind, point, bracket, note }: CycleCrossing,
    branch: number,
    index: number,
    generation: number,
  ): void {
    const { cycles } = curve;
    const extremes = cycleExtremes(cycles, curve.basis, point.orbit, point.period);
    const special = describeCyclePoint(cycles, kind, point, {
      id: `cycle-${this.points.length + 1}`,
      branch,
      index,
      accuracy: Math.min(1, bracket * Math.max(Math.abs(point.tangent.parameter), 1e-3)),
      extremes,
      feasible: isFeasible(cycles, extremes.lowest),
      note: note ?? null,
    });
    this.points.push({ ...special, parameter: this.snapped(special.parameter) });
    const own =
      curve.N === point.orbit.mesh.length - 1
        ? curve
        : new CycleCurve(cycles, point.orbit.mesh.length - 1, curve.m);
    const most = this.options.doublings ?? CYCLES_DEFAULTS.doublings;
    if (!special.feasible || note) return;
    if (kind === 'period doubling' ? generation < most : kind === 'branch point of cycles')
      this.switches.push({ curve: own, at: point, special, generation });
  }

  /** A value within rounding of an end of the range is that end. */
  private snapped(value: number): number {
    const { from, to } = this.options;
    return [from, to].find((end) => Math.abs(value - end) < ROUNDING * this.parameterScale) ?? value;
  }

  isKnown(curve: CycleCurve, point: CyclePoint, besides = -1): boolean {
    const { lowest, highest } = cycleExtremes(curve.cycles, curve.basis, point.orbit, point.period);
    const others = this.branches.filter((_, k) => k !== besides);
    return isKnownCycle(others, {
      parameter: point.orbit.parameter,
      period: point.period,
      lowest,
      highest,
    });
  }

  /** Whether a branch already followed shrank to this Hopf point. */
  endsThere(hopf: SpecialPoint): boolean {
    const ends = (reason: CycleBranchEnd): boolean => reason === 'shrank to a Hopf point';
    return this.branches.some((branch) => {
      const last = branch.parameters.length - 1;
      const q = branch.quantities.length;
      const near = (k: number): boolean =>
        Math.abs(branch.parameters[k] - hopf.parameter) < 1e-2 * this.parameterScale &&
        hopf.state.every(
          (value, i) => Math.abs(branch.mean[k * q + i] - value) <= 0.05 * Math.max(Math.abs(value), 1e-12),
        );
      return (ends(branch.endEnd.reason) && near(last)) || (ends(branch.startEnd.reason) && near(0));
    });
  }
}

const START_REASON: Readonly<Record<CycleOrigin['kind'], CycleBranchEnd>> = {
  Hopf: 'shrank to a Hopf point',
  trajectory: 'could not be resolved further',
  'period map': 'could not be resolved further',
  'period doubling': 'joined the cycle it doubled from',
  'branch point of cycles': 'joined a branch already followed',
};

function beginning({ kind, parameter }: CycleOrigin): string {
  const at = format(parameter);
  switch (kind) {
    case 'Hopf':
      return `Begins at the Hopf point at ${at}.`;
    case 'period doubling':
      return `Begins at the period doubling at ${at}.`;
    case 'branch point of cycles':
      return `Begins at the branch point at ${at}.`;
    case 'trajectory':
    case 'period map':
      return `Begins at ${at}.`;
  }
}

function format(value: number): string {
  return Number(value.toPrecision(6)).toString();
}
