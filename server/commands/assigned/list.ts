import {
  WORK_STATES,
  type AssignedPage,
  type AssignedState,
  type AssignedSummary,
  type WorkState,
} from '@/contract/assigned-sweeps';
import { PAGE_SIZE } from '@/contract/presets';
import { roleMay } from '@/contract/rights';

import type { Dependencies } from '../../dependencies';
import type { Person } from '../../middleware/current-user';
import type { ReadValues } from '../../models/reader';
import { demandInLab } from '../../policies/lab-policy';

const UNFINISHED = `(a.state = 'open' AND p.state IN ('untouched', 'running', 'sent back'))`;

const noCounts = Object.fromEntries(WORK_STATES.map((state) => [state, 0])) as Record<WorkState, number>;

interface Row {
  id: string;
  title: string;
  labId: string;
  labName: string;
  state: AssignedState;
  dueAt: string | null;
  timeZone: string;
  mine: WorkState | null;
  counts: string;
}

/** Of each sweep of the page: what a list shows, the reader's own state, and people by state; nothing that is expected. */
const SHOWN = `shown.id, shown.title, shown.labId, l.name AS labName, shown.state, shown.dueAt, shown.timeZone,
  (SELECT state FROM assigned_people WHERE assignedId = shown.id AND userId = $me) AS mine,
  (SELECT json_group_object(state, n) FROM (
    SELECT state, COUNT(*) AS n FROM assigned_people WHERE assignedId = shown.id GROUP BY state
  )) AS counts`;

const summarise =
  (person: Person) =>
  ({ labId, labName, dueAt, mine, counts, ...shown }: Row): AssignedSummary => {
    const counted = person.memberships.some(
      (one) => one.labId === labId && roleMay(one.role, 'review hand-ins'),
    );
    return {
      ...shown,
      lab: { id: labId, name: labName },
      dueAt: dueAt === null ? null : new Date(dueAt).toISOString(),
      mine: counted ? null : mine,
      counts: counted ? { ...noCounts, ...(JSON.parse(counts) as Partial<typeof noCounts>) } : null,
    };
  };

async function page(
  { database }: Dependencies,
  person: Person,
  { from, where, order, values }: { from: string; where: string; order: string; values: ReadValues },
  number: number,
): Promise<AssignedPage> {
  const pageSize = PAGE_SIZE.default;
  const rows = await database.read<Row>(
    `SELECT ${SHOWN} FROM (
       SELECT a.id, a.title, a.labId, a.state, a.dueAt, a.timeZone, ROW_NUMBER() OVER (ORDER BY ${order}) AS place FROM ${from} WHERE ${where}
       ORDER BY place LIMIT $limit OFFSET $offset
     ) shown CROSS JOIN labs l ON l.id = shown.labId ORDER BY shown.place`,
    { me: person.id, ...values, limit: pageSize, offset: (number - 1) * pageSize },
  );
  const [count] = await database.read<{ total: number }>(
    `SELECT COUNT(*) AS total FROM ${from} WHERE ${where}`,
    values,
  );
  return { items: rows.map(summarise(person)), total: count?.total ?? 0, page: number, pageSize };
}

const MINE = 'assigned_people p CROSS JOIN assigned_sweeps a ON a.id = p.assignedId';

/** Sweeps of a lab, newest first: all of them for those who set sweeps, one's own for others. */
export async function listInLab(
  dependencies: Dependencies,
  person: Person,
  labId: string,
  { state, page: number }: { state?: AssignedState | undefined; page: number },
): Promise<AssignedPage> {
  const role = demandInLab(person, 'view lab', labId);
  const all = roleMay(role, 'set sweeps');
  const where = [
    'a.labId = $labId',
    ...(state === undefined ? [] : ['a.state = $state']),
    ...(all ? [] : ['p.userId = $me', `a.state <> 'draft'`]),
  ].join(' AND ');
  const values = {
    labId,
    ...(state === undefined ? {} : { state }),
    ...(all ? {} : { me: person.id }),
  };
  const from = all ? 'assigned_sweeps a' : MINE;
  return page(dependencies, person, { from, where, order: 'a.createdAt DESC, a.id', values }, number);
}

/** Sweeps of all labs that are for oneself, unfinished ones first, by due date. */
export async function listMine(
  dependencies: Dependencies,
  person: Person,
  number: number,
): Promise<AssignedPage> {
  const labs = person.memberships
    .filter(({ role }) => roleMay(role, 'do assigned sweeps'))
    .map(({ labId }) => labId);
  const where = `p.userId = $me AND a.labId IN (SELECT value FROM json_each($labs)) AND a.state <> 'draft'`;
  const values = { me: person.id, labs: JSON.stringify(labs) };
  const order = `${UNFINISHED} DESC, a.dueAt, a.id`;
  return page(dependencies, person, { from: MINE, where, order, values }, number);
}
