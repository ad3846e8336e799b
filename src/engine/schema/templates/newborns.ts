import { z } from '../zod';

import type { Population, Process } from '../preset';
import type { TemplateField } from './contract';
import type { TemplateDraft } from './draft';
import { symbolSetting, traitField, when } from './fields';
import { populationName } from './wording';

/** Into which class the young are born. */
export const newbornSettings = {
  newborns: z.enum(['shares', 'own class', 'one class']).default('shares'),
  shares: symbolSetting,
  newbornClass: symbolSetting,
};

export interface NewbornSettings {
  readonly newborns: 'shares' | 'own class' | 'one class';
  readonly newbornClass: string;
}

export function newbornFields(population: string): readonly TemplateField[] {
  return [
    {
      kind: 'choice',
      name: 'newborns',
      label: 'Young are born',
      help: 'Births pooled and shared out, or each class breeding its own kind.',
      options: [
        { value: 'shares', label: 'into all classes, by shares' },
        { value: 'own class', label: "into their parent's class" },
        { value: 'one class', label: 'into one class' },
      ],
    },
    when('newborns', ['shares'], traitField('shares', 'Share of births', 'share')),
    when('newborns', ['one class'], {
      kind: 'class',
      name: 'newbornClass',
      label: 'Class of the young',
      help: 'For example the juveniles.',
      population,
      optional: false,
    }),
  ];
}

/**
 * What one birth event of `perEvent` young adds to each class. `parent` is the class that gives birth,
 * or null where births are pooled over classes, so that "own class" has no meaning.
 */
export function newbornEffects(
  draft: TemplateDraft,
  population: Population,
  settings: NewbornSettings,
  perEvent: string,
  parent: string | null,
): Process['effects'] {
  const classes = population.classes.map((entry) => entry.symbol);
  const [only] = classes;
  if (classes.length === 1 && only !== undefined) return [{ class: only, amount: perEvent }];
  if (settings.newborns === 'own class' && parent !== null) return [{ class: parent, amount: perEvent }];
  if (settings.newborns === 'one class') {
    if (!classes.includes(settings.newbornClass)) {
      draft.refuse(
        'newbornClass',
        `Choose the class of ${populationName(population)} that the young belong to.`,
      );
      return [];
    }
    return [{ class: settings.newbornClass, amount: perEvent }];
  }
  const share = shareOfBirths(draft, classes);
  return classes.map((symbol) => ({
    class: symbol,
    amount: perEvent === '1' ? share(symbol) : `${perEvent}*${share(symbol)}`,
  }));
}

function shareOfBirths(draft: TemplateDraft, classes: readonly string[]) {
  return draft.trait(
    'shares',
    'share',
    {
      name: 'Share of births',
      unit: '',
      meaning: 'Part of the young of its population that is born into the class.',
      role: 'share-of-births',
      per: 'class',
      domain: 'share',
      followsSpread: false,
    },
    classes.map((symbol) => [symbol]),
    () => 1 / classes.length,
  );
}
