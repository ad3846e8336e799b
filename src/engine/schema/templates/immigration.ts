import { z } from '../zod';

import type { Template } from './contract';
import {
  parameterField,
  populationField,
  SEASON_FIELDS,
  seasonSettings,
  symbolSetting,
  traitField,
  when,
} from './fields';
import { className, populationName, unitsOf } from './wording';

const schema = z.object({
  population: symbolSetting,
  rate: z.enum(['one', 'per class']).default('one'),
  immigrationRate: symbolSetting,
  immigrationTrait: symbolSetting,
  ...seasonSettings,
});

/** Arrivals from outside at a constant rate. Where they occur, absence does not last. */
export const immigration: Template<z.infer<typeof schema>> = {
  name: 'immigration',
  label: 'Immigration',
  description: 'Individuals arrive from outside at a constant rate.',
  schema,
  fields: [
    populationField(),
    {
      kind: 'choice',
      name: 'rate',
      label: 'Arrivals',
      help: '',
      options: [
        { value: 'one', label: 'equally in all classes' },
        { value: 'per class', label: 'a trait of each class' },
      ],
    },
    when('rate', ['one'], parameterField('immigrationRate', 'Arrivals per time', 'I')),
    when('rate', ['per class'], traitField('immigrationTrait', 'Arrivals per time', 'I')),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    const classes = population.classes.map((entry) => entry.symbol);
    const name = populationName(population);
    const unit = unitsOf(draft.document).densityPerTime;
    const meaning = 'Density added per time unit by arrivals.';
    draft.season(settings.seasonal);
    if (settings.rate === 'one') {
      const rate = draft.parameter('immigrationRate', `I_${population.symbol}`, {
        name: `Immigration of ${name}`,
        value: 0.1,
        min: 0,
        max: 2,
        unit,
        meaning,
      });
      const amount = classes.length === 1 ? '1' : `1/${classes.length}`;
      const effects = classes.map((symbol) => ({ class: symbol, amount }));
      draft.process(`Immigration of ${name}`, 'immigration', rate, effects);
      return;
    }
    const rateOf = draft.trait(
      'immigrationTrait',
      'I',
      {
        name: 'Immigration',
        unit,
        meaning,
        role: 'other',
        per: 'class',
        domain: 'rate',
        followsSpread: true,
      },
      classes.map((symbol) => [symbol]),
      () => 0.1 / classes.length,
    );
    for (const symbol of classes) {
      draft.process(`Immigration of ${className(population, symbol)}`, 'immigration', rateOf(symbol), [
        { class: symbol, amount: '1' },
      ]);
    }
  },
};
