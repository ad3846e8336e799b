import { removeGroup } from '../process-groups';
import { readsSymbol } from '../rename';
import { TEMPLATE_NAMES, type PresetDocument, type TemplateName } from '../preset';
import { birthsByFemales } from './births-by-females';
import { birthsByMating } from './births-by-mating';
import { competition } from './competition';
import type { Template, TemplateOutcome } from './contract';
import { deaths } from './deaths';
import { TemplateDraft } from './draft';
import { exponentialBirths } from './exponential-births';
import { harvestEffort, harvestQuota } from './harvests';
import { immigration } from './immigration';
import { logisticBirths } from './logistic-births';
import { predation } from './predation';
import { maturation, switching } from './transitions';

/** A template whose settings have not been looked at yet: what a form works with. */
export type AnyTemplate = Pick<Template, 'name' | 'label' | 'description' | 'fields'> & {
  /** Writes the processes into a document, with what they need of the trait table and parameters. */
  apply(
    document: PresetDocument,
    settings: Readonly<Record<string, unknown>>,
    group?: string,
  ): TemplateOutcome;
  /** Settings with every default filled in, for the form to start from. */
  defaults(): Readonly<Record<string, unknown>>;
};

const ALL: Readonly<Record<TemplateName, AnyTemplate>> = {
  'exponential-births': usable(exponentialBirths),
  'logistic-births': usable(logisticBirths),
  'births-by-females': usable(birthsByFemales),
  'births-by-mating': usable(birthsByMating),
  deaths: usable(deaths),
  predation: usable(predation),
  competition: usable(competition),
  maturation: usable(maturation),
  switching: usable(switching),
  'harvest-effort': usable(harvestEffort),
  'harvest-quota': usable(harvestQuota),
  immigration: usable(immigration),
};

/** All templates in the order of a menu. */
export const TEMPLATES: readonly AnyTemplate[] = TEMPLATE_NAMES.map((name) => ALL[name]);

export function templateNamed(name: TemplateName): AnyTemplate {
  return ALL[name];
}

/**
 * Writes a template's processes anew or, with the group of an earlier use, in its place (the processes
 * of that use are replaced, edits by hand included). Intermediate formulas of the earlier use that
 * nothing reads any more go with it.
 */
export function applyTemplate(
  document: PresetDocument,
  name: TemplateName,
  settings: Readonly<Record<string, unknown>>,
  group?: string,
): TemplateOutcome {
  return ALL[name].apply(document, settings, group);
}

function usable<Settings>(template: Template<Settings>): AnyTemplate {
  const { name, label, description, fields, schema } = template;
  return {
    name,
    label,
    description,
    fields,
    defaults: () => schema.parse({}) as Readonly<Record<string, unknown>>,
    apply(document, settings, group) {
      const parsed = schema.safeParse(settings);
      if (!parsed.success) {
        const problems = parsed.error.issues.map((issue) => ({
          field: String(issue.path[0] ?? ''),
          message: 'This setting cannot be read; choose one of the options.',
        }));
        return { ok: false, problems };
      }
      const cleared = group === undefined ? document : clearGroup(document, group);
      const id = group ?? freeGroup(document, name);
      const first = document.processes.findIndex((process) => process.template?.group === id);
      const completed = { ...settings, ...(parsed.data as Record<string, unknown>) };
      const draft = new TemplateDraft(cleared, name, id, completed, first < 0 ? undefined : first);
      template.write(draft, parsed.data);
      if (draft.problems.length > 0) return { ok: false, problems: draft.problems };
      return { ok: true, document: draft.document, group: id };
    },
  };
}

function freeGroup(document: PresetDocument, name: string): string {
  const taken = new Set(document.processes.map((process) => process.template?.group));
  let k = 1;
  while (taken.has(`${name}-${k}`)) k += 1;
  return `${name}-${k}`;
}

/** Removes the processes of a group and the saturations that only they read. */
function clearGroup(document: PresetDocument, group: string): PresetDocument {
  const cleared = removeGroup(document, group);
  const old = document.processes.filter((process) => process.template?.group === group);
  const orphaned = new Set(
    document.intermediates
      .filter(
        (entry) =>
          old.some((process) => readsSymbol(process.rate, entry.symbol)) &&
          !cleared.processes.some((process) =>
            [process.rate, ...process.effects.map((effect) => effect.amount)].some((text) =>
              readsSymbol(text, entry.symbol),
            ),
          ) &&
          !document.intermediates.some(
            (other) => other !== entry && readsSymbol(other.formula, entry.symbol),
          ),
      )
      .map((entry) => entry.symbol),
  );
  return { ...cleared, intermediates: cleared.intermediates.filter((entry) => !orphaned.has(entry.symbol)) };
}
