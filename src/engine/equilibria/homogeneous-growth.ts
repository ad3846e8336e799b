import type { CompiledSystem } from '../system/contract';
import { WHISKER } from './face-system';

/**
 * Growth from low density where no Jacobian exists because births are homogeneous of degree one
 * (a mating function): the rates of the absent classes are followed at vanishing density,
 *
 *     h(v) = lim f_Z(u* + s v)/s,   v <- (v + tau h(v)) / |v + tau h(v)|,
 *
 * until the composition v rests; the growth rate is then sum(h(v))/sum(v).
 * Own use of the power method on a homogeneous map of degree one; for the mating problem itself see
 * Caswell & Weeks, Am. Nat. 128 (1986) 707 (from memory).
 * Fails as a value where the map is not of degree one, or compositions do not settle or settle
 * differently from different starts.
 */
export const HOMOGENEOUS_DEFAULTS = { iterations: 20_000, tolerance: 1e-13, stepShare: 0.4 } as const;

export type HomogeneousGrowth =
  | { readonly status: 'settled'; readonly growthRate: number; readonly composition: Float64Array }
  | { readonly status: 'not-homogeneous' | 'not-settled' | 'not-finite'; readonly reason: string };

/** @param states indices of the absent classes that grow together; all other states stay at u */
export function homogeneousGrowth(
  system: CompiledSystem,
  u: Float64Array,
  states: readonly number[],
): HomogeneousGrowth {
  const starts = [
    new Float64Array(states.length).fill(1),
    ...states.map((_, k) => Float64Array.from(states, (_s, j) => (j === k ? 4 : 1))),
  ];
  let first: HomogeneousGrowth | null = null;
  for (const start of starts) {
    const outcome = settle(system, u, states, start);
    if (outcome.status !== 'settled') return outcome;
    if (first === null) first = outcome;
    else if (
      first.status === 'settled' &&
      Math.abs(first.growthRate - outcome.growthRate) > 1e-8 * (1 + Math.abs(first.growthRate))
    )
      return {
        status: 'not-settled',
        reason: 'the growth rate at low density depends on the composition it starts from',
      };
  }
  return first ?? { status: 'not-settled', reason: 'no class is absent' };
}

function settle(
  system: CompiledSystem,
  u: Float64Array,
  states: readonly number[],
  start: Float64Array,
): HomogeneousGrowth {
  const m = states.length;
  const v = normalised(start);
  const h = new Float64Array(m);
  const state = Float64Array.from(u);
  const f = new Float64Array(system.dimension);
  const evaluate = (size: number): boolean => {
    for (let a = 0; a < m; a += 1) state[states[a]] = size * v[a];
    system.rhs(0, state, f);
    for (let a = 0; a < m; a += 1) h[a] = f[states[a]] / size;
    return h.every(Number.isFinite);
  };
  if (!evaluate(WHISKER * 1e6)) return notFinite();
  const larger = Float64Array.from(h);
  if (!evaluate(WHISKER)) return notFinite();
  for (let a = 0; a < m; a += 1)
    if (Math.abs(larger[a] - h[a]) > 1e-9 * (Math.abs(larger[a]) + Math.abs(h[a])))
      return {
        status: 'not-homogeneous',
        reason: 'the per capita rates at vanishing density depend on the density itself',
      };

  // Rates of loss and gain cancel where v settles, so the step keeps to the fastest rate met on the way.
  let fastest = 0;
  let share: number = HOMOGENEOUS_DEFAULTS.stepShare;
  let before = Infinity;
  for (let k = 0; k < HOMOGENEOUS_DEFAULTS.iterations; k += 1) {
    if (!evaluate(WHISKER)) return notFinite();
    const growthRate = h.reduce((sum, x) => sum + x, 0);
    for (let a = 0; a < m; a += 1)
      if (v[a] > 1e-12) fastest = Math.max(fastest, Math.abs(h[a]) / v[a], Math.abs(h[a]));
    if (fastest === 0) return { status: 'settled', growthRate: 0, composition: v };
    let moved = 0;
    for (let a = 0; a < m; a += 1) moved = Math.max(moved, Math.abs(h[a] - growthRate * v[a]) / fastest);
    if (moved < HOMOGENEOUS_DEFAULTS.tolerance) return { status: 'settled', growthRate, composition: v };
    if (moved > before) share /= 2;
    before = moved;
    // Change of composition: h - (sum h) v, on the simplex sum v = 1.
    for (let a = 0; a < m; a += 1) v[a] = Math.max(0, v[a] + (share / fastest) * (h[a] - growthRate * v[a]));
    v.set(normalised(v));
  }
  return { status: 'not-settled', reason: 'the composition at low density does not settle' };
}

function normalised(v: Float64Array): Float64Array {
  const sum = v.reduce((total, x) => total + x, 0);
  return v.map((x) => x / sum);
}

function notFinite(): HomogeneousGrowth {
  return { status: 'not-finite', reason: 'the rates are not finite at vanishing density' };
}
