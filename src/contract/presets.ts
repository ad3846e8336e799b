import { z } from '../engine/schema/zod';

import { LIMITS } from '../engine/schema/limits';
import { presetSchema } from '../engine/schema/preset';
import { PRESET_RIGHTS } from './rights';

/** Whether one who opens a link may only look, or also make a copy. */
export const LINK_ACCESS = ['view', 'copy'] as const;
export type LinkAccess = (typeof LINK_ACCESS)[number];

export const VISIBILITIES = ['private', 'lab'] as const;
export const PRESET_SORTS = ['changed', 'created', 'title', 'owner'] as const;
export const PAGE_SIZE = { default: 20, largest: 100 } as const;

const note = z.string().trim().max(LIMITS.noteLength).default('');

/** GET /api/presets?search&tag&owner&kind&sort&order&page&pageSize */
export const presetQuerySchema = z.object({
  search: z.string().trim().max(200).default(''),
  tag: z.string().trim().max(LIMITS.tagLength).default(''),
  /** `me`, or a user id. */
  owner: z.string().max(64).default(''),
  kind: z.enum(['all', 'starter', 'own', 'lab']).default('all'),
  sort: z.enum(PRESET_SORTS).default('changed'),
  order: z.enum(['ascending', 'descending']).optional(),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
  pageSize: z.coerce.number().int().min(1).max(PAGE_SIZE.largest).default(PAGE_SIZE.default),
});
export type PresetQuery = z.infer<typeof presetQuerySchema>;

/** POST /api/presets -> 201 presetBody */
export const createPresetSchema = z.object({
  document: presetSchema,
  note,
  visibility: z.enum(VISIBILITIES).default('private'),
  labId: z.string().max(64).nullable().default(null),
});
/** POST /api/presets/:id/versions -> 201 presetBody, or 409 `conflict` with `head` when `baseVersion` is not the head. */
export const saveVersionSchema = z.object({ document: presetSchema, note, baseVersion: z.int().positive() });
/** PATCH /api/presets/:id -> 200 presetBody, or 409 `conflict` when it is no longer as in `from`; DELETE /api/presets/:id -> 204 */
export const changePresetSchema = z.object({
  /** Who saw it when the change was decided on. */
  from: z.object({ visibility: z.enum(VISIBILITIES), labId: z.string().max(64).nullable() }).optional(),
  visibility: z.enum(VISIBILITIES),
  labId: z.string().max(64).nullable().default(null),
});
/** POST /api/presets/:id/duplicate and POST /api/shared/:token/copy -> 201 presetBody */
export const duplicatePresetSchema = z.object({
  version: z.int().positive().nullable().default(null),
  title: z.string().trim().max(LIMITS.titleLength).default(''),
});
/** POST /api/presets/:id/versions/:number/restore -> 201 presetBody; makes a new version equal to the old. */
export const restoreVersionSchema = z.object({ note, baseVersion: z.int().positive() });
/** POST /api/presets/:id/links -> 201 { link, token, url }: shown once here, kept hashed; url is `/s/<token>` on PUBLIC_URL. */
export const createLinkSchema = z.object({
  label: z.string().trim().max(LIMITS.nameLength).default(''),
  /** When it stops opening anything; null for never. */
  expiresAt: z.iso.datetime().nullable().default(null),
  access: z.enum(LINK_ACCESS).default('copy'),
});
export type NewLink = z.output<typeof createLinkSchema>;

export const presetSummarySchema = z.object({
  id: z.string(),
  title: z.string(),
  summary: z.string(),
  tags: z.array(z.string()),
  starter: z.boolean(),
  visibility: z.enum(['private', 'lab', 'starter']),
  owner: z.object({ id: z.string(), name: z.string() }).nullable(),
  lab: z.object({ id: z.string(), name: z.string() }).nullable(),
  version: z.number(),
  changedAt: z.string(),
  createdAt: z.string(),
  /** e.g. "springtails, spiders (2 classes)" for the card. */
  populations: z.array(z.object({ name: z.string(), hue: z.string(), classes: z.number() })),
});
export type PresetSummary = z.infer<typeof presetSummarySchema>;

export const presetPageSchema = z.object({
  items: z.array(presetSummarySchema),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
});
export type PresetPage = z.infer<typeof presetPageSchema>;

/** GET /api/presets/choices: what the list can be narrowed by. */
export const presetChoicesSchema = z.object({
  /** Tags with counts over what the reader may see, most used first, at most 40. */
  tags: z.array(z.object({ tag: z.string(), count: z.number() })),
  owners: z.array(z.object({ id: z.string(), name: z.string() })),
});
export type PresetChoices = z.infer<typeof presetChoicesSchema>;

export const versionSummarySchema = z.object({
  number: z.number(),
  author: z.string(),
  savedAt: z.string(),
  note: z.string(),
  restoredFrom: z.number().nullable(),
});
export type VersionSummary = z.infer<typeof versionSummarySchema>;

/** GET /api/presets/:id (head) and GET /api/presets/:id/versions/:number */
export const presetBodySchema = z.object({
  preset: presetSummarySchema,
  version: versionSummarySchema,
  document: presetSchema,
  rights: z.array(z.enum(PRESET_RIGHTS)),
});
export type PresetBody = z.infer<typeof presetBodySchema>;

/** GET /api/presets/:id/versions?page */
export const versionPageSchema = z.object({
  items: z.array(versionSummarySchema),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
});
export type VersionPage = z.infer<typeof versionPageSchema>;

export const shareLinkSchema = z.object({
  id: z.string(),
  label: z.string(),
  createdAt: z.string(),
  revokedAt: z.string().nullable(),
  opened: z.number(),
  lastOpenedAt: z.string().nullable(),
  expiresAt: z.string().nullable(),
  access: z.enum(LINK_ACCESS),
});
export type ShareLink = z.infer<typeof shareLinkSchema>;
/** GET /api/presets/:id/links; DELETE /api/presets/:id/links/:linkId -> 204 */
export const linkListSchema = z.object({ links: z.array(shareLinkSchema) });
export const createdLinkSchema = z.object({ link: shareLinkSchema, token: z.string(), url: z.string() });

/** GET /api/shared/:token, no account needed; shows the head version; 404 when revoked, expired or unknown. */
export const sharedBodySchema = z.object({
  title: z.string(),
  /** False for a link that only shows: POST /api/shared/:token/copy answers 403. */
  mayCopy: z.boolean(),
  owner: z.string(),
  version: versionSummarySchema,
  document: presetSchema,
});
export type SharedBody = z.infer<typeof sharedBodySchema>;
