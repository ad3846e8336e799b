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
import { newbornEffects, newbornFields, newbornSettings } from './newborns';
import { className, populationName, sumOf, totalOf, unitsOf } from './wording';

const schema = z.object({
  population: symbolSetting,
  parents: symbolsSetting,
  rate: z.enum(['one', 'per class']).default('one'),
  birthRate: symbolSetting,
  birthTrait: symbolSetting,
  ...newbornSettings,
  ...seasonSettings,
});

/** Births in proportion to the parents, pooled and shared out among the classes, or class by class. */
export const exponentialBirths: Template<z.infer<typeof schema>> = {
  name: 'exponential-births',
  label: 'Births at a constant rate',
  description: 'Every individual gives birth at the same or its own rate, without limit.',
  schema,
  fields: [
    populationField(),
    classesField('parents', 'Parents', 'Classes that give birth; none chosen means all.'),
    {
      kind: 'choice',
      name: 'rate',
      label: 'Birth rate',
      help: '',
      options: [
        { value: 'one', label: 'the same for all parents' },
        { value: 'per class', label: 'a trait of each class' },
      ],
    },
    when('rate', ['one'], parameterField('birthRate', 'Births per parent and time', 'b')),
    when('rate', ['per class'], traitField('birthTrait', 'Births per parent and time', 'b')),
    ...newbornFields('population'),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    const parents = draft.classes('parents', population, settings.parents);
    const unit = unitsOf(draft.document).perTime;
    const name = populationName(population);
    draft.season(settings.seasonal);
    const shared = { name: `Births of ${name}`, unit, meaning: 'Young per parent and time unit.' };
    const rateOf =
      settings.rate === 'one'
        ? constant(
            draft.parameter('birthRate', `b_${population.symbol}`, { ...shared, value: 1, min: 0, max: 5 }),
          )
        : draft.trait(
            'birthTrait',
            'b',
            {
              ...shared,
              name: 'Birth rate',
              role: 'birth',
              per: 'class',
              domain: 'rate',
              followsSpread: true,
            },
            parents.map((symbol) => [symbol]),
            () => 1,
          );
    if (settings.newborns === 'own class' && population.classes.length > 1) {
      for (const parent of parents) {
        const effects = newbornEffects(draft, population, settings, '1', parent);
        draft.process(
          `Births of ${className(population, parent)}`,
          'birth',
          `${rateOf(parent)}*${parent}`,
          effects,
        );
      }
      return;
    }
    const [first] = parents;
    const rate =
      settings.rate === 'one'
        ? `${rateOf(first ?? '')}*${totalOf(population, parents)}`
        : sumOf(parents.map((parent) => `${rateOf(parent)}*${parent}`));
    draft.process(`Births of ${name}`, 'birth', rate, newbornEffects(draft, population, settings, '1', null));
  },
};

function constant(symbol: string): (...of: readonly string[]) => string {
  return () => symbol;
}
