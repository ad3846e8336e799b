import { z } from '../zod';

import type { TemplateField } from './contract';

/** Shapes of settings; every field may be left out, so that a form starts from nothing. */
export const symbolSetting = z.string().max(80).default('');
export const symbolsSetting = z.array(z.string().max(80)).max(12).default([]);
export const seasonSettings = {
  seasonal: z.boolean().default(false),
  seasonStrength: symbolSetting,
  seasonPeriod: symbolSetting,
  seasonPeak: symbolSetting,
};

export const populationField = (name = 'population', label = 'Population', help = ''): TemplateField => ({
  kind: 'population',
  name,
  label,
  help,
});

export const classesField = (name: string, label: string, help: string, population = 'population') =>
  ({ kind: 'classes', name, label, help, population, optional: true }) satisfies TemplateField;

export const parameterField = (
  name: string,
  label: string,
  suggestion: string,
  help = 'An existing parameter or a new symbol; leave empty to have one chosen.',
): TemplateField => ({ kind: 'symbol', of: 'parameter', name, label, suggestion, help });

export const traitField = (
  name: string,
  label: string,
  suggestion: string,
  help = 'A column of the trait table, existing or new; leave empty to have one chosen.',
): TemplateField => ({ kind: 'symbol', of: 'trait', name, label, suggestion, help });

/** The same field, shown only while a choice has one of the values. */
export function when(field: string, is: readonly string[], shown: TemplateField): TemplateField {
  return { ...shown, shownWhen: { field, is } };
}

export const SEASON_FIELDS: readonly TemplateField[] = [
  {
    kind: 'boolean',
    name: 'seasonal',
    label: 'Follows the season',
    help: 'Multiplies the rate by 1 + strength*cos(2 pi (t - peak)/period). Equilibria and sweeps are not available for seasonal models.',
  },
];
