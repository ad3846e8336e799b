import { z } from '../engine/schema/zod';

import { LIMITS } from '../engine/schema/limits';

/**
 * A sweep as it is kept with a hand-in or a reference: what was found and enough of the branches to draw them.
 * Whoever keeps one thins its branches; `thinned` says so.
 */

export const KEPT_SWEEP_LIMITS = {
  branches: 80,
  pointsPerBranch: 600,
  specialPoints: 400,
  /** Numbers in all, both models together: what keeps a hand-in below a megabyte. */
  numbers: 60_000,
} as const;

/** Kinds of special points of equilibria and of cycles. */
export const POINT_KINDS = [
  'fold',
  'Hopf',
  'transcritical',
  'pitchfork',
  'branch point',
  'neutral saddle',
  'fold of cycles',
  'period doubling',
  'torus',
  'branch point of cycles',
] as const;
export type PointKind = (typeof POINT_KINDS)[number];

const finite = z.number().refine(Number.isFinite, 'A finite number is needed.');
const symbol = z.string().max(80);
const words = z.string().max(LIMITS.noteLength);

export const sweepRangeSchema = z
  .object({ parameter: symbol.min(1, 'Choose a parameter to sweep.'), from: finite, to: finite })
  .refine((range) => range.from < range.to, {
    message: 'The range must end above its beginning.',
    path: ['to'],
  });
export type SweepRange = z.infer<typeof sweepRangeSchema>;

export const keptPointSchema = z.object({
  kind: z.enum(POINT_KINDS),
  parameter: finite,
  /** Values of the state there; of a cycle, its mean is not kept and this is empty. */
  state: z.record(symbol, finite),
  /** Of a cycle. */
  period: finite.nullable(),
  meaning: words,
});
export type KeptPoint = z.infer<typeof keptPointSchema>;

const branchSchema = z
  .object({
    of: z.enum(['equilibria', 'cycles']),
    parameters: z.array(finite).max(KEPT_SWEEP_LIMITS.pointsPerBranch),
    /** One series a class symbol: the value at an equilibrium, the highest of a cycle. */
    values: z.record(symbol, z.array(finite).max(KEPT_SWEEP_LIMITS.pointsPerBranch)),
    /** The lowest of a cycle; empty for equilibria. */
    lowest: z.record(symbol, z.array(finite).max(KEPT_SWEEP_LIMITS.pointsPerBranch)),
    /** 1 attracts, 0 repels, 2 neutral or undecided. */
    attracts: z.array(z.int().min(0).max(2)).max(KEPT_SWEEP_LIMITS.pointsPerBranch),
  })
  .refine(
    (branch) =>
      branch.attracts.length === branch.parameters.length &&
      [...Object.values(branch.values), ...Object.values(branch.lowest)].every(
        (series) => series.length === branch.parameters.length,
      ),
    'Every series of a branch has one value a point.',
  );
export type KeptBranch = z.infer<typeof branchSchema>;

export const keptModelSchema = z.object({
  /** Words of the engine on how the sweep ended. */
  message: words,
  complete: z.boolean(),
  thinned: z.boolean(),
  points: z.array(keptPointSchema).max(KEPT_SWEEP_LIMITS.specialPoints),
  branches: z.array(branchSchema).max(KEPT_SWEEP_LIMITS.branches),
});
export type KeptModel = z.infer<typeof keptModelSchema>;

const countNumbers = (model: KeptModel | null) =>
  (model?.branches ?? []).reduce(
    (sum, { parameters, values, lowest }) =>
      sum + parameters.length * (2 + Object.keys(values).length + Object.keys(lowest).length),
    0,
  );

export const keptSweepSchema = z
  .object({
    range: sweepRangeSchema,
    computedAt: z.iso.datetime(),
    split: keptModelSchema,
    twin: keptModelSchema.nullable(),
  })
  .refine(
    ({ split, twin }) => countNumbers(split) + countNumbers(twin) <= KEPT_SWEEP_LIMITS.numbers,
    'The sweep is larger than what is kept of one.',
  );
export type KeptSweep = z.infer<typeof keptSweepSchema>;
