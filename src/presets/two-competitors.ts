import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

/** Competition weaker between than within the species: both stay. */
export const twoCompetitors = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Two barnacles on one rock',
  summary:
    'Each species holds itself back more than the other, so both stay. Sweep one effect to find where the other is shut out.',
  notes:
    'Invented scenario. Births are proportional to density, deaths rise with the crowding that each species feels.',
  tags: ['competition', 'two species'],
  timeUnit: 'year',
  densityUnit: 'per dm²',
  individualsPerUnit: 1,
  populations: [single('x', 'grey barnacles', 'slate', 20), single('y', 'brown barnacles', 'weld', 40)],
  parameters: [
    parameter('r', 'growth of grey', 0.8, [0.1, 2], '1/year'),
    parameter('K', 'ceiling of grey', 100, [20, 200], 'per dm²'),
    parameter('c', 'effect of brown on grey', 0.5, [0, 2], '1'),
    parameter('q', 'growth of brown', 0.6, [0.1, 2], '1/year'),
    parameter('L', 'ceiling of brown', 80, [20, 200], 'per dm²'),
    parameter('d', 'effect of grey on brown', 0.6, [0, 2], '1'),
  ],
  processes: [
    process('grey-births', 'Settling of grey barnacles', 'birth', 'r*x', { x: '1' }),
    process('grey-crowding', 'Deaths of grey barnacles by crowding', 'competition', 'r*x*(x + c*y)/K', {
      x: '-1',
    }),
    process('brown-births', 'Settling of brown barnacles', 'birth', 'q*y', { y: '1' }),
    process('brown-crowding', 'Deaths of brown barnacles by crowding', 'competition', 'q*y*(y + d*x)/L', {
      y: '-1',
    }),
  ],
  horizon: 60,
  sweeps: [{ id: 'effect', name: 'Effect of grey on brown', parameter: 'd', from: 0, to: 1.5 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x: 600 / 7, y: 200 / 7 },
      tolerance: 1e-8,
      type: 'stable node',
      source: 'Linear equations x + c y = K, d x + y = L solved by hand.',
    },
    {
      kind: 'special-point',
      sweep: { parameter: 'd', from: 0, to: 1.5 },
      point: 'transcritical',
      value: 0.8,
      tolerance: 1e-7,
      source: 'Brown is shut out where d K = L.',
    },
  ],
});
