import { QueryTypes } from 'sequelize';

import { AUDIT_SENTENCES, type AuditAction } from '@/contract/audit';
import type { ActivityPage } from '@/contract/activity';

import type { Database } from '../../models/database';

const PAGE = 30;
/** Versions and comments speak for themselves. */
const FROM_HISTORY: readonly AuditAction[] = [
  'visibility changed',
  'preset deleted',
  'preset brought back',
  'link created',
  'link withdrawn',
  'comment resolved',
  'comment reopened',
  'comment deleted',
];

/** Everything that was done to a preset, each from where it is kept, by an index of its own. */
export const ACTIVITY_QUERY = `
  SELECT 'history ' || id AS key, at, actorName AS actor, action, NULL AS version, '' AS note,
    json_extract(details, '$.thread') AS thread
  FROM audit_entries WHERE json_extract(details, '$.preset') = :presetId AND action IN (:actions)
  UNION ALL
  SELECT 'version ' || v.number, v.savedAt, COALESCE(u.name, 'Moiety'),
    CASE WHEN v.number = 1 THEN 'preset created' WHEN v.restoredFrom IS NULL THEN 'version saved' ELSE 'version restored' END,
    v.number, v.note, NULL
  FROM preset_versions v LEFT JOIN users u ON u.id = v.authorId WHERE v.presetId = :presetId
  UNION ALL
  SELECT 'comment ' || c.id, c.createdAt, COALESCE(u.name, c.authorName),
    CASE WHEN c.threadId IS NULL THEN 'commented' ELSE 'replied' END, c.version, '', COALESCE(c.threadId, c.id)
  FROM comments c LEFT JOIN users u ON u.id = c.authorId WHERE c.presetId = :presetId AND c.deletedAt IS NULL`;

interface ActivityRow {
  readonly key: string;
  readonly at: string;
  readonly actor: string;
  readonly action: AuditAction | 'commented' | 'replied';
  readonly version: number | null;
  readonly note: string;
  readonly thread: string | null;
}

const sentenceOf = (action: ActivityRow['action']): string =>
  action === 'commented'
    ? 'commented'
    : action === 'replied'
      ? 'replied to a comment'
      : AUDIT_SENTENCES[action];

/** A page of what was done to a preset, newest first; the words of comments are not in it. */
export async function listActivity(
  { sequelize }: Database,
  presetId: string,
  page: number,
): Promise<ActivityPage> {
  const replacements = { presetId, actions: [...FROM_HISTORY], limit: PAGE, offset: (page - 1) * PAGE };
  const [rows, counted] = await Promise.all([
    sequelize.query<ActivityRow>(`${ACTIVITY_QUERY} ORDER BY at DESC, key DESC LIMIT :limit OFFSET :offset`, {
      replacements,
      type: QueryTypes.SELECT,
    }),
    sequelize.query<{ total: number }>(`SELECT COUNT(*) AS total FROM (${ACTIVITY_QUERY})`, {
      replacements,
      type: QueryTypes.SELECT,
    }),
  ]);
  return {
    items: rows.map(({ key, at, actor, action, version, note, thread }) => ({
      key,
      at: new Date(at).toISOString(),
      actor,
      sentence: sentenceOf(action),
      version,
      note,
      thread,
    })),
    total: counted[0]?.total ?? 0,
    page,
    pageSize: PAGE,
  };
}
