import { presetSchema } from '@/engine/schema/preset';

import { parameter, population, process, single } from './parts';

/** Two morphs of prey of which one is found more easily. Births are pooled, so neither morph breeds true. */
export const twoMorphPrey = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Striped and plain grasshoppers under kestrels',
  summary:
    'Kestrels find striped grasshoppers three times as easily as plain ones. The refuge in the plain morph makes the equilibrium attract.',
  notes:
    'Invented scenario. Either morph bears both morphs in equal shares.\n\nClosed form: y = b (s1/a1 + s2/a2), X = m y/(e b), x_i = s_i b X/(a_i y).',
  tags: ['two morphs', 'attack rate', 'neutral when pooled'],
  timeUnit: 'week',
  densityUnit: 'per dm²',
  populations: [
    population('x', 'grasshoppers', 'lichen', [
      { symbol: 'x1', name: 'striped', shade: 0, start: 0.8 },
      { symbol: 'x2', name: 'plain', shade: 2, start: 0.8 },
    ]),
    single('y', 'kestrels', 'sloe', 1.2),
  ],
  traits: [
    {
      symbol: 'a',
      name: 'attack rate',
      role: 'attack',
      unit: 'dm²/week',
      per: 'pair',
      meaning: 'area searched by a kestrel, by morph of the prey',
      entries: [
        { of: ['y', 'x1'], value: 0.9, source: 'invented for this scenario' },
        { of: ['y', 'x2'], value: 0.3, source: 'invented for this scenario' },
      ],
    },
    {
      symbol: 's',
      name: 'share of births',
      role: 'share-of-births',
      unit: '1',
      domain: 'share',
      followsSpread: false,
      entries: [
        { of: ['x1'], value: 0.5 },
        { of: ['x2'], value: 0.5 },
      ],
    },
  ],
  parameters: [
    parameter('b', 'births of grasshoppers', 0.8, [0.1, 2], '1/week'),
    parameter('e', 'conversion', 0.5, [0.05, 1], '1'),
    parameter('m', 'mortality of kestrels', 0.4, [0.05, 1], '1/week'),
  ],
  processes: [
    process('births', 'Births of grasshoppers', 'birth', 'b*(x1 + x2)', { x1: 's_x1', x2: 's_x2' }),
    process('eaten-1', 'Striped grasshoppers eaten', 'predation', 'a_y_x1*x1*y', { x1: '-1', y: 'e' }),
    process('eaten-2', 'Plain grasshoppers eaten', 'predation', 'a_y_x2*x2*y', { x2: '-1', y: 'e' }),
    process('deaths', 'Deaths of kestrels', 'death', 'm*y', { y: '-1' }),
  ],
  horizon: 80,
  sweeps: [{ id: 'spread', name: 'Spread', parameter: 'dial:spread', from: 0, to: 1.9 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x1: 4 / 9, x2: 4 / 3, y: 16 / 9 },
      tolerance: 1e-9,
      type: 'stable focus',
      source: 'Closed form in the notes, derived by hand.',
    },
    { kind: 'verdict', answer: 'stabilises', source: 'Routh-Hurwitz on the closed form, derived by hand.' },
  ],
});
