import { z } from '../engine/schema/zod';

import { LIMITS } from '../engine/schema/limits';

export const COMMENT_LIMITS = { textLength: 8000, mentions: 20, repliesInThread: 200, pageSize: 20 } as const;

const id = z.string().min(1).max(64);
const symbol = z.string().min(1).max(LIMITS.symbolLength);
const finite = z.number().refine(Number.isFinite);

/** A special point as it stands in the diagram: the comment stays there whatever is saved later. */
export const pinSchema = z.object({
  model: z.enum(['split', 'twin']),
  kind: z.string().trim().min(1).max(60),
  /** Key of the swept parameter, and where on it the point lies. */
  parameter: z.string().min(1).max(LIMITS.nameLength),
  value: finite,
  states: z
    .record(symbol, finite)
    .refine((states) => Object.keys(states).length <= LIMITS.classes)
    .optional(),
});
export type CommentPin = z.infer<typeof pinSchema>;

const textSchema = z
  .string()
  .trim()
  .min(1, 'Write something first.')
  .max(COMMENT_LIMITS.textLength, `A comment has at most ${COMMENT_LIMITS.textLength} characters.`);

/** POST /api/presets/:id/comments -> 201 threadSchema. A reply names its thread; a pin belongs to a version. */
export const writeCommentSchema = z
  .object({
    text: textSchema,
    thread: id.nullable().default(null),
    version: z.int().positive().nullable().default(null),
    pin: pinSchema.nullable().default(null),
  })
  .superRefine(({ thread, version, pin }, context) => {
    const refuse = (path: string, message: string) =>
      context.addIssue({ code: 'custom', path: [path], message });
    if (thread !== null && version !== null) refuse('version', 'A reply stands where its thread stands.');
    if (pin !== null && version === null) refuse('pin', 'A pinned comment names the version it was made on.');
  });
export type WriteComment = z.input<typeof writeCommentSchema>;

/** PATCH /api/presets/:id/comments/:commentId -> 200 threadSchema; 409 `conflict` when `revision` is not the newest. */
export const editCommentSchema = z.object({ text: textSchema, revision: z.int().positive() });
/** PUT /api/presets/:id/comments/:commentId/resolved, for the first comment of a thread -> 200 threadSchema. */
export const resolveThreadSchema = z.object({ resolved: z.boolean() });

/** GET /api/presets/:id/comments?state&thread&page -> 200 commentPageSchema */
export const commentQuerySchema = z.object({
  state: z.enum(['open', 'resolved', 'all']).default('open'),
  thread: id.optional(),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
});
export type CommentQuery = z.infer<typeof commentQuerySchema>;

const personSchema = z.object({ id: z.string(), name: z.string() });
export type CommentPerson = z.infer<typeof personSchema>;

export const commentSchema = z.object({
  id: z.string(),
  revision: z.number(),
  /** As they are called now, or were when they wrote. */
  author: personSchema,
  /** Markdown, in which `@{id}` stands for a person of `mentions`; empty when it was deleted. */
  text: z.string(),
  mentions: z.array(personSchema),
  createdAt: z.string(),
  editedAt: z.string().nullable(),
  deleted: z.boolean(),
  mine: z.boolean(),
});
export type CommentBody = z.infer<typeof commentSchema>;

export const threadSchema = z.object({
  id: z.string(),
  version: z.number().nullable(),
  pin: pinSchema.nullable(),
  resolved: z.object({ at: z.string(), by: z.string() }).nullable(),
  mayResolve: z.boolean(),
  /** The first comment and its replies, oldest first. */
  comments: z.array(commentSchema),
});
export type ThreadBody = z.infer<typeof threadSchema>;

export const commentPageSchema = z.object({
  items: z.array(threadSchema),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
  open: z.number(),
  resolved: z.number(),
  /** True while a sweep from this preset, set for the reader, is unjudged: comments could tell its answer. */
  held: z.boolean(),
});
export type CommentPage = z.infer<typeof commentPageSchema>;

/** GET /api/presets/:id/comments/people: whom one may mention. */
export const commentPeopleSchema = z.object({ people: z.array(personSchema) });

/** Ids that a text mentions, each once. */
export function mentionedIn(text: string): string[] {
  return [...new Set([...text.matchAll(/@\{([\w-]{1,64})\}/g)].map((match) => match[1] ?? ''))];
}
