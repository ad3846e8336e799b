import { z } from '../zod';

import { upperFirst } from '../document-symbols';
import type { Template } from './contract';
import {
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
  rivals: symbolsSetting,
  strength: z.enum(['one', 'per class', 'per pair']).default('one'),
  competitionTrait: symbolSetting,
  ...seasonSettings,
});

/**
 * Deaths by competition: c Q n_i for each rival population Q (itself included where chosen), with one
 * coefficient a pair of populations, a sensitivity of each class, or a coefficient a pair of classes.
 */
export const competition: Template<z.infer<typeof schema>> = {
  name: 'competition',
  label: 'Competition',
  description: 'Deaths in proportion to the density of rivals, its own kind or others.',
  schema,
  fields: [
    populationField('population', 'Population that suffers'),
    {
      kind: 'populations',
      name: 'rivals',
      label: 'Rivals',
      help: 'Choose the population itself for self-regulation.',
    },
    {
      kind: 'choice',
      name: 'strength',
      label: 'Strength',
      help: '',
      options: [
        { value: 'one', label: 'one parameter a rival' },
        { value: 'per class', label: 'a trait of each class that suffers' },
        { value: 'per pair', label: 'a trait of each pair of classes' },
      ],
    },
    when('strength', ['per class', 'per pair'], traitField('competitionTrait', 'Competition', 'c')),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    if (settings.rivals.length === 0) draft.refuse('rivals', 'Choose at least one rival.');
    const rivals = settings.rivals.flatMap((symbol) => draft.population('rivals', symbol) ?? []);
    if (draft.problems.length > 0) return;
    const unit = unitsOf(draft.document).perDensityTime;
    const meaning = 'Deaths per individual, density of rivals and time.';
    draft.season(settings.seasonal);
    const classes = population.classes.map((entry) => entry.symbol);
    const trait = {
      name: 'Competition',
      unit,
      meaning,
      role: 'competition',
      domain: 'rate',
      followsSpread: true,
    } as const;
    const perClass =
      settings.strength === 'per class'
        ? draft.trait(
            'competitionTrait',
            'c',
            { ...trait, per: 'class' },
            classes.map((one) => [one]),
            () => 0.1,
          )
        : null;
    const pairs = classes.flatMap((one) =>
      rivals.flatMap((rival) => rival.classes.map((other) => [one, other.symbol])),
    );
    const perPair =
      settings.strength === 'per pair'
        ? draft.trait('competitionTrait', 'c', { ...trait, per: 'pair' }, pairs, () => 0.1)
        : null;
    for (const rival of rivals) {
      const self = rival.symbol === population.symbol;
      const whom = self ? 'their own kind' : populationName(rival);
      const one =
        settings.strength === 'one'
          ? draft.parameter(`strength_${rival.symbol}`, `c_${population.symbol}_${rival.symbol}`, {
              name: self
                ? `Self-regulation of ${populationName(population)}`
                : `Competition of ${whom} on ${populationName(population)}`,
              value: 0.1,
              min: 0,
              max: 2,
              unit,
              meaning,
            })
          : '';
      for (const symbol of classes) {
        const pressure = perPair
          ? `(${rival.classes.map((other) => `${perPair(symbol, other.symbol)}*${other.symbol}`).join(' + ')})`
          : `${perClass ? perClass(symbol) : one}*${rival.symbol}`;
        draft.process(
          `${upperFirst(className(population, symbol))} crowded out by ${whom}`,
          'competition',
          `${pressure}*${symbol}`,
          [{ class: symbol, amount: '-1' }],
        );
      }
    }
  },
};
