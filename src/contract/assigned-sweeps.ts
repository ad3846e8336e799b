import { z } from '../engine/schema/zod';

import { LIMITS } from '../engine/schema/limits';
import { presetSchema } from '../engine/schema/preset';
import { keptSweepSchema, POINT_KINDS, sweepRangeSchema } from './kept-sweep';

/**
 * Assigned sweeps: lab work that a supervisor sets from a version of a preset, and that members hand in.
 * What is asked (`wanted`) and what is expected (`reference`) are apart, so that an assignee's routes can give
 * the one without ever touching the other.
 */

export const ASSIGNED_STATES = ['draft', 'open', 'closed'] as const;
export type AssignedState = (typeof ASSIGNED_STATES)[number];

/** Where one person stands with one assigned sweep. */
export const WORK_STATES = ['untouched', 'running', 'sent', 'agreed', 'differs', 'sent back'] as const;
export type WorkState = (typeof WORK_STATES)[number];

export const ASSIGNED_LIMITS = {
  titleLength: 160,
  briefLength: 20_000,
  findings: 30,
  labelLength: 160,
  textLength: 4_000,
  people: 300,
  runs: 100,
  remarks: 200,
  openKeys: 200,
} as const;

const finite = z.number().refine(Number.isFinite, 'A finite number is needed.');
const id = z.string().min(1).max(64);
const text = z.string().max(ASSIGNED_LIMITS.textLength, 'This is longer than what is kept.');
const key = z.string().min(1).max(80);

function isTimeZone(name: string): boolean {
  try {
    new Intl.DateTimeFormat('en-GB', { timeZone: name });
    return true;
  } catch {
    return false;
  }
}

export const toleranceSchema = z.object({
  /** In the unit of the value, or as a share of the reference. */
  kind: z.enum(['absolute', 'relative']),
  amount: z.number().nonnegative('A tolerance is zero or more.').max(1e12),
});
export type Tolerance = z.infer<typeof toleranceSchema>;

const wantedBase = {
  id,
  label: z
    .string()
    .trim()
    .min(1, 'Say what is wanted.')
    .max(ASSIGNED_LIMITS.labelLength, `At most ${ASSIGNED_LIMITS.labelLength} characters.`),
};
export const wantedFindingSchema = z.discriminatedUnion('kind', [
  z.object({
    ...wantedBase,
    kind: z.literal('special point'),
    /** The value asked for is that of the swept parameter. */
    point: z.enum(POINT_KINDS),
    of: z.enum(['split', 'twin']),
    tolerance: toleranceSchema,
  }),
  z.object({
    ...wantedBase,
    kind: z.literal('number'),
    unit: z.string().trim().max(LIMITS.unitLength),
    tolerance: toleranceSchema,
  }),
  z.object({ ...wantedBase, kind: z.literal('reading') }),
]);
export type WantedFinding = z.infer<typeof wantedFindingSchema>;

/** What may be changed; everything else of the model is locked. Start values, view and horizon never are. */
export const freedomSchema = z.object({
  /** Keys of parameters, trait values and dials; `all` for any number of the model. */
  parameters: z.union([z.literal('all'), z.array(key).max(ASSIGNED_LIMITS.openKeys)]),
  /** Whether the swept parameter and its range may be chosen. */
  range: z.boolean(),
  /** Whether classes, processes and formulas may be changed; then every number may be too. */
  model: z.boolean(),
});
export type Freedom = z.infer<typeof freedomSchema>;

/** What the supervisor's own run gave for one finding, as reviewed by them. */
export const referenceFindingSchema = z.object({
  id,
  value: finite.nullable(),
  text,
  /** That the supervisor has looked at it and stands by it; opening needs it of every finding with a value. */
  confirmed: z.boolean(),
});
export type ReferenceFinding = z.infer<typeof referenceFindingSchema>;

export const referenceSchema = z.object({
  findings: z.array(referenceFindingSchema).max(ASSIGNED_LIMITS.findings),
  sweep: keptSweepSchema.nullable(),
});
export type Reference = z.infer<typeof referenceSchema>;

const distinctIds = (findings: readonly { id: string }[]) =>
  new Set(findings.map((one) => one.id)).size === findings.length;

