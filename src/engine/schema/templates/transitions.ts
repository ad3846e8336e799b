import { z } from '../zod';

import type { Population, TraitRole } from '../preset';
import { upperFirst } from '../document-symbols';
import type { Template } from './contract';
import type { TemplateDraft } from './draft';
import { populationField, SEASON_FIELDS, seasonSettings, symbolSetting, traitField } from './fields';
import { className, unitsOf } from './wording';

const ends = { population: symbolSetting, from: symbolSetting, to: symbolSetting };
const maturationSchema = z.object({ ...ends, maturationTrait: symbolSetting, ...seasonSettings });
const switchingSchema = z.object({
  ...ends,
  both: z.boolean().default(true),
  switchingTrait: symbolSetting,
  ...seasonSettings,
});

const endFields = [
  { kind: 'class', name: 'from', label: 'From', help: '', population: 'population', optional: false },
  { kind: 'class', name: 'to', label: 'To', help: '', population: 'population', optional: false },
] as const;

/** Growing up: one class turns into another, for good. */
export const maturation: Template<z.infer<typeof maturationSchema>> = {
  name: 'maturation',
  label: 'Maturation',
  description: 'Individuals of one class grow into the next.',
  schema: maturationSchema,
  fields: [
    populationField(),
    ...endFields,
    traitField('maturationTrait', 'Maturation rate', 'g'),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = chooseEnds(draft, settings);
    if (population === null) return;
    draft.season(settings.seasonal);
    const { from, to } = settings;
    const rateOf = transitionRates(draft, 'maturationTrait', 'g', 'maturation', [from]);
    draft.process(
      `${upperFirst(className(population, from))} grow into ${className(population, to)}`,
      'maturation',
      `${rateOf(from)}*${from}`,
      [
        { class: from, amount: '-1' },
        { class: to, amount: '1' },
      ],
    );
  },
};

/** Individuals change class and may change back. */
export const switching: Template<z.infer<typeof switchingSchema>> = {
  name: 'switching',
  label: 'Switching between classes',
  description: 'Individuals move from one class to another, and back where wanted.',
  schema: switchingSchema,
  fields: [
    populationField(),
    ...endFields,
    {
      kind: 'boolean',
      name: 'both',
      label: 'Both ways',
      help: 'Also back again, at the rate of the other class.',
    },
    traitField('switchingTrait', 'Rate of leaving the class', 'w'),
    ...SEASON_FIELDS,
  ],
  write(draft, settings) {
    const population = chooseEnds(draft, settings);
    if (population === null) return;
    draft.season(settings.seasonal);
    const { from, to, both } = settings;
    const rateOf = transitionRates(draft, 'switchingTrait', 'w', 'switching', both ? [from, to] : [from]);
    const moves: readonly (readonly [string, string])[] = both
      ? [
          [from, to],
          [to, from],
        ]
      : [[from, to]];
    for (const [leaving, entering] of moves) {
      draft.process(
        `${upperFirst(className(population, leaving))} become ${className(population, entering)}`,
        'switching',
        `${rateOf(leaving)}*${leaving}`,
        [
          { class: leaving, amount: '-1' },
          { class: entering, amount: '1' },
        ],
      );
    }
  },
};

function chooseEnds(
  draft: TemplateDraft,
  settings: { readonly population: string; readonly from: string; readonly to: string },
): Population | null {
  const population = draft.population('population', settings.population);
  if (population === null) return null;
  if (settings.from === '') draft.refuse('from', 'Choose the class that is left.');
  else draft.classes('from', population, [settings.from]);
  if (settings.to === '') draft.refuse('to', 'Choose the class that is entered.');
  else draft.classes('to', population, [settings.to]);
  if (settings.from !== '' && settings.from === settings.to) {
    draft.refuse('to', 'A class cannot turn into itself; choose another.');
  }
  return draft.problems.length > 0 ? null : population;
}

function transitionRates(
  draft: TemplateDraft,
  field: string,
  suggestion: string,
  role: Extract<TraitRole, 'maturation' | 'switching'>,
  classes: readonly string[],
) {
  return draft.trait(
    field,
    suggestion,
    {
      name: role === 'maturation' ? 'Maturation rate' : 'Switching rate',
      unit: unitsOf(draft.document).perTime,
      meaning: 'Individuals leaving the class, per individual and time unit.',
      role,
      per: 'class',
      domain: 'rate',
      followsSpread: false,
    },
    classes.map((symbol) => [symbol]),
    () => 0.5,
  );
}
