import { z } from '../zod';

import type { Template } from './contract';
import {
  classesField,
  parameterField,
  populationField,
  SEASON_FIELDS,
  seasonSettings,
  symbolSetting,
  symbolsSetting,
  traitField,
  when,
} from './fields';
import { className, populationName, unitsOf } from './wording';

const schema = z.object({
  population: symbolSetting,
  classes: symbolsSetting,
  rate: z.enum(['per class', 'one']).default('per class'),
  mortality: symbolSetting,
  mortalityRate: symbolSetting,
  ...seasonSettings,
});

/** Deaths at a constant rate, a trait of each class. */
export const deaths: Template<z.infer<typeof schema>> = {
  name: 'deaths',
  label: 'Deaths',
  description: 'Each class dies at its own constant rate.',
  schema,
  fields: [
    populationField(),
    classesField('classes', 'Classes', 'Classes that die this way; none chosen means all.'),
    {
      kind: 'choice',
      name: 'rate',
      label: 'Mortality',
      help: '',
      options: [
        { value: 'per class', label: 'a trait of each class' },
        { value: 'one', label: 'the same for all classes' },
      ],
    },
    when('rate', ['per class'], traitField('mortality', 'Deaths per individual and time', 'm')),
    when('rate', ['one'], parameterField('mortalityRate', 'Deaths per individual and time', 'm')),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    const classes = draft.classes('classes', population, settings.classes);
    const unit = unitsOf(draft.document).perTime;
    draft.season(settings.seasonal);
    const meaning = 'Deaths per individual and time unit.';
    const single = settings.rate === 'one';
    const parameter = single
      ? draft.parameter('mortalityRate', `m_${population.symbol}`, {
          name: `Mortality of ${populationName(population)}`,
          value: 0.5,
          min: 0,
          max: 3,
          unit,
          meaning,
        })
      : '';
    const rateOf = single
      ? () => parameter
      : draft.trait(
          'mortality',
          'm',
          {
            name: 'Mortality',
            unit,
            meaning,
            role: 'mortality',
            per: 'class',
            domain: 'rate',
            followsSpread: true,
          },
          classes.map((symbol) => [symbol]),
          () => 0.5,
        );
    for (const symbol of classes) {
      draft.process(`Deaths of ${className(population, symbol)}`, 'death', `${rateOf(symbol)}*${symbol}`, [
        { class: symbol, amount: '-1' },
      ]);
    }
  },
};
