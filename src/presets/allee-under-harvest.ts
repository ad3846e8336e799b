import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

/** A stock that fails when sparse: effort past the fold ends it, and easing off does not bring it back. */
export const alleeUnderHarvest = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Sturgeon that fail when sparse, under harvest',
  summary:
    'Spawners must meet. Raising the effort past a fold ends the stock; the way back is not the way there.',
  notes:
    'Invented scenario. Net growth r x (1 - x/K)(x/A - 1) is written as births that grow with meetings and deaths.\n\nClosed form: the fold lies at E = r (K - A)²/(4 A K q), x = (K + A)/2.\n\nA model is no permit: before harvesting or controlling a wild population, local regulation and qualified judgement decide.',
  tags: ['Allee effect', 'harvest', 'fold'],
  timeUnit: 'year',
  densityUnit: 'per km',
  individualsPerUnit: 1,
  populations: [single('x', 'sturgeon', 'slate', 15)],
  parameters: [
    parameter('r', 'growth', 0.6, [0.1, 2], '1/year'),
    parameter('K', 'ceiling', 20, [10, 60], 'per km'),
    parameter('A', 'density needed for spawning', 4, [1, 9], 'per km'),
    parameter('q', 'catchability', 0.1, [0.01, 0.5], '1'),
    parameter('E', 'effort', 2, [0, 8], '1/year'),
  ],
  processes: [
    process('births', 'Births after meetings', 'birth', 'r*x*x*(1/A + 1/K)', { x: '1' }),
    process('deaths', 'Deaths', 'death', 'r*x*(1 + x*x/(A*K))', { x: '-1' }),
    process('catch', 'Catch', 'harvest', 'q*E*x', { x: '-1' }),
  ],
  box: [{ class: 'x', from: 0, to: 40 }],
  horizon: 60,
  sweeps: [{ id: 'effort', name: 'Effort', parameter: 'E', from: 0, to: 8 }],
  knownFacts: [
    {
      kind: 'special-point',
      sweep: { parameter: 'E', from: 0, to: 8 },
      point: 'fold',
      value: 4.8,
      tolerance: 1e-7,
      source: 'Closed form in the notes; textbook.',
    },
    {
      kind: 'equilibrium',
      at: { x: 0 },
      tolerance: 1e-9,
      type: 'stable node',
      source: 'The empty river attracts: growth there is -(r + q E).',
    },
  ],
});
