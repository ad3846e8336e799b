import type { AssignedSweep } from '../../models/assigned-sweep';

type Parts = Pick<AssignedSweep, 'state' | 'wanted' | 'reference' | 'dueAt'>;

/** Wanted findings whose reference value is missing or not confirmed. */
function unconfirmed({ wanted, reference }: Parts): string[] {
  return wanted
    .filter((one) => {
      const expected = reference.findings.find(({ id }) => id === one.id);
      if (one.kind === 'reading') return false;
      return !expected || expected.value === null || !expected.confirmed;
    })
    .map(({ label }) => label);
}

/** What stands in the way of opening, in words; nothing for one that is open. */
export function obstaclesToOpening(assigned: Parts, people: number, now = new Date()): string[] {
  if (assigned.state === 'open') return [];
  const obstacles: string[] = [];
  if (people === 0) obstacles.push('Nobody is chosen whom it is for.');
  if (assigned.dueAt === null) obstacles.push('It has no due date.');
  else if (assigned.dueAt <= now) obstacles.push('The due date is past.');
  if (assigned.wanted.length === 0) obstacles.push('No finding is wanted.');
  const missing = unconfirmed(assigned);
  if (missing.length > 0)
    obstacles.push(`A reference value is missing or not confirmed for: ${missing.join('; ')}.`);
  return obstacles;
}
