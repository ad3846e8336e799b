import { presetSchema } from '@/engine/schema/preset';

import { parameter, population, process, shares, trait } from './parts';

/** Births need both sexes: the harmonic mating function follows the rarer sex. */
export const scarceMates = presetSchema.parse({
  format: 'moiety-preset',
  formatVersion: 1,
  title: 'Crested newts short of males',
  summary:
    'Males die faster, and births follow the rarer sex. At low density the rates of growth are not differentiable, yet a growth rate from rarity exists.',
  notes:
    'Invented scenario. The harmonic-mean mating function follows Caswell & Weeks (1986, Am. Nat. 128:707, from memory).\n\nClosed form: N = (b - m1 - m2)/(2 c), males N (b - m1 + m2)/(2 b), females N (b + m1 - m2)/(2 b).',
  tags: ['two sexes', 'mating', 'sex ratio'],
  timeUnit: 'year',
  densityUnit: 'per pond',
  individualsPerUnit: 1,
  populations: [
    population('N', 'newts', 'sloe', [
      { symbol: 'M', name: 'males', shade: 0, start: 4 },
      { symbol: 'F', name: 'females', shade: 2, start: 2 },
    ]),
  ],
  traits: [
    trait('m', 'mortality', 'mortality', '1/year', { M: 0.7, F: 0.5 }),
    shares('s', { M: 0.5, F: 0.5 }),
  ],
  parameters: [
    parameter('b', 'births a pair', 2.4, [0.5, 6], '1/year'),
    parameter('c', 'crowding', 0.02, [0.001, 0.1], 'pond/year'),
  ],
  intermediates: [
    { symbol: 'pairs', formula: '2*M*F/(M + F)', unit: 'per pond', meaning: 'harmonic mating function' },
  ],
  processes: [
    process('births', 'Births', 'birth', 'b*pairs', { M: 's_M', F: 's_F' }),
    process('deaths-1', 'Deaths of males', 'death', '(m_M + c*(M + F))*M', { M: '-1' }),
    process('deaths-2', 'Deaths of females', 'death', '(m_F + c*(M + F))*F', { F: '-1' }),
  ],
  horizon: 30,
  sweeps: [{ id: 'births', name: 'Births a pair', parameter: 'b', from: 1.25, to: 6 }],
  knownFacts: [
    {
      kind: 'equilibrium',
      at: { M: 13.75, F: 16.25 },
      tolerance: 1e-8,
      type: 'stable node',
      source: 'Closed form in the notes, derived by hand.',
    },
  ],
});
