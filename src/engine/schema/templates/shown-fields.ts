import type { PresetDocument } from '../preset';
import type { TemplateField } from './contract';

/**
 * Whether a field matters with the settings as they are: its own condition holds, the field that this
 * depends on is shown itself, and a choice between classes has more than one class to choose from.
 */
export function isFieldShown(
  field: TemplateField,
  fields: readonly TemplateField[],
  settings: Readonly<Record<string, unknown>>,
  document: PresetDocument,
): boolean {
  if (isAboutClasses(field) && !hasClasses(field, fields, settings, document)) return false;
  const condition = field.shownWhen;
  if (condition === undefined) return true;
  if (!condition.is.includes(String(settings[condition.field]))) return false;
  const parent = fields.find((one) => one.name === condition.field);
  return parent === undefined || isFieldShown(parent, fields, settings, document);
}

const ABOUT_CLASSES: ReadonlySet<string> = new Set(['newborns', 'shares']);

function isAboutClasses(field: TemplateField): boolean {
  return field.kind === 'class' || field.kind === 'classes' || ABOUT_CLASSES.has(field.name);
}

function hasClasses(
  field: TemplateField,
  fields: readonly TemplateField[],
  settings: Readonly<Record<string, unknown>>,
  document: PresetDocument,
): boolean {
  const first = fields.find((one) => one.kind === 'population')?.name ?? '';
  const name = field.kind === 'class' || field.kind === 'classes' ? field.population : first;
  const population = document.populations.find((one) => one.symbol === settings[name]);
  // A class that must be chosen stays in sight, so that the refusal has a place.
  if (field.kind === 'class' || (field.kind === 'classes' && !field.optional)) return true;
  return population === undefined || population.classes.length > 1;
}
