import { presetSchema } from '@/engine/schema/preset';

import { parameter, population, process, single, trait } from './parts';

/** Stages, not morphs: only juveniles mature, so only what both stages have can be pooled. */
export const juvenileAdultConsumer = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Pond snails that graze when grown',
  summary:
    'Juveniles live on yolk and mature; adults graze and lay. Maturation belongs to juveniles alone and is never averaged: only the mortality that both stages have is pooled.',
  notes: 'Invented scenario.\n\nClosed form: R = (g + mj) ma/(g e f), A = (r/f)(1 - R/K), J = ma A/g.',
  tags: ['stages', 'maturation', 'not lumpable'],
  timeUnit: 'week',
  densityUnit: 'g/m²',
  populations: [
    single('R', 'algae', 'lichen', 4),
    population('C', 'snails', 'madder', [
      { symbol: 'J', name: 'juveniles', shade: 0, start: 0.5 },
      { symbol: 'A', name: 'adults', shade: 2, start: 1 },
    ]),
  ],
  traits: [
    trait('m', 'mortality', 'mortality', '1/week', { J: 0.1, A: 0.2 }),
    trait('g', 'maturation', 'maturation', '1/week', { J: 0.5 }, { followsSpread: false }),
  ],
  parameters: [
    parameter('r', 'growth of algae', 1, [0.1, 3], '1/week'),
    parameter('K', 'ceiling of algae', 10, [0.5, 20], 'g/m²'),
    parameter('f', 'grazing rate', 0.5, [0.05, 2], 'm²/(g week)'),
    parameter('e', 'conversion', 0.6, [0.1, 1], '1'),
  ],
  processes: [
    process('growth', 'Growth of algae', 'birth', 'r*R', { R: '1' }),
    process('crowding', 'Losses of algae by crowding', 'death', 'r*R*R/K', { R: '-1' }),
    process('grazing', 'Algae grazed by adults', 'predation', 'f*R*A', { R: '-1', J: 'e' }),
    process('maturation', 'Juveniles mature', 'maturation', 'g_J*J', { J: '-1', A: '1' }),
    process('deaths-juveniles', 'Deaths of juveniles', 'death', 'm_J*J', { J: '-1' }),
    process('deaths-adults', 'Deaths of adults', 'death', 'm_A*A', { A: '-1' }),
  ],
  horizon: 120,
  sweeps: [{ id: 'ceiling', name: 'Ceiling of algae', parameter: 'K', from: 0.4, to: 20 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { R: 0.8, J: 0.736, A: 1.84 },
      tolerance: 1e-9,
      source: 'Closed form in the notes, derived by hand.',
    },
    {
      kind: 'special-point',
      sweep: { parameter: 'K', from: 0.4, to: 20 },
      point: 'transcritical',
      value: 0.8,
      tolerance: 1e-7,
      source: 'Snails invade where K equals the algae they need, R = 0.8.',
    },
  ],
});
