import { presetSchema } from '@/engine/schema/preset';

import { parameter, process, single } from './parts';

/** A fast bottom and a slow top with two saturating links: chaos. */
export const threeLevelFoodChain = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Algae, water fleas and minnows',
  summary:
    'Two saturating links, each level slower than the one it eats. The chain wanders without repeating itself.',
  notes:
    'Invented scenario. The shape of such chains and their wandering is known from Hastings & Powell (1991, Ecology 72:896, from memory).\n\nClosed form of coexistence, with densities as shares of K: y = n/(b - 2 n) at the middle level and the larger root of 3 x² - 2 x - 3/8 = 0 at the bottom.',
  tags: ['food chain', 'chaos', 'three species'],
  timeUnit: 'day',
  densityUnit: 'mg/l',
  populations: [
    single('x', 'algae', 'lichen', 4),
    single('y', 'water fleas', 'weld', 1),
    single('z', 'minnows', 'woad', 45),
  ],
  parameters: [
    parameter('r', 'growth of algae', 1, [0.1, 2], '1/day'),
    parameter('K', 'ceiling of algae', 5, [1, 10], 'mg/l'),
    parameter('a', 'grazing rate', 1, [0.1, 3], 'l/(mg day)'),
    parameter('w', 'half-filling of fleas', 0.6, [0.1, 2], 'l/mg', 'how soon grazing saturates'),
    parameter('d', 'mortality of fleas', 0.4, [0.1, 1], '1/day'),
    parameter('c', 'catch rate of minnows', 0.02, [0.005, 0.1], 'l/(mg day)'),
    parameter('v', 'half-filling of minnows', 0.4, [0.1, 2], 'l/mg'),
    parameter('n', 'mortality of minnows', 0.01, [0.002, 0.03], '1/day'),
  ],
  processes: [
    process('growth', 'Growth of algae', 'birth', 'r*x', { x: '1' }),
    process('crowding', 'Losses of algae by crowding', 'death', 'r*x*x/K', { x: '-1' }),
    process('grazing', 'Algae eaten by fleas', 'predation', 'a*x*y/(1 + w*x)', { x: '-1', y: '1' }),
    process('flea-deaths', 'Deaths of fleas', 'death', 'd*y', { y: '-1' }),
    process('catch', 'Fleas eaten by minnows', 'predation', 'c*y*z/(1 + v*y)', { y: '-1', z: '1' }),
    process('minnow-deaths', 'Deaths of minnows', 'death', 'n*z', { z: '-1' }),
  ],
  horizon: 4000,
  sweeps: [{ id: 'saturation', name: 'Saturation of grazing', parameter: 'w', from: 0.3, to: 0.7 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { x: 5 * ((2 + Math.sqrt(8.5)) / 6), y: 0.625, z: 49.04099853951806 },
      tolerance: 1e-6,
      type: 'saddle focus',
      source: 'Closed form in the notes; z = (a x/(1 + w x) - d)(1 + v y)/c. Derived by hand.',
    },
  ],
});
