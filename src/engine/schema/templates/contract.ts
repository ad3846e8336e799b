import type { z } from 'zod';

import type { PresetDocument, TemplateName } from '../preset';
import type { TemplateDraft } from './draft';

interface FieldBase {
  readonly name: string;
  readonly label: string;
  readonly help: string;
  /** Shown only while the choice `field` has one of these values. */
  readonly shownWhen?: { readonly field: string; readonly is: readonly string[] };
}

/** One field of a template's form; forms are generated from these. */
export type TemplateField =
  | (FieldBase & { readonly kind: 'population' | 'populations' })
  /** Classes of the population chosen in `population`; with `optional` none means all of them. */
  | (FieldBase & {
      readonly kind: 'class' | 'classes';
      readonly population: string;
      readonly optional: boolean;
    })
  | (FieldBase & {
      readonly kind: 'choice';
      readonly options: readonly { readonly value: string; readonly label: string }[];
    })
  | (FieldBase & { readonly kind: 'boolean' })
  | (FieldBase & { readonly kind: 'number'; readonly min: number; readonly max: number })
  /** Symbol of a parameter or trait, existing or to be created; empty lets the template choose one. */
  | (FieldBase & {
      readonly kind: 'symbol';
      readonly of: 'parameter' | 'trait';
      readonly suggestion: string;
    });

/** A common process that can be written from a few choices. */
export interface Template<Settings = unknown> {
  readonly name: TemplateName;
  readonly label: string;
  readonly description: string;
  readonly fields: readonly TemplateField[];
  readonly schema: z.ZodType<Settings>;
  /** Writes into the draft; what is wrong with the settings goes to `draft.refuse`. */
  write(draft: TemplateDraft, settings: Settings): void;
}

export interface TemplateProblem {
  /** Name of the field it concerns, or empty for the whole form. */
  readonly field: string;
  readonly message: string;
}

export type TemplateOutcome =
  | {
      readonly ok: true;
      readonly document: PresetDocument;
      /** Id shared by the processes written, in `process.template.group`. */
      readonly group: string;
    }
  | { readonly ok: false; readonly problems: readonly TemplateProblem[] };
