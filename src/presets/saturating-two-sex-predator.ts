import { presetSchema } from '@/engine/schema/preset';

import { parameter, population, process, shares, single, trait } from './parts';

const RESPONSE = '(1 + a_y1*h*x)';
const RESPONSE_FEMALES = '(1 + a_y2*h*x)';

/** With a saturating response the split moves the onset of cycles; which way depends on the mean that is held. */
export const saturatingTwoSexPredator = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Jumping spiders on midges, saturating, by sex',
  summary:
    'Spiders fill up, so rich midges make cycles. Unequal mortality of the sexes moves the onset of cycles along the ceiling of the midges; which way depends on the mean that is held.',
  notes:
    'Invented scenario. With the arithmetic mean of mortality held, spread lets the predator live on fewer midges and cycles begin earlier; with the harmonic mean held, the same prey is needed and the split alone is seen.',
  tags: ['two sexes', 'saturating response', 'onset of cycles'],
  timeUnit: 'week',
  densityUnit: 'per dm²',
  populations: [
    single('x', 'midges', 'weld', 0.4),
    population('y', 'spiders', 'woad', [
      { symbol: 'y1', name: 'males', shade: 0, start: 0.2 },
      { symbol: 'y2', name: 'females', shade: 2, start: 0.4 },
    ]),
  ],
  traits: [
    trait('m', 'mortality', 'mortality', '1/week', { y1: 0.4, y2: 0.2 }),
    trait('a', 'attack rate', 'attack', 'dm²/week', { y1: 1.6, y2: 1.6 }),
    shares('s', { y1: 0.5, y2: 0.5 }),
  ],
  parameters: [
    parameter('r', 'growth of midges', 1, [0.1, 3], '1/week'),
    parameter('K', 'ceiling of midges', 1.8, [0.2, 4], 'per dm²'),
    parameter('h', 'handling time', 1, [0, 3], 'week'),
    parameter('e', 'conversion', 0.8, [0.1, 1], '1'),
  ],
  processes: [
    process('births', 'Births of midges', 'birth', 'r*x', { x: '1' }),
    process('crowding', 'Deaths of midges by crowding', 'death', 'r*x*x/K', { x: '-1' }),
    process('eaten-1', 'Midges eaten by males', 'predation', `a_y1*x*y1/${RESPONSE}`, {
      x: '-1',
      y1: 'e*s_y1',
      y2: 'e*s_y2',
    }),
    process('eaten-2', 'Midges eaten by females', 'predation', `a_y2*x*y2/${RESPONSE_FEMALES}`, {
      x: '-1',
      y1: 'e*s_y1',
      y2: 'e*s_y2',
    }),
    process('deaths-1', 'Deaths of males', 'death', 'm_y1*y1', { y1: '-1' }),
    process('deaths-2', 'Deaths of females', 'death', 'm_y2*y2', { y2: '-1' }),
  ],
  horizon: 160,
  sweeps: [{ id: 'ceiling', name: 'Ceiling of midges', parameter: 'K', from: 0.2, to: 4 }],
  knownFacts: [
    {
      kind: 'special-point',
      sweep: { parameter: 'K', from: 0.2, to: 4 },
      point: 'Hopf',
      value: 1.32477061323764,
      tolerance: 1e-7,
      source:
        'Root of the Routh-Hurwitz determinant of the 3 x 3 Jacobian, computed apart by bisection on the closed-form equilibrium.',
    },
    {
      kind: 'special-point',
      of: 'twin',
      sweep: { parameter: 'K', from: 0.2, to: 4 },
      point: 'Hopf',
      value: 1.375,
      tolerance: 1e-7,
      source:
        'K = (e + m h)/(a h (e - m h)) at the mean mortality 0.3; Rosenzweig & MacArthur 1963, textbook closed form.',
    },
    {
      kind: 'special-point',
      sweep: { parameter: 'K', from: 0.2, to: 4 },
      point: 'transcritical',
      value: 0.3125,
      tolerance: 1e-7,
      source: 'Spiders invade where a K/(1 + a h K) = 1/(e (s1/m1 + s2/m2)); derived by hand.',
    },
  ],
});
