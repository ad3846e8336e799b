import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

/** Fishing takes both species alike: it lowers the predator and raises the prey; closing it does the reverse. */
export const harvestAndClosure = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Smelt and pikeperch: fishing, and its closure',
  summary:
    'One net takes predator and prey alike. Lighter fishing lowers the prey and raises the predator; where no prey regulates itself the orbits stay neutral.',
  notes:
    'Invented scenario of a lake fishery. Set the effort to 0 to see its closure.\n\nClosed form: x = (m + q E)/(e a), y = (r - q E)/a.\n\nA model is no permit: before harvesting or controlling a wild population, local regulation and qualified judgement decide.',
  tags: ['harvest', 'neutral', 'constant of motion'],
  timeUnit: 'year',
  densityUnit: 't/km²',
  populations: [single('x', 'smelt', 'slate', 10), single('y', 'pikeperch', 'madder', 1)],
  parameters: [
    parameter('r', 'growth of smelt', 0.9, [0.1, 2], '1/year'),
    parameter('a', 'attack rate', 0.5, [0.05, 2], 'km²/(t year)'),
    parameter('e', 'conversion', 0.1, [0.01, 0.3], '1'),
    parameter('m', 'mortality of pikeperch', 0.4, [0.05, 1], '1/year'),
    parameter('q', 'catchability', 0.25, [0, 1], '1', 'share of the stock taken by one unit of effort'),
    parameter('E', 'fishing effort', 1.2, [0, 4], '1/year'),
  ],
  processes: [
    process('births', 'Births of smelt', 'birth', 'r*x', { x: '1' }),
    process('predation', 'Smelt eaten by pikeperch', 'predation', 'a*x*y', { x: '-1', y: 'e' }),
    process('deaths', 'Deaths of pikeperch', 'death', 'm*y', { y: '-1' }),
    process('smelt-catch', 'Catch of smelt', 'harvest', 'q*E*x', { x: '-1' }),
    process('pikeperch-catch', 'Catch of pikeperch', 'harvest', 'q*E*y', { y: '-1' }),
  ],
  constantsOfMotion: ['e*a*x - (m + q*E)*log(x) + a*y - (r - q*E)*log(y)'],
  horizon: 60,
  sweeps: [{ id: 'effort', name: 'Effort', parameter: 'E', from: 0, to: 4 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x: 14, y: 1.2 },
      tolerance: 1e-9,
      type: 'neutral',
      source: 'Closed form in the notes.',
    },
    {
      kind: 'equilibrium',
      parameters: { E: 0 },
      at: { x: 8, y: 1.8 },
      tolerance: 1e-9,
      type: 'neutral',
      source: 'Closed form without fishing: fewer smelt, more pikeperch.',
    },
    {
      kind: 'special-point',
      sweep: { parameter: 'E', from: 0, to: 4 },
      point: 'transcritical',
      value: 3.6,
      tolerance: 1e-6,
      source: 'Pikeperch vanish and smelt stop growing where q E = r.',
    },
  ],
});
