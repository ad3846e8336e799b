import { z } from '../zod';

import type { Population } from '../preset';
import { upperFirst } from '../document-symbols';
import type { Template } from './contract';
import type { TemplateDraft } from './draft';
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
import { className, populationName, unitsOf } from './wording';

const schema = z.object({
  consumer: symbolSetting,
  eaters: symbolsSetting,
  resources: symbolsSetting,
  response: z.enum(['linear', 'saturating', 'sigmoid']).default('linear'),
  attack: z.enum(['one', 'per consumer class', 'per resource class', 'per pair']).default('per pair'),
  attackRate: symbolSetting,
  attackTrait: symbolSetting,
  handling: z.enum(['one', 'per consumer class']).default('one'),
  handlingTime: symbolSetting,
  handlingTrait: symbolSetting,
  births: z.boolean().default(true),
  conversion: symbolSetting,
  ...newbornSettings,
  ...seasonSettings,
});
type Settings = z.infer<typeof schema>;

/** A resource class with the population it belongs to. */
interface Prey {
  readonly population: Population;
  readonly symbol: string;
}

/**
 * Predation: consumer class y eats resource class x at the rate a x y / S (linear: S = 1;
 * saturating: S = 1 + h sum_k a_k x_k; sigmoid: x^2 in the place of x), with one denominator S a consumer
 * class, summed over all resource classes that it eats, kept as an intermediate formula. Each meal turns
 * into young of the consumer by the conversion, shared out among its classes.
 */
export const predation: Template<Settings> = {
  name: 'predation',
  label: 'Predation',
  description: 'One population eats others; meals become young.',
  schema,
  fields: [
    populationField('consumer', 'Consumer', 'The population that eats.'),
    classesField('eaters', 'Classes that eat', 'None chosen means all.', 'consumer'),
    {
      kind: 'populations',
      name: 'resources',
      label: 'Resources',
      help: 'All populations it eats share one saturation.',
    },
    {
      kind: 'choice',
      name: 'response',
      label: 'Response to food density',
      help: 'Saturating: handling takes time. Sigmoid: scarce food is ignored.',
      options: [
        { value: 'linear', label: 'linear' },
        { value: 'saturating', label: 'saturating' },
        { value: 'sigmoid', label: 'sigmoid' },
      ],
    },
    {
      kind: 'choice',
      name: 'attack',
      label: 'Attack rate',
      help: '',
      options: [
        { value: 'per pair', label: 'a trait of each pair of classes' },
        { value: 'per consumer class', label: 'a trait of each class that eats' },
        { value: 'per resource class', label: 'a trait of each class eaten' },
        { value: 'one', label: 'the same for all' },
      ],
    },
    when('attack', ['one'], parameterField('attackRate', 'Attack rate', 'a')),
    when(
      'attack',
      ['per pair', 'per consumer class', 'per resource class'],
      traitField('attackTrait', 'Attack rate', 'a'),
    ),
    when('response', ['saturating', 'sigmoid'], {
      kind: 'choice',
      name: 'handling',
      label: 'Handling time',
      help: '',
      options: [
        { value: 'one', label: 'the same for all' },
        { value: 'per consumer class', label: 'a trait of each class that eats' },
      ],
    }),
    when('handling', ['one'], parameterField('handlingTime', 'Handling time', 'h')),
    when('handling', ['per consumer class'], traitField('handlingTrait', 'Handling time', 'h')),
    {
      kind: 'boolean',
      name: 'births',
      label: 'Meals become young',
      help: 'Births of the consumer in proportion to what it eats.',
    },
    when('births', ['true'], parameterField('conversion', 'Young per meal', 'e')),
    ...newbornFields('consumer').map((field) =>
      field.name === 'newborns' ? when('births', ['true'], field) : field,
    ),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const consumer = draft.population('consumer', settings.consumer);
    const prey = collectPrey(draft, settings);
    if (consumer === null || prey.length === 0) return;
    const eaters = draft.classes('eaters', consumer, settings.eaters);
    if (eatsElsewhere(draft, settings)) return;
    draft.season(settings.seasonal);
    const attackOf = attackRates(draft, settings, consumer, eaters, prey);
    const handlingOf =
      settings.response === 'linear' ? null : handlingTimes(draft, settings, consumer, eaters);
    const e = settings.births
      ? draft.parameter('conversion', `e_${consumer.symbol}`, {
          name: `Conversion by ${populationName(consumer)}`,
          value: 0.5,
          min: 0,
          max: 2,
          unit: '',
          meaning: 'Young per unit of food eaten.',
        })
      : '';
    for (const eater of eaters) {
      const food = (one: Prey): string => {
        const power = settings.response === 'sigmoid' ? `${one.symbol}^2` : one.symbol;
        return `${attackOf(eater, one.symbol)}*${power}`;
      };
      const eaten = prey.map(food);
      const sum = eaten.length === 1 ? (eaten[0] ?? '') : `(${eaten.join(' + ')})`;
      const divisor =
        handlingOf === null
          ? ''
          : `/${draft.intermediate(`sat_${eater}`, `1 + ${handlingOf(eater)}*${sum}`, `Saturation of ${className(consumer, eater)}`)}`;
      for (const one of prey) {
        const young = settings.births ? newbornEffects(draft, consumer, settings, e, eater) : [];
        draft.process(
          `${upperFirst(className(one.population, one.symbol))} eaten by ${className(consumer, eater)}`,
          'predation',
          `${food(one)}*${eater}${divisor}`,
          [{ class: one.symbol, amount: '-1' }, ...young],
        );
      }
    }
  },
};

