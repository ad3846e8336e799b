import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

const SPECIES = ['x', 'y', 'z'] as const;

/** Each of three species beats the next: near the edges the run goes ever more slowly from one to the next. */
export const threeCompetitors = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Three lichens in a ring',
  summary:
    'Each lichen overgrows the next. Coexistence repels, and dominance passes round the ring ever more slowly, though every pair by itself has a winner.',
  notes:
    'Invented scenario with the symmetric competition of May & Leonard (1975, SIAM J. Appl. Math. 29:243, from memory).\n\nClosed form: N = K/(1 + c + d); the pair of eigenvalues crosses the axis where c + d = 2, without making small cycles of its own.',
  tags: ['competition', 'three species', 'cyclic dominance'],
  timeUnit: 'year',
  densityUnit: 'cm²/dm²',
  populations: [
    single('x', 'crust', 'weld', 4),
    single('y', 'leaf', 'lichen', 3),
    single('z', 'shrub', 'sloe', 2.5),
  ],
  parameters: [
    parameter('r', 'growth', 0.5, [0.1, 2], '1/year'),
    parameter('K', 'ceiling', 10, [1, 40], 'cm²/dm²'),
    parameter('c', 'weak effect', 0.7, [0, 1.5], '1', 'of the lichen that one overgrows'),
    parameter('d', 'strong effect', 1.4, [0, 3], '1', 'of the lichen that overgrows one'),
  ],
  processes: SPECIES.flatMap((own, index) => {
    const weak = SPECIES[(index + 1) % 3] ?? own;
    const strong = SPECIES[(index + 2) % 3] ?? own;
    return [
      process(`${own}-growth`, `Growth of ${own}`, 'birth', `r*${own}`, { [own]: '1' }),
      process(
        `${own}-crowding`,
        `Losses of ${own} by overgrowth`,
        'competition',
        `r*${own}*(${own} + c*${weak} + d*${strong})/K`,
        { [own]: '-1' },
      ),
    ];
  }),
  horizon: 400,
  sweeps: [{ id: 'strong', name: 'Strong effect', parameter: 'd', from: 1, to: 2 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x: 10 / 3.1, y: 10 / 3.1, z: 10 / 3.1 },
      tolerance: 1e-8,
      type: 'saddle focus',
      source: 'N = K/(1 + c + d); eigenvalues -r and r((c + d)/2 - 1 +/- i sqrt(3)/2 (c - d))/(1 + c + d).',
    },
    {
      kind: 'special-point',
      sweep: { parameter: 'd', from: 1, to: 2 },
      point: 'Hopf',
      value: 1.3,
      tolerance: 1e-7,
      source: 'May & Leonard 1975 (from memory, re-derived): the pair crosses where c + d = 2.',
    },
  ],
});
