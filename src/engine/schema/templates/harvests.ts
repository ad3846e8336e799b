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
import { className, populationName, totalOf, unitsOf } from './wording';

const effortSchema = z.object({
  population: symbolSetting,
  classes: symbolsSetting,
  catchability: z.enum(['per class', 'one']).default('per class'),
  catchTrait: symbolSetting,
  catchRate: symbolSetting,
  effort: symbolSetting,
  ...seasonSettings,
});
const quotaSchema = z.object({
  population: symbolSetting,
  classes: symbolsSetting,
  quota: symbolSetting,
  closure: symbolSetting,
  ...seasonSettings,
});

const targets = classesField('classes', 'Classes taken', 'None chosen means all.');

/** Harvest by effort: catch in proportion to effort, catchability and density. */
export const harvestEffort: Template<z.infer<typeof effortSchema>> = {
  name: 'harvest-effort',
  label: 'Harvest by effort',
  description: 'The catch is effort times catchability times density.',
  schema: effortSchema,
  fields: [
    populationField(),
    targets,
    {
      kind: 'choice',
      name: 'catchability',
      label: 'Catchability',
      help: '',
      options: [
        { value: 'per class', label: 'a trait of each class' },
        { value: 'one', label: 'the same for all classes' },
      ],
    },
    when('catchability', ['per class'], traitField('catchTrait', 'Catchability', 'q')),
    when('catchability', ['one'], parameterField('catchRate', 'Catchability', 'q')),
    parameterField('effort', 'Effort', 'E'),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    const classes = draft.classes('classes', population, settings.classes);
    const unit = unitsOf(draft.document).perTime;
    const name = populationName(population);
    const meaning = 'Part of the population that one unit of effort takes per time unit.';
    draft.season(settings.seasonal);
    const effort = draft.parameter('effort', 'E', {
      name: `Harvest effort on ${name}`,
      value: 0.2,
      min: 0,
      max: 5,
      unit: '',
      meaning: 'Effort spent, in units of your choosing.',
    });
    const single = settings.catchability === 'one';
    const parameter = single
      ? draft.parameter('catchRate', `q_${population.symbol}`, {
          name: `Catchability of ${name}`,
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
          'catchTrait',
          'q',
          {
            name: 'Catchability',
            unit,
            meaning,
            role: 'harvest',
            per: 'class',
            domain: 'rate',
            followsSpread: true,
          },
          classes.map((symbol) => [symbol]),
          () => 0.5,
        );
    for (const symbol of classes) {
      draft.process(
        `Harvest of ${className(population, symbol)}`,
        'harvest',
        `${rateOf(symbol)}*${effort}*${symbol}`,
        [{ class: symbol, amount: '-1' }],
      );
    }
  },
};

/**
 * Harvest by quota: Q N/(N + c), shared among the classes by their numbers. The closure density c
 * makes the catch fade as the stock runs out, so that it can never take more than is there.
 */
export const harvestQuota: Template<z.infer<typeof quotaSchema>> = {
  name: 'harvest-quota',
  label: 'Harvest by quota',
  description: 'A fixed catch that fades below a closure density, Q*N/(N + c).',
  schema: quotaSchema,
  fields: [
    populationField(),
    targets,
    parameterField('quota', 'Quota', 'Q'),
    parameterField(
      'closure',
      'Closure density',
      'c',
      'Density at which half the quota is taken; keeps the stock from falling below zero.',
    ),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = draft.population('population', settings.population);
    if (population === null) return;
    const classes = draft.classes('classes', population, settings.classes);
    const units = unitsOf(draft.document);
    const name = populationName(population);
    draft.season(settings.seasonal);
    const quota = draft.parameter('quota', `Q_${population.symbol}`, {
      name: `Quota on ${name}`,
      value: 0.5,
      min: 0,
      max: 5,
      unit: units.densityPerTime,
      meaning: 'Catch per time unit while the stock is plentiful.',
    });
    const closure = draft.parameter('closure', `c_${population.symbol}`, {
      name: `Closure density of ${name}`,
      value: 0.1,
      min: 0.001,
      max: 2,
      unit: units.density,
      meaning: 'Density at which half the quota is taken.',
    });
    const stock = totalOf(population, classes).replace(/^\((.*)\)$/, '$1');
    for (const symbol of classes) {
      draft.process(
        `Harvest of ${className(population, symbol)}`,
        'harvest',
        `${quota}*${symbol}/(${stock} + ${closure})`,
        [{ class: symbol, amount: '-1' }],
      );
    }
  },
};
