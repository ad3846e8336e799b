import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

/** Classic two-species case: a family of closed orbits around (m/(e a), r/a). */
export const neutralPredatorPrey = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Voles and weasels, unchecked',
  summary:
    'The neutral case that every split is held against: no self-regulation, linear response, and a constant of motion, so that every start gives a cycle of its own.',
  notes:
    'Invented scenario. Voles on an upland pasture grow without a ceiling; weasels eat them in proportion to their meetings.\n\nThe constant of motion is the first integral of Lotka (1925) and Volterra (1926).',
  tags: ['neutral', 'constant of motion', 'two species'],
  timeUnit: 'month',
  densityUnit: 'per ha',
  individualsPerUnit: 1,
  populations: [single('x', 'voles', 'weld', 60), single('y', 'weasels', 'woad', 0.4)],
  parameters: [
    parameter('r', 'growth of voles', 0.3, [0, 1], '1/month'),
    parameter('a', 'attack rate', 0.5, [0.05, 2], 'ha/month', 'area that one weasel clears of voles'),
    parameter('e', 'conversion', 0.006, [0.001, 0.03], '1', 'weasels made of one vole'),
    parameter('m', 'mortality of weasels', 0.15, [0.01, 0.6], '1/month'),
  ],
  processes: [
    process('births', 'Births of voles', 'birth', 'r*x', { x: '1' }),
    process('predation', 'Voles eaten by weasels', 'predation', 'a*x*y', { x: '-1', y: 'e' }),
    process('deaths', 'Deaths of weasels', 'death', 'm*y', { y: '-1' }),
  ],
  constantsOfMotion: ['e*a*x - m*log(x) + a*y - r*log(y)'],
  horizon: 120,
  sweeps: [{ id: 'attack', name: 'Attack rate', parameter: 'a', from: 0.1, to: 1.5 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x: 50, y: 0.6 },
      tolerance: 1e-9,
      type: 'neutral',
      source: 'Closed form x = m/(e a), y = r/a; textbook.',
    },
  ],
});
