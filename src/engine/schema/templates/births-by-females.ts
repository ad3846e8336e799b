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
} from './fields';
import { newbornEffects, newbornFields, newbornSettings } from './newborns';
import { populationName, totalOf, unitsOf } from './wording';

const schema = z.object({
  population: symbolSetting,
  females: symbolsSetting,
  birthRate: symbolSetting,
  ...newbornSettings,
  ...seasonSettings,
});

/** Births by the females alone: males are never scarce. */
export const birthsByFemales: Template<z.infer<typeof schema>> = {
  name: 'births-by-females',
  label: 'Births by females only',
  description: 'Births in proportion to the females, shared out between the classes.',
  schema,
  fields: [
    populationField(),
    { ...classesField('females', 'Females', 'The class or classes that give birth.'), optional: false },
    parameterField('birthRate', 'Births per female and time', 'b'),
    ...newbornFields('population').map((field) =>
      field.kind === 'choice' && field.name === 'newborns'
        ? { ...field, options: field.options.filter((option) => option.value !== 'own class') }
        : field,
    ),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    if (settings.females.length === 0) {
      draft.refuse('females', 'Choose the class that gives birth.');
      return;
    }
    const females = draft.classes('females', population, settings.females);
    const name = populationName(population);
    draft.season(settings.seasonal);
    const b = draft.parameter('birthRate', `b_${population.symbol}`, {
      name: `Births per female of ${name}`,
      value: 2,
      min: 0,
      max: 10,
      unit: unitsOf(draft.document).perTime,
      meaning: 'Young of both sexes per female and time unit.',
    });
    const effects = newbornEffects(draft, population, settings, '1', null);
    draft.process(`Births of ${name}, by females`, 'birth', `${b}*${totalOf(population, females)}`, effects);
  },
};
