import { z } from './zod';

/**
 * The tasks of the complete engine, beside trajectory, equilibria and sweep. The workbench hands them to its
 * worker, batch reads them from a study: one shape for both.
 */

const finite = z.number().refine(Number.isFinite, 'A finite number is needed.');
const values = z.record(z.string(), finite);
const key = z.string().min(1).max(80);
const box = z.record(z.string(), z.tuple([finite, finite]));

export const commonTask = {
  /** Names the task in the result. */
  id: z.string().max(64).optional(),
  /** Values that replace the document's own, by key: a parameter, a trait value, `spread` or `dial:<trait>`. */
  parameters: values.optional(),
  /** Whether to answer for the pooled twin too; where there is none, it is left out. */
  twin: z.boolean().default(true),
} as const;

const range = { parameter: key, from: finite, to: finite } as const;

export const cyclesTaskSchema = z.strictObject({
  task: z.literal('cycles'),
  ...commonTask,
  ...range,
  /**
   * `Hopf points`: every Hopf point of a sweep over the same range. `trajectory`: the cycle on which the
   * solution from the start values settles. A model with explicit time begins from the period map in
   * either case.
   */
  beginFrom: z.enum(['Hopf points', 'trajectory']).default('Hopf points'),
  starts: values.optional(),
  box: box.optional(),
  /** Mesh intervals and Gauss points in each. */
  intervals: z.int().min(5).max(400).default(40),
  collocationPoints: z.int().min(2).max(7).default(4),
  /** Cycles along a branch. */
  maximumPoints: z.int().min(5).max(5_000).default(400),
  /** How often to switch to the doubled cycle. */
  doublings: z.int().min(0).max(6).default(1),
  /** Periods of the forcing that make one cycle: 1, or more for a subharmonic. */
  forcingPeriods: z.int().min(1).max(24).default(1),
  /** Whether every cycle of every branch is printed, or special points and ends alone. */
  branches: z.boolean().default(true),
  /** Whether the cycles themselves are printed too, sample by sample. */
  orbits: z.boolean().default(false),
});

export const BOUNDARY_KINDS = ['fold', 'Hopf', 'transcritical', 'pitchfork'] as const;

export const boundariesTaskSchema = z.strictObject({
  task: z.literal('boundaries'),
  ...commonTask,
  first: z.strictObject(range),
  second: z.strictObject(range),
  /** Kinds of special points to trace. */
  kinds: z
    .array(z.enum(BOUNDARY_KINDS))
    .min(1)
    .default([...BOUNDARY_KINDS]),
  /** One point to trace alone, as a sweep found it; else a sweep of the first parameter finds them. */
  point: z
    .strictObject({
      kind: z.enum(BOUNDARY_KINDS),
      first: finite,
      second: finite,
      state: values,
      omega: z.number().positive().optional(),
    })
    .optional(),
  starts: values.optional(),
  box: box.optional(),
  maximumPoints: z.int().min(5).max(5_000).default(1_000),
  branches: z.boolean().default(true),
});

const gridAxis = z.strictObject({ ...range, cells: z.int().min(2).max(1_000).default(100) });

export const MAP_QUANTITIES = ['margin', 'attractor', 'lowest', 'exponent'] as const;

export const mapTaskSchema = z.strictObject({
  task: z.literal('map'),
  ...commonTask,
  x: gridAxis,
  y: gridAxis,
  show: z.enum(MAP_QUANTITIES).default('margin'),
  starts: values.optional(),
  /** Time left out, and time observed, for everything but the margin; chosen from the model when absent. */
  transient: z.number().positive().optional(),
  observed: z.number().positive().optional(),
  /** Density below which a population counts as extinct; from individuals per unit of density when absent. */
  extinctBelow: z.number().positive().optional(),
});

export const basinsTaskSchema = z.strictObject({
  task: z.literal('basins'),
  ...commonTask,
  x: z.strictObject({ state: key, from: finite, to: finite, cells: z.int().min(2).max(1_000).default(100) }),
  y: z.strictObject({ state: key, from: finite, to: finite, cells: z.int().min(2).max(1_000).default(100) }),
  starts: values.optional(),
  transient: z.number().positive().optional(),
  observed: z.number().positive().optional(),
  extinctBelow: z.number().positive().optional(),
});

export const lyapunovTaskSchema = z.strictObject({
  task: z.literal('lyapunov'),
  ...commonTask,
  starts: values.optional(),
  transient: z.number().min(0).optional(),
  horizon: z.number().positive().optional(),
  /** Exponents wanted, the largest first; all when absent. */
  exponents: z.int().min(1).max(64).optional(),
});

export const sectionTaskSchema = z.strictObject({
  task: z.literal('section'),
  ...commonTask,
  starts: values.optional(),
  /** Class or population total whose crossing of `value` is recorded. */
  quantity: key,
  value: finite,
  direction: z.enum(['rising', 'falling', 'both']).default('rising'),
  transient: z.number().min(0).optional(),
  crossings: z.int().min(1).max(100_000).default(200),
});

export const extremesTaskSchema = z.strictObject({
  task: z.literal('extremes'),
  ...commonTask,
  ...range,
  values: z.int().min(2).max(5_000).default(200),
  directions: z
    .array(z.enum(['upward', 'downward']))
    .min(1)
    .default(['upward', 'downward']),
  /** Class or population total whose local maxima are recorded; the first population when absent. */
  observe: key.optional(),
  starts: values.optional(),
  transient: z.number().positive().optional(),
  observed: z.number().positive().optional(),
});

export const pictureTaskSchema = z.strictObject({
  task: z.literal('picture'),
  ...commonTask,
  ...range,
  starts: values.optional(),
  box: box.optional(),
  branches: z.boolean().default(true),
});

/** Every task of this file, as the members of a union. */
export const ANALYSIS_TASK_SCHEMAS = [
  cyclesTaskSchema,
  boundariesTaskSchema,
  mapTaskSchema,
  basinsTaskSchema,
  lyapunovTaskSchema,
  sectionTaskSchema,
  extremesTaskSchema,
  pictureTaskSchema,
] as const;

export type CyclesTask = z.infer<typeof cyclesTaskSchema>;
export type BoundariesTask = z.infer<typeof boundariesTaskSchema>;
export type MapTask = z.infer<typeof mapTaskSchema>;
export type BasinsTask = z.infer<typeof basinsTaskSchema>;
export type LyapunovTask = z.infer<typeof lyapunovTaskSchema>;
export type SectionTask = z.infer<typeof sectionTaskSchema>;
export type ExtremesTask = z.infer<typeof extremesTaskSchema>;
export type PictureTask = z.infer<typeof pictureTaskSchema>;
export type AnalysisTask =
  | CyclesTask
  | BoundariesTask
  | MapTask
  | BasinsTask
  | LyapunovTask
  | SectionTask
  | ExtremesTask
  | PictureTask;
export type AnalysisName = AnalysisTask['task'];
