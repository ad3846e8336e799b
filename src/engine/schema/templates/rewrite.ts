import { removeGroup } from '../process-groups';
import type { PresetDocument, Process } from '../preset';
import { applyTemplate, templateNamed } from './table';

/**
 * After classes of a population changed: writes anew every use of a template that concerns it and that
 * nobody has changed by hand since, and leaves the others to their author. A use that the change leaves
 * without a population or class that it needs is removed.
 * @param before the document as it was
 * @param after the document as changed, its processes still the old ones
 * @param rename what a class or population of the settings is called now; null where it is gone
 */
export function rewriteUntouched(
  before: PresetDocument,
  after: PresetDocument,
  population: string,
  rename: (symbol: string) => string | null,
): PresetDocument {
  const groups = new Map<string, NonNullable<Process['template']>>();
  for (const { template } of before.processes) if (template !== null) groups.set(template.group, template);
  let document = after;
  for (const [group, template] of groups) {
    if (!concerns(template, population) || !isUntouched(before, template)) continue;
    const settings = renameSettings(template, rename);
    const outcome = settings === null ? null : applyTemplate(document, template.name, settings, group);
    document = outcome?.ok ? outcome.document : removeGroup(document, group);
  }
  return document;
}

function concerns(template: NonNullable<Process['template']>, population: string): boolean {
  return templateNamed(template.name).fields.some((field) => {
    const value = template.settings[field.name];
    if (field.kind === 'population') return value === population;
    return field.kind === 'populations' && Array.isArray(value) && value.includes(population);
  });
}

/** Whether writing the template again gives what is there, formulas it keeps aside included. */
function isUntouched(document: PresetDocument, template: NonNullable<Process['template']>): boolean {
  const again = applyTemplate(document, template.name, template.settings, template.group);
  if (!again.ok) return false;
  const written = (one: PresetDocument): string =>
    JSON.stringify(
      one.processes
        .filter((process) => process.template?.group === template.group)
        .map(({ name, rate, effects, signed }) => [name, rate, effects, signed]),
    );
  const formulas = (one: PresetDocument): string =>
    JSON.stringify(one.intermediates.map(({ symbol, formula }) => [symbol, formula]).sort());
  return written(document) === written(again.document) && formulas(document) === formulas(again.document);
}

/** Settings with classes and populations under their present names; null where a needed one is gone. */
function renameSettings(
  template: NonNullable<Process['template']>,
  rename: (symbol: string) => string | null,
): Readonly<Record<string, unknown>> | null {
  const settings: Record<string, unknown> = { ...template.settings };
  for (const field of templateNamed(template.name).fields) {
    const value = settings[field.name];
    const isClass = field.kind === 'class' || field.kind === 'classes';
    if (!isClass && field.kind !== 'population' && field.kind !== 'populations') continue;
    // A population keeps its symbol when its only class gets another.
    const renamed = (one: string): string | null => {
      const now = rename(one);
      return now === null || isClass ? now : one;
    };
    if (typeof value === 'string' && value !== '') {
      const now = renamed(value);
      if (now === null) return null;
      settings[field.name] = now;
    }
    if (Array.isArray(value)) {
      const kept = value.flatMap((one) => (typeof one === 'string' ? (renamed(one) ?? []) : []));
      if (kept.length === 0 && value.length > 0) return null;
      settings[field.name] = kept;
    }
  }
  return settings;
}
