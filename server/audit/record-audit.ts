import type { Transaction } from 'sequelize';

import type { AuditAction } from '@/contract/audit';

import type { Database } from '../models/database';

export interface AuditRecord {
  /** Null for a visitor without an account. */
  actor: { id: string; name: string } | null;
  action: AuditAction;
  /** The lab whose supervisors see it; null keeps it with the account. */
  labId: string | null;
  subject: string;
  details: Record<string, string | number>;
}

/** Writes one line of the history in the transaction of the change itself: both happen, or neither. */
export async function recordAudit(
  database: Database,
  transaction: Transaction,
  { actor, ...rest }: AuditRecord,
): Promise<void> {
  await database.models.AuditEntry.create(
    { at: new Date(), actorId: actor?.id ?? null, actorName: actor?.name ?? 'A visitor', ...rest },
    { transaction },
  );
}
