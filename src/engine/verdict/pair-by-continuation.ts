import type { Eigenvalue, Equilibrium } from '../equilibria/contract';
import { compositionJacobian } from '../equilibria/composition';
import { faceProblem, wholeSpace } from '../equilibria/face-system';
import { newton } from '../equilibria/newton';
import { eigenvalues } from '../linalg/eigenvalues';
import type { CompiledSystem } from '../system/contract';

/**
 * Pairs coexistence equilibria of the split model with those of its pooled twin: each split one is
 * followed from the present spread to 0 by Newton's method in small steps of the dial, and its population
 * totals there are compared with the twin's. On the way eigenvalues are matched to their nearest
 * predecessors, so that those which become pure changes of composition at spread 0 are known and are not
 * mistaken for a stability margin. A step that Newton's method cannot make leaves the equilibrium
 * unpaired, with the spread at which it was lost.
 */
export interface EquilibriumPair {
  readonly split: Equilibrium;
  /** Null where the way to spread 0 breaks off or ends at none of the twin's equilibria. */
  readonly pooled: Equilibrium | null;
  /** Largest real part without the modes that are pure composition at spread 0; null where unknown. */
  readonly dynamicLeading: number | null;
  /** Spread at which the equilibrium was lost on the way to 0; null where it was not. */
  readonly lostAt: number | null;
}

export interface PairingInput {
  /** The split model; its parameters are set back to `p` at the end. */
  readonly system: CompiledSystem;
  readonly p: Float64Array;
  /** Index in p of the common dial. */
  readonly spreadIndex: number;
  readonly split: readonly Equilibrium[];
  readonly pooled: readonly Equilibrium[];
  /** For each state of the twin, the split states that it sums. */
  readonly twinStates: readonly (readonly number[])[];
}

export const PAIRING_DEFAULTS = { steps: 40, matchTolerance: 1e-5 } as const;

export function pairByContinuation(input: PairingInput): EquilibriumPair[] {
  const pairs = input.split.map((equilibrium) => pairOne(input, equilibrium));
  input.system.setParameters(input.p);
  return pairs;
}

function pairOne(input: PairingInput, split: Equilibrium): EquilibriumPair {
  const { system, spreadIndex, twinStates } = input;
  const n = system.dimension;
  const p = Float64Array.from(input.p);
  const spread = p[spreadIndex];
  const scale = split.state.map((x) => Math.max(Math.abs(x), Number.MIN_VALUE));
  const problem = faceProblem(system, wholeSpace(system), false);
  const J = new Float64Array(n * n);
  let state: Float64Array = Float64Array.from(split.state);
  // order[k]: index, at the present spread, of the eigenvalue that is now the k-th.
  let order = split.eigenvalues.map((_, k) => k);
  let spectrum: readonly Eigenvalue[] = split.eigenvalues;
  for (let step = 1; step <= PAIRING_DEFAULTS.steps; step += 1) {
    p[spreadIndex] = spread * (1 - step / PAIRING_DEFAULTS.steps);
    system.setParameters(p);
    const outcome = newton(problem, state, { scale });
    if (outcome.status !== 'converged' || outcome.state.some((x, i) => system.nonnegative[i] && x < 0))
      return { split, pooled: null, dynamicLeading: null, lostAt: p[spreadIndex] };
    state = outcome.state;
    system.jacobian(0, state, J);
    const next = spectrumAt(J, n);
    order = follow(spectrum, next, order);
    spectrum = next;
  }
  const totals = twinStates.map((states) => states.reduce((sum, i) => sum + state[i], 0));
  const pooled = input.pooled.find((candidate) =>
    candidate.state.every((x, k) => {
      const whole = candidate.state.length === totals.length ? totals[k] : state[k];
      return Math.abs(x - whole) <= PAIRING_DEFAULTS.matchTolerance * Math.max(Math.abs(x), Math.abs(whole));
    }),
  );
  return {
    split,
    pooled: pooled ?? null,
    dynamicLeading: dynamicLeading(system, J, spectrum, order, split.eigenvalues),
    lostAt: null,
  };
}

function spectrumAt(J: Float64Array, n: number): Eigenvalue[] {
  const { re, im } = eigenvalues(J, n);
  return Array.from(re, (value, k) => ({ re: value, im: im[k] }));
}

const distance = (a: Eigenvalue, b: Eigenvalue): number => Math.hypot(a.re - b.re, a.im - b.im);

/** Carries the origin of each eigenvalue over to the nearest one of the next spectrum. */
function follow(
  before: readonly Eigenvalue[],
  after: readonly Eigenvalue[],
  order: readonly number[],
): number[] {
  const origin = new Array<number>(after.length).fill(-1);
  const candidates = before
    .flatMap((a, i) => after.map((b, k) => ({ i, k, gap: distance(a, b) })))
    .sort((x, y) => x.gap - y.gap);
  const used = new Set<number>();
  for (const { i, k } of candidates) {
    if (used.has(i) || origin[k] >= 0) continue;
    used.add(i);
    origin[k] = order[i];
  }
  return origin;
}

/** Leading real part at the present spread among eigenvalues that are no composition modes at spread 0. */
function dynamicLeading(
  system: CompiledSystem,
  J: Float64Array,
  spectrum: readonly Eigenvalue[],
  order: readonly number[],
  present: readonly Eigenvalue[],
): number | null {
  const composition = compositionJacobian(system, J);
  if (composition === null) return null;
  const modes = composition.size === 0 ? [] : spectrumAt(composition.matrix, composition.size);
  const taken = new Set<number>();
  for (const mode of modes) {
    let best = -1;
    spectrum.forEach((value, k) => {
      if (taken.has(k)) return;
      if (best < 0 || distance(value, mode) < distance(spectrum[best], mode)) best = k;
    });
    taken.add(best);
  }
  const dynamic = order.filter((_, k) => !taken.has(k)).map((origin) => present[origin].re);
  return dynamic.length === 0 ? null : Math.max(...dynamic);
}
