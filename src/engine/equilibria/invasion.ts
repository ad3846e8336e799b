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
  const smoothHere = differentiabilityAt(system, u, states, scale);
  if (!smoothHere.differentiable) {
    const growth = homogeneousGrowth(system, u, states);
    if (growth.status !== 'settled')
      return answer(null, 0, 'none', `No derivative at zero density, and ${growth.reason}.`);
    return answer(
      growth.growthRate,
      1e-10 * (1 + Math.abs(growth.growthRate)),
      'homogeneous growth rate',
      'Births depend on both sexes to the first degree, so the growth rate at low density is that of the composition which settles.',
    );
  }
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
