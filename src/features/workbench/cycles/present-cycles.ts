/** The cycles at one value of the parameter, between the neighbours that were continued. */
import type { CycleBranch, CyclesResult } from '@/engine/cycles/contract';
import type { Eigenvalue } from '@/engine/equilibria/contract';

export interface PresentCycle {
  readonly branch: number;
  /** Index of the point before it, and the share of the way to the next one. */
  readonly index: number;
  readonly share: number;
  /** True where a continued cycle lies at the very value; else it is interpolated. */
  readonly exact: boolean;
  readonly period: number;
  /** 1 attracts, 0 repels, 2 undecided. */
  readonly attracts: number;
  readonly feasible: boolean;
  readonly quantities: readonly string[];
  readonly lowest: Float64Array;
  readonly highest: Float64Array;
  readonly mean: Float64Array;
  /** Of the nearer neighbour. */
  readonly multipliers: readonly Eigenvalue[];
  readonly trivialError: number;
}

/** Shares of a step within which a continued cycle is as good as the one at the value: its own accuracy. */
const EXACT = 1e-6;

/** Every cycle at a value of the parameter: a branch that turns back is met more than once. */
export function cyclesAt(result: CyclesResult, value: number): readonly PresentCycle[] {
  return result.branches.flatMap((branch, index) => meetings(branch, index, value));
}

function meetings(branch: CycleBranch, index: number, value: number): readonly PresentCycle[] {
  const found: PresentCycle[] = [];
  const { parameters } = branch;
  for (let k = 0; k + 1 < parameters.length; k++) {
    const a = parameters[k] ?? NaN;
    const b = parameters[k + 1] ?? NaN;
    const last = k + 2 === parameters.length;
    // A point shared by two steps is met once.
    const within = a === b ? false : (value - a) * (value - b) <= 0 && (value !== b || last);
    if (within) found.push(between(branch, index, k, (value - a) / (b - a)));
  }
  if (parameters.length === 1 && parameters[0] === value) found.push(between(branch, index, 0, 0));
  return found;
}

function between(branch: CycleBranch, index: number, k: number, share: number): PresentCycle {
  const m = branch.quantities.length;
  const mix = (values: Float64Array, width: number) =>
    Float64Array.from({ length: width }, (_value, i) => {
      const a = values[k * width + i] ?? NaN;
      return share === 0 ? a : a + share * ((values[(k + 1) * width + i] ?? NaN) - a);
    });
  // Lowest densities fall by decades along a branch: between two positive ones their logarithms are mixed.
  const low = mix(branch.lowest, m).map((value, i) => {
    const a = branch.lowest[k * m + i] ?? NaN;
    const b = branch.lowest[(share === 0 ? k : k + 1) * m + i] ?? NaN;
    return a > 0 && b > 0 ? a * (b / a) ** share : value;
  });
  const near = share < 0.5 ? k : k + 1;
  const sides = [branch.attracts[k], branch.attracts[share === 0 ? k : k + 1]];
  return {
    branch: index,
    index: k,
    share,
    exact: Math.min(share, 1 - share) < EXACT,
    period: mix(branch.periods, 1)[0] ?? NaN,
    attracts:
      branch.attracts[near] === 2 ? (sides.find((one) => one !== 2) ?? 2) : (branch.attracts[near] ?? 2),
    feasible: branch.feasible[near] === 1,
    quantities: branch.quantities,
    lowest: low,
    highest: mix(branch.highest, m),
    mean: mix(branch.mean, m),
    multipliers: multipliersAt(branch, near),
    trivialError: branch.trivialError[near] ?? 0,
  };
}

export function multipliersAt(branch: CycleBranch, k: number): readonly Eigenvalue[] {
  const n = branch.dimension;
  return Array.from({ length: n }, (_value, j) => ({
    re: branch.multipliers[(k * n + j) * 2] ?? NaN,
    im: branch.multipliers[(k * n + j) * 2 + 1] ?? NaN,
  }));
}

/**
 * The cycle itself, as states one after another, the last equal to the first. Between two continued cycles
 * the states at equal phases are interpolated: their phases are aligned by the continuation.
 */
export function presentOrbit(branch: CycleBranch, { index, share }: PresentCycle): Float64Array {
  const { orbits, orbitSamples, dimension } = branch;
  const size = orbitSamples * dimension;
  const own = orbits.subarray(index * size, (index + 1) * size);
  if (share === 0) return own;
  const other = new PhaseReader(branch, index + 1);
  const phases = branch.orbitPhases.subarray(index * orbitSamples, (index + 1) * orbitSamples);
  const mixed = new Float64Array(size);
  for (let s = 0; s < orbitSamples; s++) {
    other.seek(phases[s] ?? 0);
    for (let i = 0; i < dimension; i++) {
      const a = own[s * dimension + i] ?? NaN;
      mixed[s * dimension + i] = a + share * (other.at(i) - a);
    }
  }
  return mixed;
}

/** Reads a cycle at rising phases, linear between its samples. */
class PhaseReader {
  private sample = 0;
  private share = 0;

  constructor(
    private readonly branch: CycleBranch,
    private readonly k: number,
  ) {}

  seek(phase: number): void {
    const { orbitPhases, orbitSamples } = this.branch;
    const first = this.k * orbitSamples;
    while (this.sample + 2 < orbitSamples && (orbitPhases[first + this.sample + 1] ?? 1) < phase)
      this.sample++;
    const a = orbitPhases[first + this.sample] ?? 0;
    const b = orbitPhases[first + this.sample + 1] ?? 1;
    this.share = b > a ? Math.min(1, Math.max(0, (phase - a) / (b - a))) : 0;
  }

  at(i: number): number {
    const { orbits, orbitSamples, dimension } = this.branch;
    const from = (this.k * orbitSamples + this.sample) * dimension + i;
    const a = orbits[from] ?? NaN;
    return a + this.share * ((orbits[from + dimension] ?? NaN) - a);
  }
}
