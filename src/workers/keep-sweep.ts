import type { SplitAnd } from '../engine/analyses/contract';
import type { Branch, SpecialPoint, SweepResult } from '../engine/continuation/contract';
import type { CycleBranch, CyclesResult, CycleSpecialPoint } from '../engine/cycles/contract';
import type { SplitSweepResult } from '../engine/explore/contract';
import {
  KEPT_SWEEP_LIMITS,
  type KeptBranch,
  type KeptModel,
  type KeptPoint,
  type KeptSweep,
} from '../contract/kept-sweep';

/** Digits that are kept of every number: more than a plot shows and than a tolerance asks for. */
const DIGITS = 8;
const WORDS = 500;
/** Points that even the shortest branch keeps, and the share of all numbers that is planned with for it. */
const FEWEST = 3;
const PLANNED = 0.75;
const rounded = (value: number) => Number(value.toPrecision(DIGITS));
const finite = (value: number) => Number.isFinite(value);

/** What a branch was, before it is thinned. */
interface Series {
  readonly of: KeptBranch['of'];
  readonly parameters: Float64Array;
  readonly attracts: Uint8Array;
  readonly symbols: readonly string[];
  /** Value of each symbol at a point. */
  readonly value: (point: number, symbol: number) => number;
  readonly lowest: ((point: number, symbol: number) => number) | null;
}

function ofEquilibria(symbols: readonly string[], branch: Branch): Series {
  const n = branch.dimension;
  return {
    of: 'equilibria',
    parameters: branch.parameters,
    attracts: branch.attracts,
    symbols,
    value: (point, symbol) => branch.states[point * n + symbol] ?? NaN,
    lowest: null,
  };
}

function ofCycles(symbols: readonly string[], branch: CycleBranch): Series {
  const m = branch.quantities.length;
  const at = symbols.map((symbol) => branch.quantities.indexOf(symbol));
  const read = (from: Float64Array) => (point: number, symbol: number) =>
    from[point * m + (at[symbol] ?? -1)] ?? NaN;
  return {
    of: 'cycles',
    parameters: branch.parameters,
    attracts: branch.attracts,
    symbols,
    value: read(branch.highest),
    lowest: read(branch.lowest),
  };
}

/** Points that stay whatever is thinned: ends, turns of the parameter, changes of stability. */
function landmarks({ parameters, attracts }: Series): Set<number> {
  const last = parameters.length - 1;
  const kept = new Set([0, Math.max(0, last)]);
  for (let k = 1; k < last; k += 1) {
    const [before, here, after] = [parameters[k - 1] ?? 0, parameters[k] ?? 0, parameters[k + 1] ?? 0];
    if ((here - before) * (after - here) < 0) kept.add(k);
    if (attracts[k] !== attracts[k - 1]) kept.add(k - 1).add(k);
  }
  return kept;
}

/** At most `room` points in order: the landmarks, and the rest evenly. */
function thin(series: Series, room: number): number[] {
  const count = series.parameters.length;
  const all = Array.from({ length: count }, (_, k) => k);
  if (count <= room) return all;
  const kept = landmarks(series);
  const stride = count / Math.max(1, room - kept.size);
  for (let k = 0; k < count && kept.size < room; k += stride) kept.add(Math.floor(k));
  return [...kept].sort((a, b) => a - b).slice(0, room);
}

function keepBranch(series: Series, room: number): KeptBranch {
  const points = thin(series, room).filter(
    (k) => finite(series.parameters[k] ?? NaN) && series.symbols.every((_, i) => finite(series.value(k, i))),
  );
  const column = (read: Series['value']) =>
    Object.fromEntries(series.symbols.map((symbol, i) => [symbol, points.map((k) => rounded(read(k, i)))]));
  return {
    of: series.of,
    parameters: points.map((k) => rounded(series.parameters[k] ?? 0)),
    values: column(series.value),
    lowest: series.lowest ? column(series.lowest) : {},
    attracts: points.map((k) => series.attracts[k] ?? 2),
  };
}

function keepPoint(symbols: readonly string[], point: SpecialPoint): KeptPoint {
  return {
    kind: point.kind,
    parameter: point.parameter,
    state: Object.fromEntries(
      symbols
        .map((symbol, i) => [symbol, rounded(point.state[i] ?? 0)])
        .filter(([, value]) => finite(Number(value))),
    ),
    period: point.hopf ? rounded((2 * Math.PI) / point.hopf.omega) : null,
    meaning: point.meaning.slice(0, WORDS),
  };
}

function keepCyclePoint(point: CycleSpecialPoint): KeptPoint {
  return {
    kind: point.kind,
    parameter: point.parameter,
    state: {},
    period: rounded(point.period),
    meaning: point.meaning.slice(0, WORDS),
  };
}

/** Numbers that one point of a branch takes. */
const width = ({ symbols, lowest }: Series) => 2 + symbols.length * (lowest ? 2 : 1);

function keepModel(sweep: SweepResult, cycles: CyclesResult | null, numbers: number): KeptModel {
  const series = [
    ...sweep.branches.map((branch) => ofEquilibria(sweep.stateSymbols, branch)),
    ...(cycles?.branches ?? []).map((branch) => ofCycles(sweep.stateSymbols, branch)),
  ].filter((one) => one.parameters.length > 0);
  const shown = series.slice(0, KEPT_SWEEP_LIMITS.branches);
  const wanted = shown.reduce((sum, one) => sum + one.parameters.length * width(one), 0);
  const share = Math.min(1, numbers / Math.max(1, wanted));
  const room = ({ parameters }: Series) =>
    Math.min(KEPT_SWEEP_LIMITS.pointsPerBranch, Math.max(FEWEST, Math.floor(parameters.length * share)));
  const points = [
    ...sweep.specialPoints
      .filter((one) => finite(one.parameter))
      .map((one) => keepPoint(sweep.stateSymbols, one)),
    ...(cycles?.specialPoints ?? [])
      .filter((one) => finite(one.parameter) && finite(one.period))
      .map(keepCyclePoint),
  ].sort((a, b) => a.parameter - b.parameter);
  return {
    message: sweep.message.slice(0, WORDS),
    complete: sweep.status === 'complete',
    thinned:
      shown.length < series.length ||
      shown.some((one) => room(one) < one.parameters.length) ||
      points.length > KEPT_SWEEP_LIMITS.specialPoints,
    points: points.slice(0, KEPT_SWEEP_LIMITS.specialPoints),
    branches: shown.map((one) => keepBranch(one, room(one))),
  };
}

/**
 * A sweep with its cycles as it is kept with a hand-in or a reference: every special point, and the branches
 * thinned to what a plot needs, ends, turns and changes of stability staying.
 */
export function keepSweep(
  { split, twin }: Pick<SplitSweepResult, 'split' | 'twin'>,
  cycles: SplitAnd<CyclesResult> | null,
  computedAt = new Date(),
): KeptSweep {
  const numbers = Math.floor((KEPT_SWEEP_LIMITS.numbers * PLANNED) / (twin ? 2 : 1));
  return {
    range: {
      parameter: split.parameterKey,
      from: Math.min(split.from, split.to),
      to: Math.max(split.from, split.to),
    },
    computedAt: computedAt.toISOString(),
    split: keepModel(split, cycles?.split ?? null, numbers),
    twin: twin ? keepModel(twin, cycles?.twin ?? null, numbers) : null,
  };
}