const fields = {
  title: z.string().trim().min(1, 'A title is needed.').max(ASSIGNED_LIMITS.titleLength),
  /** Markdown with $mathematics$; rendered without HTML of its own. */
  brief: z.string().max(ASSIGNED_LIMITS.briefLength, 'The brief is longer than what is kept.'),
  range: sweepRangeSchema,
  freedom: freedomSchema,
  wanted: z
    .array(wantedFindingSchema)
    .max(ASSIGNED_LIMITS.findings, `At most ${ASSIGNED_LIMITS.findings} findings.`)
    .refine(distinctIds, 'Two findings have the same id.'),
  reference: referenceSchema,
  /** Null in a draft that has none yet. */
  dueAt: z.iso.datetime('A date and a time are needed.').nullable(),
  timeZone: z.string().min(1).max(64).refine(isTimeZone, 'This is not a time zone that is known.'),
  people: z.array(id).max(ASSIGNED_LIMITS.people, `At most ${ASSIGNED_LIMITS.people} people.`),
};

/** POST /api/labs/:labId/assigned -> 201 assignedSchema: a draft from a version of a preset that one may see. */
export const createAssignedSchema = z.object({ presetId: id, version: z.int().positive() });

/**
 * PATCH /api/assigned/:id -> 200 assignedSchema; 409 `conflict` when `baseRevision` is not the present one.
 * In a draft everything may change. Once open: title, brief, due date, people added (or taken out while they
 * are untouched), labels, tolerances and reference findings; range, freedom and the kinds of findings stay,
 * else 409 `conflict` in words.
 */
export const changeAssignedSchema = z.object({
  baseRevision: z.int().positive(),
  title: fields.title.optional(),
  brief: fields.brief.optional(),
  range: fields.range.optional(),
  freedom: fields.freedom.optional(),
  wanted: fields.wanted.optional(),
  reference: fields.reference.optional(),
  dueAt: fields.dueAt.optional(),
  timeZone: fields.timeZone.optional(),
  people: fields.people.optional(),
});
export type ChangeAssigned = z.infer<typeof changeAssignedSchema>;

const personSchema = z.object({ id: z.string(), name: z.string() });
const stateSchema = z.enum(ASSIGNED_STATES);
const workStateSchema = z.enum(WORK_STATES);

/** GET /api/assigned/:id, for those who may set sweeps in its lab. */
export const assignedSchema = z.object({
  id: z.string(),
  revision: z.number(),
  lab: personSchema,
  state: stateSchema,
  setBy: personSchema.nullable(),
  preset: z.object({ id: z.string(), title: z.string(), version: z.number() }),
  document: presetSchema,
  title: z.string(),
  brief: z.string(),
  range: sweepRangeSchema,
  freedom: freedomSchema,
  wanted: z.array(wantedFindingSchema),
  reference: referenceSchema,
  dueAt: z.string().nullable(),
  timeZone: z.string(),
  people: z.array(personSchema.extend({ state: workStateSchema, member: z.boolean() })),
  createdAt: z.string(),
  openedAt: z.string().nullable(),
  closedAt: z.string().nullable(),
  /** What stands in the way of opening, in words; empty when nothing does. */
  obstacles: z.array(z.string()),
});
export type AssignedBody = z.infer<typeof assignedSchema>;

/**
 * POST /api/assigned/:id/open, /close (and /open again: reopens) with revisionSchema -> 200 assignedSchema; 409 in words.
 * POST /api/assigned/:id/again with revisionSchema -> 201 assignedSchema: a draft with the same work, nobody, no date.
 * DELETE /api/assigned/:id -> 204, drafts alone.
 */
export const revisionSchema = z.object({ baseRevision: z.int().positive() });

export const assignedQuerySchema = z.object({
  state: stateSchema.optional(),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
});

export const assignedSummarySchema = z.object({
  id: z.string(),
  title: z.string(),
  lab: personSchema,
  state: stateSchema,
  dueAt: z.string().nullable(),
  timeZone: z.string(),
  /** The reader's own state where it is for them. */
  mine: workStateSchema.nullable(),
  /** People by state, for those who may review; null for others. */
  counts: z.record(workStateSchema, z.number()).nullable(),
});
export type AssignedSummary = z.infer<typeof assignedSummarySchema>;

