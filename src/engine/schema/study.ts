import { z } from './zod';

import { ANALYSIS_TASK_SCHEMAS, commonTask } from './analysis-tasks';
import { LIMITS } from './limits';
import { presetSchema } from './preset';

/**
 * A study: a model and the tasks to run on it, as one JSON document. Exported by the workbench, run by batch.
 */

const finite = z.number().refine(Number.isFinite, 'A finite number is needed.');
const values = z.record(z.string(), finite);

/** The short form of a model: free equations as text. */
export const equationsSchema = z.strictObject({
  title: z.string().max(LIMITS.titleLength).optional(),
  equations: z.array(z.string().max(LIMITS.formulaLength)).min(1).max(LIMITS.classes),
  parameters: values.optional(),
  init: values.optional(),
  box: z.record(z.string(), z.tuple([finite, finite])).optional(),
  sign: z.enum(['nonnegative', 'any']).optional(),
});

export const METHOD_NAMES = [
  'automatic',
  'dormand-prince-54',
  'dormand-prince-853',
  'odex',
  'rosenbrock',
] as const;

export const trajectoryTaskSchema = z.strictObject({
  task: z.literal('trajectory'),
  ...commonTask,
  /** Start values by class; a class left out starts as the document says. */
  starts: values.optional(),
  /** Times to report, monotone from the start time; else `samples` times up to `horizon`. */
  times: z.array(finite).min(1).max(100_000).optional(),
  startTime: finite.default(0),
  horizon: z.number().positive().optional(),
  samples: z.int().min(2).max(100_000).default(201),
  method: z.enum(METHOD_NAMES).default('automatic'),
  relativeTolerance: z.number().min(1e-13).max(0.1).default(1e-9),
  absoluteTolerance: z.number().min(0).max(1).default(1e-12),
});

export const equilibriaTaskSchema = z.strictObject({
  task: z.literal('equilibria'),
  ...commonTask,
  /** States to start the search from besides its own, by class; they also set the size of a guessed box. */
  starts: values.optional(),
  /** Box to search, by class; else the document's. */
  box: z.record(z.string(), z.tuple([finite, finite])).optional(),
});

export const sweepTaskSchema = z.strictObject({
  task: z.literal('sweep'),
  ...commonTask,
  parameter: z.string().min(1).max(80),
  from: finite,
  to: finite,
  /** A state to begin from besides what the search finds, by class. */
  starts: values.optional(),
  box: z.record(z.string(), z.tuple([finite, finite])).optional(),
  /** Long-run bands past Hopf points. */
  bands: z.boolean().default(true),
  /** Whether every point of every branch is printed, or special points and ends alone. */
  branches: z.boolean().default(true),
});

export const studySchema = z.strictObject({
  preset: z.union([presetSchema, equationsSchema]),
  tasks: z
    .array(
      z.discriminatedUnion('task', [
        trajectoryTaskSchema,
        equilibriaTaskSchema,
        sweepTaskSchema,
        ...ANALYSIS_TASK_SCHEMAS,
      ]),
    )
    .min(1, 'A study needs at least one task.')
    .max(200),
});

export type Study = z.infer<typeof studySchema>;
export type StudyInput = z.input<typeof studySchema>;
export type StudyTask = Study['tasks'][number];
export type EquationsPreset = z.infer<typeof equationsSchema>;

/** The study shape as a JSON Schema (draft 2020-12), for editors and other programs. */
export function studyJsonSchema(): unknown {
  return z.toJSONSchema(studySchema, { io: 'input', unrepresentable: 'any' });
}
