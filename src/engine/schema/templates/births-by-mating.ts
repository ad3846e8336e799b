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
  males: symbolsSetting,
  mating: z.enum(['harmonic', 'minimum']).default('harmonic'),
  birthRate: symbolSetting,
  ...newbornSettings,
  ...seasonSettings,
});

/**
 * Births by pairs: b times the harmonic mean 2 F M/(F + M), or b times min(F, M). Both are of degree
 * one and equal b N/2 at equal numbers. The minimum has a kink at F = M, where no normal form exists.
 */
export const birthsByMating: Template<z.infer<typeof schema>> = {
  name: 'births-by-mating',
  label: 'Births through mating',
  description: 'Births limited by the rarer sex, through a mating function.',
  schema,
  fields: [
    populationField(),
    { ...classesField('females', 'Females', 'The class or classes of females.'), optional: false },
    { ...classesField('males', 'Males', 'The class or classes of males.'), optional: false },
    {
      kind: 'choice',
      name: 'mating',
      label: 'Mating function',
      help: 'The minimum has a kink where the sexes are equal: no criticality of Hopf points there.',
      options: [
        { value: 'harmonic', label: 'harmonic mean of the sexes' },
        { value: 'minimum', label: 'the rarer sex (nonsmooth)' },
      ],
    },
    parameterField('birthRate', 'Births per pair and time', 'b'),
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
    if (settings.females.length === 0) draft.refuse('females', 'Choose the class of the females.');
    if (settings.males.length === 0) draft.refuse('males', 'Choose the class of the males.');
    const both = settings.females.find((symbol) => settings.males.includes(symbol));
    if (both !== undefined) draft.refuse('males', `${both} cannot be female and male at once.`);
    if (draft.problems.length > 0) return;
    const females = totalOf(population, draft.classes('females', population, settings.females));
    const males = totalOf(population, draft.classes('males', population, settings.males));
    const name = populationName(population);
    draft.season(settings.seasonal);
    const b = draft.parameter('birthRate', `b_${population.symbol}`, {
      name: `Births per pair of ${name}`,
      value: 3,
      min: 0,
      max: 10,
      unit: unitsOf(draft.document).perTime,
      meaning: 'Young of both sexes per pair and time unit.',
    });
    const bare = (sum: string): string => sum.replace(/^\((.*)\)$/, '$1');
    const rate =
      settings.mating === 'harmonic'
        ? `2*${b}*${females}*${males}/(${bare(females)} + ${bare(males)})`
        : `${b}*min(${bare(females)}, ${bare(males)})`;
    draft.process(
      `Births of ${name}, by pairs`,
      'birth',
      rate,
      newbornEffects(draft, population, settings, '1', null),
    );
  },
};
