import type { CompiledSystem } from '../system/contract';

/** A solution at given times, of a trajectory or of one period of a cycle. */
export interface SampledSolution {
  readonly times: ArrayLike<number>;
  /** states[k*n + i]: state i at times[k]. */
  readonly states: ArrayLike<number>;
}

/** A class or a population that falls below a number of individuals. */
export interface DensityWarning {
  readonly symbol: string;
  /** `population` where the total of several classes is meant. */
  readonly of: 'class' | 'population';
  /** When it falls below first; the first time given where it begins below. */
  readonly firstTime: number;
  /** Its lowest number of individuals, and when. */
  readonly fewest: number;
  readonly fewestTime: number;
  readonly message: string;
}

export const DENSITY_WARNING_DEFAULTS = {
  /** Individuals below which a warning is due: less than one is none. */
  individuals: 1,
} as const;

/**
 * Classes and populations of which fewer than a number of individuals are left: u_i c < threshold, c individuals in
 * a unit of density. Between two times the density is taken as exponential (linear where one is not positive). What
 * is absent all along is not warned of. Empty where the number of individuals is not known.
 *
 * @param individualsPerUnit the document's own number; null where none is given
 */
export function densityWarnings(
  system: Pick<CompiledSystem, 'dimension' | 'stateSymbols' | 'populations' | 'nonnegative'>,
  solution: SampledSolution,
  individualsPerUnit: number | null,
  threshold: number = DENSITY_WARNING_DEFAULTS.individuals,
): DensityWarning[] {
  if (individualsPerUnit === null || solution.times.length === 0) return [];
  const warnings: DensityWarning[] = [];
  const look = (symbol: string, of: DensityWarning['of'], states: readonly number[]): void => {
    const counts = Float64Array.from(
      solution.times,
      (_, k) =>
        individualsPerUnit * states.reduce((sum, i) => sum + solution.states[k * system.dimension + i], 0),
    );
    const warning = belowThreshold(solution.times, counts, threshold);
    if (warning) warnings.push({ symbol, of, ...warning, message: inWords(symbol, warning, threshold) });
  };
  system.stateSymbols.forEach((symbol, i) => {
    if (system.nonnegative[i]) look(symbol, 'class', [i]);
  });
  for (const { symbol, states } of system.populations)
    if (states.length > 1 && states.every((i) => system.nonnegative[i])) look(symbol, 'population', states);
  return warnings;
}

type Lowest = Pick<DensityWarning, 'firstTime' | 'fewest' | 'fewestTime'>;

function belowThreshold(times: ArrayLike<number>, counts: Float64Array, threshold: number): Lowest | null {
  if (counts.every((count) => count === 0)) return null;
  const first = counts.findIndex((count) => count < threshold);
  if (first < 0) return null;
  let lowest = first;
  counts.forEach((count, k) => {
    if (count < counts[lowest]) lowest = k;
  });
  return {
    firstTime: crossing(times, counts, first, threshold),
    fewest: counts[lowest],
    fewestTime: times[lowest],
  };
}

/** When the count passed the threshold on its way from the sample before. */
function crossing(times: ArrayLike<number>, counts: Float64Array, k: number, threshold: number): number {
  if (k === 0) return times[0];
  const [before, after] = [counts[k - 1], counts[k]];
  const share =
    after > 0
      ? Math.log(before / threshold) / Math.log(before / after)
      : (before - threshold) / (before - after);
  return times[k - 1] + share * (times[k] - times[k - 1]);
}

function inWords(symbol: string, { firstTime, fewest, fewestTime }: Lowest, threshold: number): string {
  const limit = threshold === 1 ? 'one individual' : `${threshold} individuals`;
  const [first, few, when] = [firstTime, fewest, fewestTime].map((value) =>
    String(Number(value.toPrecision(3))),
  );
  return `${symbol} falls below ${limit} at t = ${first} and down to ${few} at t = ${when}: there chance decides, which this model leaves out.`;
}