/**
 * GET /api/labs/:labId/assigned?state&page, newest first: all of the lab's for those who set sweeps; for others
 * those that are for them and not drafts.
 * GET /api/assigned?page: those of all one's labs that are for oneself and not drafts, by due date, unfinished first.
 */
export const assignedPageSchema = z.object({
  items: z.array(assignedSummarySchema),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
});
export type AssignedPage = z.infer<typeof assignedPageSchema>;

/** One answer to one wanted finding. A special point is pinned from a sweep, or typed. */
export const givenFindingSchema = z.object({
  id,
  value: finite.nullable(),
  text,
  pin: z.object({ kind: z.enum(POINT_KINDS), of: z.enum(['split', 'twin']), parameter: finite }).nullable(),
});
export type GivenFinding = z.infer<typeof givenFindingSchema>;

/** One sweep that was run, as a line of the log that is kept by itself. */
export const runSchema = z.object({
  at: z.iso.datetime(),
  range: sweepRangeSchema,
  /** Numbers that differed from the preset, by key. */
  changed: z.record(key, finite),
  points: z
    .array(z.object({ kind: z.enum(POINT_KINDS), of: z.enum(['split', 'twin']), parameter: finite }))
    .max(100),
  /** How it ended. */
  message: z.string().max(LIMITS.noteLength),
});
export type Run = z.infer<typeof runSchema>;

const workFields = {
  document: presetSchema,
  range: sweepRangeSchema,
  findings: z
    .array(givenFindingSchema)
    .max(ASSIGNED_LIMITS.findings)
    .refine(distinctIds, 'Two findings have the same id.'),
};

/**
 * PUT /api/assigned/:id/work -> 200 workSavedSchema; 409 `conflict` when another window saved since `baseRevision`
 * (0 before the first), 409 in words when the sweep is closed. Only what is not locked may differ from what was set.
 */
export const saveWorkSchema = z.object({
  baseRevision: z.int().nonnegative(),
  ...workFields,
  runs: z.array(runSchema).max(ASSIGNED_LIMITS.runs),
});
export type SaveWork = z.infer<typeof saveWorkSchema>;
export const workSavedSchema = z.object({ revision: z.number(), savedAt: z.string() });

/**
 * POST /api/assigned/:id/hand-ins -> 201 receiptSchema. `key` is made by the client once a hand-in: sent again
 * after a lost answer it gives the same receipt and no second hand-in.
 */
export const handInSchema = z.object({
  key: z.uuid(),
  ...workFields,
  sweep: keptSweepSchema.nullable(),
  note: text,
});
export type HandIn = z.infer<typeof handInSchema>;

export const receiptSchema = z.object({
  id: z.string(),
  /** 1, 2, ... of this person for this sweep. */
  number: z.number(),
  handedInAt: z.string(),
  late: z.boolean(),
  /** First 12 hexadecimal digits of the SHA-256 of what was frozen. */
  code: z.string(),
});
export type Receipt = z.infer<typeof receiptSchema>;

export const JUDGEMENTS = ['agrees', 'differs'] as const;
export type Judgement = (typeof JUDGEMENTS)[number];

export const remarkSchema = z.object({
  id,
  /** The finding that it is about; null for the whole or for a place in the plot. */
  finding: id.nullable(),
  /** A place in the plot: value of the swept parameter, and value of a class. */
  place: z.object({ parameter: finite, of: z.string().max(80), value: finite }).nullable(),
  text: text.min(1, 'A remark needs words.'),
});
export type Remark = z.infer<typeof remarkSchema>;

/** What the review of a hand-in decided; kept apart from the tool's proposals. */
export const reviewSchema = z.object({
  revision: z.number(),
  /** By finding; those left out are undecided. */
  judgements: z.record(id, z.enum(JUDGEMENTS)),
  remarks: z.array(remarkSchema),
  /** Null while the review is not given back: only reviewers see it until then. */
  outcome: z.enum(['agreed', 'differs', 'sent back']).nullable(),
  note: z.string(),
  by: z.string(),
  at: z.string(),
});
export type Review = z.infer<typeof reviewSchema>;