function collectPrey(draft: TemplateDraft, settings: Settings): readonly Prey[] {
  if (settings.resources.length === 0)
    draft.refuse('resources', 'Choose at least one population that is eaten.');
  return settings.resources.flatMap((symbol) => {
    const population = draft.population('resources', symbol);
    return population === null
      ? []
      : population.classes.map((entry) => ({ population, symbol: entry.symbol }));
  });
}

/** A second use with saturation would give one consumer two denominators, so it is refused. */
function eatsElsewhere(draft: TemplateDraft, settings: Settings): boolean {
  const others = draft.document.processes.filter(
    (process) =>
      process.template?.name === 'predation' &&
      process.template.group !== draft.group &&
      process.template.settings['consumer'] === settings.consumer,
  );
  const saturates =
    settings.response !== 'linear' || others.some((one) => one.template?.settings['response'] !== 'linear');
  if (others.length === 0 || !saturates) return false;
  draft.refuse(
    'consumer',
    'This consumer eats already; add the resource to that predation instead, so that all its food shares one saturation.',
  );
  return true;
}

function attackRates(
  draft: TemplateDraft,
  settings: Settings,
  consumer: Population,
  eaters: readonly string[],
  prey: readonly Prey[],
): (eater: string, prey: string) => string {
  const units = unitsOf(draft.document);
  const unit = settings.response === 'sigmoid' ? units.perDensitySquaredTime : units.perDensityTime;
  const meaning = 'Encounters that end in a meal, per consumer, density of food and time.';
  if (settings.attack === 'one') {
    const symbol = draft.parameter('attackRate', `a_${consumer.symbol}`, {
      name: `Attack rate of ${populationName(consumer)}`,
      value: 0.5,
      min: 0,
      max: 3,
      unit,
      meaning,
    });
    return () => symbol;
  }
  const per = settings.attack === 'per pair' ? 'pair' : 'class';
  const of =
    settings.attack === 'per pair'
      ? eaters.flatMap((eater) => prey.map((one) => [eater, one.symbol]))
      : settings.attack === 'per consumer class'
        ? eaters.map((eater) => [eater])
        : prey.map((one) => [one.symbol]);
  const name = settings.attack === 'per resource class' ? 'Vulnerability' : 'Attack rate';
  const suggestion = settings.attack === 'per resource class' ? 'q' : 'a';
  const read = draft.trait(
    'attackTrait',
    suggestion,
    { name, unit, meaning, role: 'attack', per, domain: 'rate', followsSpread: true },
    of,
    () => 0.5,
  );
  if (settings.attack === 'per pair') return (eater, one) => read(eater, one);
  return settings.attack === 'per consumer class' ? (eater) => read(eater) : (_eater, one) => read(one);
}

function handlingTimes(
  draft: TemplateDraft,
  settings: Settings,
  consumer: Population,
  eaters: readonly string[],
): (eater: string) => string {
  const unit = draft.document.timeUnit;
  const meaning = 'Time that a consumer spends on one unit of food.';
  if (settings.handling === 'one') {
    const symbol = draft.parameter('handlingTime', `h_${consumer.symbol}`, {
      name: `Handling time of ${populationName(consumer)}`,
      value: 0.2,
      min: 0,
      max: 2,
      unit,
      meaning,
    });
    return () => symbol;
  }
  const read = draft.trait(
    'handlingTrait',
    'h',
    {
      name: 'Handling time',
      unit,
      meaning,
      role: 'handling',
      per: 'class',
      domain: 'rate',
      followsSpread: true,
    },
    eaters.map((eater) => [eater]),
    () => 0.2,
  );
  return (eater) => read(eater);
}
