import type { SessionBody, SessionList } from '@/contract/account';

import type { Person } from '../middleware/current-user';
import type { SessionRecord } from '../models/session-record';

export function presentSession(person: Person | null, csrfToken: string, demo: boolean): SessionBody {
  const user = person && {
    id: person.id,
    name: person.name,
    email: person.email,
    demo: person.demo,
    memberships: person.memberships,
  };
  return { user, csrfToken, demo };
}

export function presentSessionList(records: readonly SessionRecord[], currentId: string): SessionList {
  return {
    sessions: records.map((record) => ({
      id: record.publicId,
      current: record.publicId === currentId,
      startedAt: record.createdAt.toISOString(),
      lastSeenAt: record.lastSeenAt.toISOString(),
      agent: record.agent,
    })),
  };
}
