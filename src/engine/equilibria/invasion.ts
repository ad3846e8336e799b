import type { CompiledSystem, StatePopulation } from '../system/contract';
import type { Invasion } from './contract';
import { differentiabilityAt } from './differentiability';
import { absenceOf } from './faces';
import { homogeneousGrowth } from './homogeneous-growth';
import { spectrumOf } from './spectrum';

/**
 * Whether an absent population can grow from low density at the equilibrium u: the leading eigenvalue
 * of its transversal block J[Z][Z], Z its classes, where its absence lasts; the growth rate of the
 * homogeneous map where births are a mating function and no derivative exists.
 *
 * @param J Jacobian at u; may hold non-finite entries
 * @param scale typical size of each state
 */
export function invasionOf(
  system: CompiledSystem,
  population: StatePopulation,
  u: Float64Array,
  J: Float64Array,
  scale: Float64Array,
  uncertainty: number,
): Invasion {
  const states = population.states;
  const answer = (
    rate: number | null,
    bound: number,
    method: Invasion['method'],
    reason: string,
  ): Invasion => ({
    population: population.symbol,
    answer:
      rate === null || Math.abs(rate) <= bound ? 'undecided' : rate > 0 ? 'can invade' : 'cannot invade',
    growthRate: rate,
    method,
    reason,
  });
  if (absenceOf(system, states, scale) === 'does not last')
    return {
      population: population.symbol,
      answer: 'not-invariant',
      growthRate: null,
      method: 'none',
      reason: `The absence of ${population.name} does not last: something feeds it from outside, so the question does not arise.`,
    };
  if (!differentiabilityAt(system, u, states, scale).differentiable)
    return growthFromZero(system, population.symbol, states, u);
  const m = states.length;
  const n = system.dimension;
  const block = new Float64Array(m * m);
  for (let a = 0; a < m; a += 1)
    for (let b = 0; b < m; b += 1) block[a * m + b] = J[states[a] * n + states[b]];
  const spectrum = spectrumOf(block, m, uncertainty);
  if (spectrum === null) return answer(null, 0, 'none', 'The rates have no finite derivative here.');
  const rate = spectrum.re[0];
  const verb = rate > 0 ? 'grows' : 'declines';
  return answer(
    rate,
    spectrum.error[0],
    'transversal block',
    Math.abs(rate) <= spectrum.error[0]
      ? 'Its growth rate from low density is zero within the accuracy reached.'
      : `From low density it ${verb} at the leading eigenvalue of its own block.`,
  );
}

/** Accuracy of a growth rate once its composition has settled, relative to the rate and in all. */
const SETTLED = 1e-10;

/** Growth from vanishing density of classes that have no derivative there. */
function growthFromZero(
  system: CompiledSystem,
  name: string,
  states: readonly number[],
  u: Float64Array,
): Invasion {
  const growth = homogeneousGrowth(system, u, states);
  if (growth.status !== 'settled')
    return {
      population: name,
      answer: 'undecided',
      growthRate: null,
      method: 'none',
      reason: `No derivative at zero density, and ${growth.reason}.`,
    };
  const { growthRate } = growth;
  const decided = Math.abs(growthRate) > SETTLED * (1 + Math.abs(growthRate));
  return {
    population: name,
    answer: !decided ? 'undecided' : growthRate > 0 ? 'can invade' : 'cannot invade',
    growthRate,
    method: 'homogeneous growth rate',
    reason:
      'Births depend on several classes to the first degree, so the growth rate at low density is that of the composition which settles.',
    composition: Array.from(growth.composition),
  };
}

/**
 * Invasion by several absent populations together, which can succeed where none of them grows alone (sexes
 * written as populations of their own). Asked only where the rates have no derivative at their absence.
 */
export function jointInvasion(
  system: CompiledSystem,
  populations: readonly StatePopulation[],
  u: Float64Array,
): Invasion {
  const name = populations.map((one) => one.symbol).join(' and ');
  return growthFromZero(
    system,
    name,
    populations.flatMap((one) => [...one.states]),
    u,
  );
}
