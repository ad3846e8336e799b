import { z } from './zod';

import { LIMITS } from './limits';
import { isSymbol } from './symbols';

/**
 * The preset document: a structured population model as data (`*.moiety.json`).
 * This file gives its shape alone; agreement between its parts (symbols that exist, shares that
 * sum to one, formulas that parse) is checked by `checkDefinition` in `system`.
 */

export const FORMAT_NAME = 'moiety-preset';
export const FORMAT_VERSION = 1;

const symbol = z
  .string()
  .refine(
    isSymbol,
    'A symbol starts with a letter, holds letters, digits and underscores, and is no reserved name.',
  );
const finite = z.number().refine(Number.isFinite, 'A finite number is needed.');
const name = z.string().trim().max(LIMITS.nameLength);
const unit = z.string().trim().max(LIMITS.unitLength).default('');
const prose = z.string().max(LIMITS.proseLength).default('');
const formula = z.string().max(LIMITS.formulaLength);
const standardError = finite.nonnegative().nullable().default(null);

export const HUES = ['weld', 'woad', 'madder', 'lichen', 'sloe', 'slate'] as const;
export type Hue = (typeof HUES)[number];

export const classSchema = z.object({
  symbol,
  name,
  /** Shade within the population's hue, 0 lightest. */
  shade: z.int().min(0).max(11).default(0),
  /** Start value of trajectories, in the document's density unit. */
  start: finite,
});

export const populationSchema = z.object({
  /** In formulas the population's total; may equal the class symbol where there is one class. */
  symbol,
  name,
  hue: z.enum(HUES),
  /** `nonnegative` for densities; `any` for a state of a textbook system that may take either sign. */
  sign: z.enum(['nonnegative', 'any']).default('nonnegative'),
  classes: z.array(classSchema).min(1).max(LIMITS.classesPerPopulation),
});

export const TRAIT_ROLES = [
  'mortality',
  'attack',
  'handling',
  'share-of-births',
  'birth',
  'maturation',
  'switching',
  'harvest',
  'competition',
  'other',
] as const;

export const traitEntrySchema = z.object({
  /** One class, or (consumer class, resource class) for a trait of pairs. */
  of: z.array(symbol).min(1).max(2),
  value: finite,
  standardError,
  source: z.string().max(LIMITS.noteLength).default(''),
  /** Where the value was entered as survival over a period: rate = -ln(survival)/period. */
  survival: z
    .object({ fraction: z.number().gt(0).max(1), period: z.number().positive() })
    .nullable()
    .default(null),
});

export const traitSchema = z.object({
  symbol,
  name,
  unit,
  meaning: z.string().max(LIMITS.noteLength).default(''),
  role: z.enum(TRAIT_ROLES).default('other'),
  per: z.enum(['class', 'pair']).default('class'),
  /** Values a trait may take: rate >= 0, share in [0, 1], positive > 0, any. */
  domain: z.enum(['rate', 'share', 'positive', 'any']).default('rate'),
  /** Which mean is held when classes are pooled. */
  mean: z.enum(['arithmetic', 'geometric', 'harmonic']).default('arithmetic'),
  /** Whether the common spread dial moves it; shares, maturation and switching usually stay. */
  followsSpread: z.boolean().default(true),
  /** The trait's own dial: 1 as entered, 0 pooled, below 0 reversed. Multiplies the common dial. */
  dial: finite.default(1),
  entries: z.array(traitEntrySchema).max(LIMITS.entriesPerTrait).default([]),
});

export const parameterSchema = z
  .object({
    symbol,
    name,
    value: finite,
    /** Range of its slider and the default range of a sweep. */
    min: finite,
    max: finite,
    unit,
    meaning: z.string().max(LIMITS.noteLength).default(''),
    standardError,
    source: z.string().max(LIMITS.noteLength).default(''),
  })
  .refine((p) => p.min < p.max, { message: 'The range must end above its beginning.', path: ['max'] });

export const intermediateSchema = z.object({
  symbol,
  formula,
  unit,
  meaning: z.string().max(LIMITS.noteLength).default(''),
});

export const PROCESS_KINDS = [
  'birth',
  'death',
  'predation',
  'competition',
  'maturation',
  'switching',
  'harvest',
  'immigration',
  'equation',
  'other',
] as const;

export const TEMPLATE_NAMES = [
  'exponential-births',
  'logistic-births',
  'births-by-females',
  'births-by-mating',
  'deaths',
  'predation',
  'competition',
  'maturation',
  'switching',
  'harvest-effort',
  'harvest-quota',
  'immigration',
] as const;

export const processSchema = z.object({
  /** Stable within the document; not a formula symbol. */
  id: z.string().min(1).max(64),
  name,
  kind: z.enum(PROCESS_KINDS).default('other'),
  /** Events per time unit, in density; never negative unless `signed`. */
  rate: formula,
  /** What one event does to each class, so that dN_i/dt = sum of amount_i * rate. */
  effects: z.array(z.object({ class: symbol, amount: formula })).max(LIMITS.effectsPerProcess),
  /** A signed rate makes the model deterministic only. */
  signed: z.boolean().default(false),
  /** The template that wrote it, with the settings it was written from; null for a hand-written one. */
  template: z
    .object({
      name: z.enum(TEMPLATE_NAMES),
      settings: z.record(z.string(), z.unknown()),
      group: z.string().max(64),
    })
    .nullable()
    .default(null),
});

