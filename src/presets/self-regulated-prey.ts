import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

/** Prey with a ceiling: the neutral orbits wind in. Births fall and deaths rise with crowding, both never negative. */
export const selfRegulatedPrey = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Roe deer and lynx, with a ceiling on the deer',
  summary:
    'Any self-regulation of the prey turns neutral cycles into a stable equilibrium; below a ceiling the predator cannot live.',
  notes:
    'Invented scenario. Crowding adds deaths to the deer, so that births and deaths are separate events.',
  tags: ['self-regulation', 'two species', 'Lyapunov function'],
  timeUnit: 'year',
  densityUnit: 'per km²',
  individualsPerUnit: 1,
  populations: [single('x', 'roe deer', 'lichen', 12), single('y', 'lynx', 'madder', 0.05)],
  parameters: [
    parameter('r', 'growth of deer from rarity', 0.4, [0.1, 1], '1/year'),
    parameter('d', 'deaths of deer', 0.1, [0, 0.4], '1/year'),
    parameter('K', 'ceiling of deer', 20, [1, 40], 'per km²'),
    parameter('a', 'attack rate', 5, [0.5, 15], 'km²/year'),
    parameter('e', 'conversion', 0.01, [0.001, 0.05], '1'),
    parameter('m', 'mortality of lynx', 0.25, [0.05, 1], '1/year'),
  ],
  processes: [
    process('births', 'Births of deer', 'birth', '(r + d)*x', { x: '1' }),
    process('deaths', 'Deaths of deer', 'death', 'd*x', { x: '-1' }),
    process('crowding', 'Deaths of deer by crowding', 'death', 'r*x*x/K', { x: '-1' }),
    process('predation', 'Deer eaten by lynx', 'predation', 'a*x*y', { x: '-1', y: 'e' }),
    process('lynx-deaths', 'Deaths of lynx', 'death', 'm*y', { y: '-1' }),
  ],
  horizon: 80,
  sweeps: [{ id: 'ceiling', name: 'Ceiling', parameter: 'K', from: 1, to: 40 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x: 5, y: 0.06 },
      tolerance: 1e-9,
      type: 'stable focus',
      source: 'Closed form x = m/(e a), y = r (1 - x/K)/a; textbook.',
    },
    {
      kind: 'equilibrium',
      at: { x: 20, y: 0 },
      tolerance: 1e-9,
      type: 'saddle',
      source: 'Deer alone at their ceiling.',
    },
    {
      kind: 'special-point',
      sweep: { parameter: 'K', from: 1, to: 40 },
      point: 'transcritical',
      value: 5,
      tolerance: 1e-7,
      source: 'Lynx invade where K = m/(e a).',
    },
  ],
});
