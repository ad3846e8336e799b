import { QueryTypes } from 'sequelize';

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
import { demandInLab } from '../../policies/lab-policy';

const UNFINISHED = `(a.state = 'open' AND p.state IN ('untouched', 'running', 'sent back'))`;

type Counts = Record<WorkState, number>;
const noCounts = (): Counts => Object.fromEntries(WORK_STATES.map((state) => [state, 0])) as Counts;

/** What a list shows of these sweeps, in their order; nothing that is expected is read. */
async function summarise(
  { database }: Dependencies,
  person: Person,
  ids: readonly string[],
  countFor: (labId: string) => boolean,
): Promise<AssignedSummary[]> {
  const { AssignedSweep, AssignedPerson } = database.models;
  const sweeps = await AssignedSweep.findAll({
    where: { id: [...ids] },
    attributes: ['id', 'title', 'labId', 'state', 'dueAt', 'timeZone'],
    include: [{ association: 'lab' }],
  });
  const places = await AssignedPerson.findAll({
    where: { assignedId: [...ids] },
    attributes: ['assignedId', 'userId', 'state'],
  });
  const byId = new Map(sweeps.map((one) => [one.id, one]));
  return ids.flatMap((id): AssignedSummary[] => {
    const one = byId.get(id);
    if (one === undefined) return [];
    const { title, labId, lab, state, dueAt, timeZone } = one;
    const here = places.filter(({ assignedId }) => assignedId === id);
    const counts = noCounts();
    for (const place of here) counts[place.state] += 1;
    const mine = here.find(({ userId }) => userId === person.id)?.state ?? null;
    const shown = { id, title, lab: { id: labId, name: lab?.name ?? '' }, state, timeZone };
    return [
      {
        ...shown,
        dueAt: dueAt?.toISOString() ?? null,
        mine: countFor(labId) ? null : mine,
        counts: countFor(labId) ? counts : null,
      },
    ];
  });
}

const counted = (person: Person) => (labId: string) =>
  person.memberships.some((one) => one.labId === labId && roleMay(one.role, 'review hand-ins'));

async function page(
  dependencies: Dependencies,
  person: Person,
  { from, where, order }: { from: string; where: string; order: string },
  replacements: Record<string, unknown>,
  number: number,
): Promise<AssignedPage> {
  const { sequelize } = dependencies.database;
  const pageSize = PAGE_SIZE.default;
  const select = <Row extends object>(statement: string) =>
    sequelize.query<Row>(statement, {
      replacements: { ...replacements, limit: pageSize, offset: (number - 1) * pageSize },
      type: QueryTypes.SELECT,
    });
  const rows = await select<{ id: string }>(
    `SELECT a.id FROM ${from} WHERE ${where} ORDER BY ${order} LIMIT :limit OFFSET :offset`,
  );
  const totals = await select<{ total: number }>(`SELECT COUNT(*) AS total FROM ${from} WHERE ${where}`);
  const ids = rows.map(({ id }) => id);
  const items = await summarise(dependencies, person, ids, counted(person));
  return { items, total: totals[0]?.total ?? 0, page: number, pageSize };
}

const MINE = 'assigned_people p JOIN assigned_sweeps a ON a.id = p.assignedId';

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
    'a.labId = :labId',
    ...(state === undefined ? [] : ['a.state = :state']),
    ...(all ? [] : ['p.userId = :me', `a.state <> 'draft'`]),
  ].join(' AND ');
  const query = { from: all ? 'assigned_sweeps a' : MINE, where, order: 'a.createdAt DESC, a.id' };
  return page(dependencies, person, query, { labId, me: person.id, state }, number);
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
  const where = `p.userId = :me AND a.labId IN (:labs) AND a.state <> 'draft'`;
  const query = { from: MINE, where, order: `${UNFINISHED} DESC, a.dueAt, a.id` };
  return page(dependencies, person, query, { me: person.id, labs: labs.length > 0 ? labs : [''] }, number);
}