export const quantitySchema = z.object({
  quantity: z.enum(['class', 'total', 'proportion', 'time', 'parameter', 'period']),
  /** Class symbol for class and proportion (of its population), population symbol for total, key for parameter; none for time and period. */
  of: z.string().max(80).default(''),
  logarithm: z.boolean().default(false),
});

export const sweepSchema = z.object({
  id: z.string().min(1).max(64),
  name: name.default(''),
  /** Parameter symbol, trait value symbol, `dial:spread` or `dial:<trait>`. */
  parameter: z.string().min(1).max(80),
  from: finite,
  to: finite,
});

export const PANE_VIEWS = [
  'trajectories',
  'plane',
  'space',
  'diagram',
  'space-diagram',
  'two-parameters',
  'long-run',
  'processes',
  'equations',
] as const;

export const viewSchema = z.object({
  panes: z
    .array(z.object({ view: z.enum(PANE_VIEWS), axes: z.array(quantitySchema).max(3).default([]) }))
    .max(4)
    .default([]),
  showTwin: z.boolean().default(true),
});

const parameterValues = z.record(z.string(), finite).default({});
const factBase = { parameters: parameterValues, source: z.string().max(LIMITS.noteLength).default('') };

export const knownFactSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('equilibrium'),
    at: z.record(z.string(), finite),
    tolerance: z.number().positive(),
    /** Words of the equilibrium's type, e.g. `stable focus`. */
    type: z.string().max(60).nullable().default(null),
    ...factBase,
  }),
  z.object({
    kind: z.literal('special-point'),
    sweep: z.object({ parameter: z.string(), from: finite, to: finite }),
    point: z.enum(['fold', 'Hopf', 'transcritical', 'pitchfork']),
    value: finite,
    tolerance: z.number().positive(),
    of: z.enum(['split', 'twin']).default('split'),
    ...factBase,
  }),
  z.object({
    kind: z.literal('trajectory'),
    starts: z.record(z.string(), finite),
    time: finite,
    at: z.record(z.string(), finite),
    /** Relative to the value. */
    tolerance: z.number().positive(),
    ...factBase,
  }),
  z.object({ kind: z.literal('verdict'), answer: z.string().max(40), ...factBase }),
]);

export const presetSchema = z.object({
  format: z.literal(FORMAT_NAME),
  formatVersion: z.literal(FORMAT_VERSION),
  title: z.string().trim().min(1, 'A title is needed.').max(LIMITS.titleLength),
  summary: z.string().max(1_000).default(''),
  notes: prose,
  tags: z.array(z.string().trim().min(1).max(LIMITS.tagLength)).max(LIMITS.tags).default([]),
  timeUnit: z.string().trim().min(1).max(LIMITS.unitLength).default('year'),
  densityUnit: z.string().trim().max(LIMITS.unitLength).default(''),
  /** Whole individuals in one unit of density, where known. */
  individualsPerUnit: z.number().positive().nullable().default(null),
  /** Density below which the workbench warns; where null, that of one individual. */
  lowDensity: z.number().positive().nullable().default(null),
  populations: z.array(populationSchema).max(LIMITS.populations),
  traits: z.array(traitSchema).max(LIMITS.traits).default([]),
  /** The common spread dial: 0 pooled, 1 as entered. */
  spread: finite.default(1),
  parameters: z.array(parameterSchema).max(LIMITS.parameters).default([]),
  intermediates: z.array(intermediateSchema).max(LIMITS.intermediates).default([]),
  processes: z.array(processSchema).max(LIMITS.processes).default([]),
  /** Formulas that never change along trajectories; checked, and used to call an equilibrium neutral. */
  constantsOfMotion: z.array(formula).max(6).default([]),
  /** Where equilibria are sought; a class left out gets a box from its start values. */
  box: z
    .array(z.object({ class: symbol, from: finite, to: finite }))
    .max(LIMITS.classes)
    .default([]),
  /** Length of a trajectory in time units. */
  horizon: z.number().positive().max(1e9).default(100),
  sweeps: z.array(sweepSchema).max(LIMITS.sweeps).default([]),
  view: viewSchema.default({ panes: [], showTwin: true }),
  knownFacts: z.array(knownFactSchema).max(LIMITS.knownFacts).default([]),
});

export type PresetDocument = z.infer<typeof presetSchema>;
export type PresetInput = z.input<typeof presetSchema>;
export type Population = z.infer<typeof populationSchema>;
export type PopulationClass = z.infer<typeof classSchema>;
export type Trait = z.infer<typeof traitSchema>;
export type TraitEntry = z.infer<typeof traitEntrySchema>;
export type TraitRole = (typeof TRAIT_ROLES)[number];
export type Parameter = z.infer<typeof parameterSchema>;
export type Intermediate = z.infer<typeof intermediateSchema>;
export type Process = z.infer<typeof processSchema>;
export type ProcessKind = (typeof PROCESS_KINDS)[number];
export type TemplateName = (typeof TEMPLATE_NAMES)[number];
export type Quantity = z.infer<typeof quantitySchema>;
export type SweepSettings = z.infer<typeof sweepSchema>;
export type PaneView = (typeof PANE_VIEWS)[number];
export type ViewSettings = z.infer<typeof viewSchema>;
export type KnownFact = z.infer<typeof knownFactSchema>;
