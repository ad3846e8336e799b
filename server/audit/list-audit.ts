import { Op, type WhereOptions } from 'sequelize';

import {
  AUDIT_SENTENCES,
  type AuditAction,
  type AuditEntryBody,
  type AuditPage,
  type AuditQuery,
} from '@/contract/audit';

import type { AuditEntry } from '../models/audit-entry';
import type { Database } from '../models/database';
import { csvLines, csvText } from '../presenters/csv';

const PAGE = 50;
const A_DAY = 24 * 60 * 60_000;
/** Lines of one CSV file; a longer history is taken in stretches of dates. */
const MOST_LINES = 10_000;
/** Their subject is the address of someone who may be no member. */
const ABOUT_ADDRESSES: readonly AuditAction[] = [
  'member invited',
  'invitation sent again',
  'invitation withdrawn',
  'invitation declined',
];

function conditions(labId: string | null, { person, action, from, to }: AuditQuery): WhereOptions {
  return {
    labId,
    ...(person === undefined ? {} : { actorId: person }),
    ...(action === undefined ? {} : { action }),
    at: {
      [Op.gte]: new Date(from ?? 0),
      // The last day counts whole.
      [Op.lt]: new Date((to === undefined ? Date.now() : Date.parse(to)) + A_DAY),
    },
  };
}

function present({ id, at, actorId, actorName, action, subject, details }: AuditEntry): AuditEntryBody {
  const actor = { id: actorId, name: actorName };
  return { id, at: at.toISOString(), actor, action, sentence: AUDIT_SENTENCES[action], subject, details };
}

/** A page of the history of a lab, newest first; without a lab, of what concerns accounts alone. */
export async function listAudit(
  { models }: Database,
  labId: string | null,
  query: AuditQuery,
): Promise<AuditPage> {
  const { rows, count } = await models.AuditEntry.findAndCountAll({
    where: conditions(labId, query),
    order: [['id', 'DESC']],
    limit: PAGE,
    offset: (query.page - 1) * PAGE,
  });
  return { items: rows.map(present), total: count, page: query.page, pageSize: PAGE };
}

/** The same as CSV, without pages; without addresses where the file goes out of the lab's hands. */
export async function auditAsCsv(
  { models }: Database,
  labId: string,
  query: AuditQuery,
  { addresses }: { addresses: boolean } = { addresses: true },
): Promise<string> {
  const rows = await models.AuditEntry.findAll({
    where: conditions(labId, query),
    order: [['id', 'DESC']],
    limit: MOST_LINES,
  });
  const told = (action: AuditAction, subject: string) =>
    addresses || !ABOUT_ADDRESSES.includes(action) ? subject : '';
  const lines = rows.map(({ at, actorName, action, subject, details }) =>
    [at.toISOString(), actorName, action, told(action, subject), JSON.stringify(details)]
      .map(csvText)
      .join(','),
  );
  return csvLines(['time,person,action,subject,details', ...lines]);
}
