import { z } from '../zod';

import type { Template } from './contract';
import { parameterField, populationField, SEASON_FIELDS, seasonSettings, symbolSetting } from './fields';
import { newbornEffects, newbornFields, newbornSettings } from './newborns';
import { className, populationName, unitsOf } from './wording';

const schema = z.object({
  population: symbolSetting,
  growthRate: symbolSetting,
  capacity: symbolSetting,
  turnover: symbolSetting,
  ...newbornSettings,
  ...seasonSettings,
});

/**
 * Logistic growth as two processes that are never negative: births (r + v) N and deaths (v + r N/K) n_i,
 * whose balance is r N (1 - N/K) for any turnover v. The turnover leaves the equations of an unsplit
 * population alone and sets how much chance and how much exchange between classes there is.
 */
export const logisticBirths: Template<z.infer<typeof schema>> = {
  name: 'logistic-births',
  label: 'Logistic growth',
  description: 'Births and crowding deaths that balance at a carrying capacity, with a turnover of your own.',
  schema,
  fields: [
    populationField(),
    parameterField('growthRate', 'Growth rate when rare', 'r'),
    parameterField('capacity', 'Carrying capacity', 'K'),
    parameterField(
      'turnover',
      'Turnover',
      'v',
      'Deaths per individual and time when rare, made good by as many births.',
    ),
    ...newbornFields('population'),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    const units = unitsOf(draft.document);
    const name = populationName(population);
    const total = population.symbol;
    const r = draft.parameter('growthRate', `r_${total}`, {
      name: `Growth rate of ${name}`,
      value: 1,
      min: 0,
      max: 5,
      unit: units.perTime,
      meaning: 'Growth per individual and time when rare.',
    });
    const capacity = draft.parameter('capacity', `K_${total}`, {
      name: `Carrying capacity of ${name}`,
      value: 10,
      min: 0.1,
      max: 50,
      unit: units.density,
      meaning: 'Density at which births and deaths balance.',
    });
    const v = draft.parameter('turnover', `v_${total}`, {
      name: `Turnover of ${name}`,
      value: 0,
      min: 0,
      max: 5,
      unit: units.perTime,
      meaning: 'Deaths per individual and time when rare, made good by as many births.',
    });
    draft.season(settings.seasonal);
    const births = `(${r} + ${v})`;
    if (settings.newborns === 'own class' && population.classes.length > 1) {
      for (const { symbol } of population.classes) {
        const effects = newbornEffects(draft, population, settings, '1', symbol);
        draft.process(`Births of ${className(population, symbol)}`, 'birth', `${births}*${symbol}`, effects);
      }
    } else {
      const effects = newbornEffects(draft, population, settings, '1', null);
      draft.process(`Births of ${name}`, 'birth', `${births}*${total}`, effects);
    }
    for (const { symbol } of population.classes) {
      draft.process(
        `Deaths by crowding of ${className(population, symbol)}`,
        'death',
        `(${v} + ${r}*${total}/${capacity})*${symbol}`,
        [{ class: symbol, amount: '-1' }],
      );
    }
  },
};
