import { z } from '../engine/schema/zod';

/** What the history of a lab or an account records, each with its sentence after the person's name. */
export const AUDIT_SENTENCES = {
  'preset created': 'began a preset',
  'version saved': 'saved a version',
  'version restored': 'restored an old version',
  'visibility changed': 'changed who sees a preset',
  'preset deleted': 'deleted a preset',
  'preset brought back': 'brought a deleted preset back',
  'preset purged': 'was deleted for good after 30 days',
  'link created': 'made a share link',
  'link withdrawn': 'withdrew a share link',
  'link opened': 'opened a share link',
  'comment resolved': 'resolved a comment',
  'comment reopened': 'opened a comment again',
  'comment deleted': 'deleted a comment',
  'lab created': 'founded the lab',
  'lab renamed': 'renamed the lab',
  'lab exported': 'exported all that the lab has',
  'member invited': 'invited someone',
  'invitation sent again': 'sent an invitation again',
  'invitation withdrawn': 'withdrew an invitation',
  'invitation accepted': 'joined by an invitation',
  'invitation declined': 'declined an invitation',
  'role changed': 'changed a role',
  'member removed': 'removed a member',
  'member left': 'left the lab',
  'sweep drafted': 'drafted an assigned sweep',
  'sweep set again': 'drafted an assigned sweep again for others',
  'sweep opened': 'opened an assigned sweep',
  'sweep changed': 'changed an open assigned sweep',
  'sweep closed': 'closed an assigned sweep',
  'sweep reopened': 'opened an assigned sweep again',
  'sweep deleted': 'deleted the draft of an assigned sweep',
  'handed in': 'handed in an assigned sweep',
  'hand-in reviewed': 'reviewed a hand-in',
  'hand-in sent back': 'sent a hand-in back',
  'signed in': 'signed in',
  'sign-in refused': 'was refused a sign-in with a wrong password',
  'password changed': 'changed the password',
  'account deleted': 'deleted their account',
} as const;
export type AuditAction = keyof typeof AUDIT_SENTENCES;
export const AUDIT_ACTIONS = Object.keys(AUDIT_SENTENCES) as [AuditAction, ...AuditAction[]];

export const auditQuerySchema = z.object({
  person: z.string().max(60).optional(),
  action: z.enum(AUDIT_ACTIONS).optional(),
  from: z.iso.date().optional(),
  to: z.iso.date().optional(),
  page: z.coerce.number().int().min(1).max(100_000).default(1),
});
export type AuditQuery = z.infer<typeof auditQuerySchema>;

/**
 * GET /api/labs/:labId/audit for those who may read its history, newest first; the same as CSV at /audit.csv.
 * GET /api/account/audit: what concerns oneself and no lab.
 */
export const auditPageSchema = z.object({
  items: z.array(
    z.object({
      id: z.number(),
      at: z.string(),
      actor: z.object({ id: z.string().nullable(), name: z.string() }),
      action: z.enum(AUDIT_ACTIONS),
      sentence: z.string(),
      subject: z.string(),
      details: z.record(z.string(), z.union([z.string(), z.number()])),
    }),
  ),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
});
export type AuditPage = z.infer<typeof auditPageSchema>;
export type AuditEntryBody = AuditPage['items'][number];
