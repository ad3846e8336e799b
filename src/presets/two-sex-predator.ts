import { presetSchema } from '@/engine/schema/preset';

import { parameter, population, process, shares, single, trait } from './parts';

/** Equal births, unequal deaths: the split alone makes the neutral equilibrium attract. */
export const twoSexPredator = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Wolf spiders on springtails, by sex',
  summary:
    'Males die twice as fast as females. With the sexes pooled the equilibrium is neutral; the difference alone makes it attract.',
  notes:
    'Invented scenario. Both sexes hunt alike, and half of the newborn are male.\n\nClosed form with shares s, mortalities m: x = 1/(e a (s1/m1 + s2/m2)), Y = r/a, y_i = s_i e a x Y/m_i.',
  tags: ['two sexes', 'mortality', 'neutral when pooled'],
  timeUnit: 'week',
  densityUnit: 'per m²',
  individualsPerUnit: 1,
  populations: [
    single('x', 'springtails', 'weld', 0.6),
    population('y', 'spiders', 'woad', [
      { symbol: 'y1', name: 'males', shade: 0, start: 0.6 },
      { symbol: 'y2', name: 'females', shade: 2, start: 0.6 },
    ]),
  ],
  traits: [
    trait('m', 'mortality', 'mortality', '1/week', { y1: 0.6, y2: 0.3 }),
    trait('a', 'attack rate', 'attack', 'm²/week', { y1: 0.8, y2: 0.8 }),
    shares('s', { y1: 0.5, y2: 0.5 }),
  ],
  parameters: [
    parameter('r', 'growth of springtails', 1, [0.1, 3], '1/week'),
    parameter('e', 'conversion', 0.5, [0.05, 1], '1'),
  ],
  processes: [
    process('births', 'Births of springtails', 'birth', 'r*x', { x: '1' }),
    process('eaten-1', 'Springtails eaten by males', 'predation', 'a_y1*x*y1', {
      x: '-1',
      y1: 'e*s_y1',
      y2: 'e*s_y2',
    }),
    process('eaten-2', 'Springtails eaten by females', 'predation', 'a_y2*x*y2', {
      x: '-1',
      y1: 'e*s_y1',
      y2: 'e*s_y2',
    }),
    process('deaths-1', 'Deaths of males', 'death', 'm_y1*y1', { y1: '-1' }),
    process('deaths-2', 'Deaths of females', 'death', 'm_y2*y2', { y2: '-1' }),
  ],
  horizon: 80,
  sweeps: [{ id: 'spread', name: 'Spread', parameter: 'dial:spread', from: 0, to: 2.5 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x: 1, y1: 5 / 12, y2: 5 / 6 },
      tolerance: 1e-9,
      type: 'stable focus',
      source: 'Closed form in the notes, derived by hand.',
    },
    {
      kind: 'equilibrium',
      parameters: { 'dial:spread': 0 },
      at: { x: 1.125, y1: 0.625, y2: 0.625 },
      tolerance: 1e-9,
      type: 'neutral',
      source: 'Closed form at the pooled mortality 0.45.',
    },
    {
      kind: 'verdict',
      answer: 'stabilises',
      source: 'Routh-Hurwitz on the closed form: the pair leaves the axis at second order in spread.',
    },
  ],
});
