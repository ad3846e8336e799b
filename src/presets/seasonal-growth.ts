import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

/** Growth of the prey follows the year; explicit time in a formula. */
export const seasonalGrowth = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Lemmings and stoats through the seasons',
  summary:
    'The growth of the prey follows the year. A neutral pair driven by seasons swings down to densities that no whole animal can have.',
  notes:
    'Invented scenario. The season factor is 1 + c cos(2 pi (t - top)/year); 2 pi is written out.\n\nEquilibria do not exist under explicit time; they are replaced by the period map, which the workbench says.',
  tags: ['season', 'explicit time', 'two species'],
  timeUnit: 'month',
  densityUnit: 'per ha',
  individualsPerUnit: 1,
  populations: [single('x', 'lemmings', 'weld', 20), single('y', 'stoats', 'slate', 0.3)],
  parameters: [
    parameter('r', 'mean growth of lemmings', 0.25, [0, 1], '1/month'),
    parameter('c', 'strength of the season', 0.9, [0, 1], '1'),
    parameter('year', 'length of the year', 12, [6, 24], 'month'),
    parameter('top', 'month of fastest growth', 6, [0, 12], 'month'),
    parameter('a', 'attack rate', 0.6, [0.05, 2], 'ha/month'),
    parameter('e', 'conversion', 0.01, [0.001, 0.05], '1'),
    parameter('m', 'mortality of stoats', 0.12, [0.01, 0.5], '1/month'),
  ],
  intermediates: [
    {
      symbol: 'season',
      formula: '1 + c*cos(6.283185307179586*(t - top)/year)',
      unit: '1',
      meaning: 'growth relative to its yearly mean',
    },
  ],
  processes: [
    process('births', 'Births of lemmings', 'birth', 'r*season*x', { x: '1' }),
    process('predation', 'Lemmings eaten by stoats', 'predation', 'a*x*y', { x: '-1', y: 'e' }),
    process('deaths', 'Deaths of stoats', 'death', 'm*y', { y: '-1' }),
  ],
  horizon: 240,
  knownFacts: [
    {
      kind: 'trajectory',
      starts: { x: 20, y: 0 },
      time: 12,
      at: { x: 20 * Math.exp(0.25 * 12), y: 0 },
      tolerance: 1e-7,
      source:
        'Without stoats a whole year multiplies lemmings by exp(r year): the season integrates to zero. Derived by hand.',
    },
    {
      kind: 'trajectory',
      starts: { x: 20, y: 0 },
      time: 3,
      at: { x: 20 * Math.exp(0.25 * (3 - (0.9 * 12) / (2 * Math.PI))), y: 0 },
      tolerance: 1e-7,
      source:
        'x0 exp(r (t + c year/(2 pi) (sin(2 pi (t - top)/year) - sin(-2 pi top/year)))) at t = 3. Derived by hand.',
    },
  ],
});