/** PUT /api/hand-ins/:id/review -> 200 reviewedHandInSchema; 409 `conflict` on another's review since `baseRevision` (0 at first). */
export const saveReviewSchema = z.object({
  baseRevision: z.int().nonnegative(),
  judgements: z.record(id, z.enum(JUDGEMENTS)),
  remarks: z.array(remarkSchema).max(ASSIGNED_LIMITS.remarks),
  outcome: z.enum(['agreed', 'differs', 'sent back']).nullable(),
  note: text,
});
export type SaveReview = z.infer<typeof saveReviewSchema>;

/** POST /api/assigned/:id/send-back -> 200 peopleTableSchema: the newest hand-ins of these people, at most once each. */
export const sendBackSchema = z.object({
  people: z.array(id).min(1, 'Choose someone.').max(ASSIGNED_LIMITS.people),
  note: text.min(1, 'Say what is asked for.'),
});

const handedInFields = {
  ...receiptSchema.shape,
  ...workFields,
  sweep: keptSweepSchema.nullable(),
  note: z.string(),
};
/** One's own hand-in as one may see it: a review only once it was given back. */
export const ownHandInSchema = z.object({ ...handedInFields, review: reviewSchema.nullable() });
export type OwnHandIn = z.infer<typeof ownHandInSchema>;

/**
 * GET /api/assigned/:id/task, for whom it is for, once it was opened. Nothing of the reference, of known facts or
 * of kept results of others is in it. `reference` is null until one's own newest hand-in was judged and the sweep
 * is closed.
 */
export const taskSchema = z.object({
  id: z.string(),
  lab: personSchema,
  state: stateSchema,
  setBy: z.string(),
  title: z.string(),
  brief: z.string(),
  /** As set, without known facts. */
  document: presetSchema,
  range: sweepRangeSchema,
  freedom: freedomSchema,
  wanted: z.array(wantedFindingSchema),
  dueAt: z.string().nullable(),
  timeZone: z.string(),
  mine: workStateSchema,
  work: saveWorkSchema.omit({ baseRevision: true }).extend(workSavedSchema.shape).nullable(),
  /** Newest first. */
  handIns: z.array(ownHandInSchema),
  reference: referenceSchema.nullable(),
});
export type Task = z.infer<typeof taskSchema>;

/** What the tool proposes for one finding, with the reason in words. Null where there is nothing to compare. */
export const proposalSchema = z.object({
  judgement: z.enum(JUDGEMENTS).nullable(),
  reason: z.string(),
});
export type Proposal = z.infer<typeof proposalSchema>;

/** GET /api/hand-ins/:id, for reviewers. */
export const reviewedHandInSchema = z.object({
  ...handedInFields,
  person: personSchema,
  assigned: z.object({ id: z.string(), title: z.string(), labId: z.string() }),
  wanted: z.array(wantedFindingSchema),
  reference: referenceSchema,
  /** By finding, as the tolerances are now. */
  proposals: z.record(id, proposalSchema),
  /** Ways in which it differs from what was set, by key or in words. */
  changes: z.array(z.string()),
  review: reviewSchema.nullable(),
  /** This person's hand-ins of this sweep, newest first. */
  all: z.array(receiptSchema.extend({ outcome: reviewSchema.shape.outcome })),
});
export type ReviewedHandIn = z.infer<typeof reviewedHandInSchema>;

/** GET /api/assigned/:id/table, for reviewers; .csv of the same at /table.csv. */
export const peopleTableSchema = z.object({
  wanted: z.array(wantedFindingSchema),
  rows: z.array(
    z.object({
      person: personSchema,
      member: z.boolean(),
      state: workStateSchema,
      /** The newest; null while there is none. */
      handIn: receiptSchema.nullable(),
      runs: z.number(),
      lastActiveAt: z.string().nullable(),
      cells: z.record(
        id,
        z.object({
          value: finite.nullable(),
          text: z.string(),
          proposal: proposalSchema,
          judgement: z.enum(JUDGEMENTS).nullable(),
        }),
      ),
    }),
  ),
});
export type PeopleTable = z.infer<typeof peopleTableSchema>;
