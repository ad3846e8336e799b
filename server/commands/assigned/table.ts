import { proposeJudgement } from '@/contract/agreement';
import type { GivenFinding, Judgement, PeopleTable, Receipt } from '@/contract/assigned-sweeps';

import type { Dependencies } from '../../dependencies';
import type { Person } from '../../middleware/current-user';
import type { AssignedSweep } from '../../models/assigned-sweep';
import { csvLines, csvNumber, csvText } from '../../presenters/csv';
import { findForLab } from './find';
import { readPeople } from './read';

type Row = PeopleTable['rows'][number];

interface NewestRow {
  readonly userId: string;
  readonly id: string;
  readonly number: number;
  readonly handedInAt: string;
  readonly late: 0 | 1;
  readonly code: string;
  readonly findings: string;
  readonly judgements: string | null;
}

interface Newest {
  readonly receipt: Receipt;
  readonly findings: readonly GivenFinding[];
  readonly judgements: Readonly<Record<string, Judgement>>;
}

/** The newest hand-in of each person, without what was frozen. */
async function readNewest({ database }: Dependencies, id: string): Promise<Map<string, Newest>> {
  const rows = await database.read<NewestRow>(
    `SELECT h.userId, h.id, h.number, h.handedInAt, h.late, h.code, h.findings, r.judgements
     FROM hand_ins h LEFT JOIN reviews r ON r.handInId = h.id
     WHERE h.assignedId = $id AND h.number = (
       SELECT MAX(number) FROM hand_ins WHERE assignedId = h.assignedId AND userId = h.userId
     )`,
    { id },
  );
  return new Map(
    rows.map(({ userId, late, handedInAt, findings, judgements, id: handInId, number, code }) => [
      userId,
      {
        receipt: {
          id: handInId,
          number,
          code,
          late: late === 1,
          handedInAt: new Date(handedInAt).toISOString(),
        },
        findings: JSON.parse(findings) as GivenFinding[],
        judgements: judgements === null ? {} : (JSON.parse(judgements) as Newest['judgements']),
      },
    ]),
  );
}

function cellsOf({ wanted, reference }: AssignedSweep, newest: Newest | undefined): Row['cells'] {
  return Object.fromEntries(
    wanted.map((one) => {
      const given = newest?.findings.find(({ id }) => id === one.id);
      const expected = reference.findings.find(({ id }) => id === one.id);
      return [
        one.id,
        {
          value: given?.value ?? null,
          text: given?.text ?? '',
          proposal: proposeJudgement(one, expected, given),
          judgement: newest?.judgements[one.id] ?? null,
        },
      ];
    }),
  );
}

/** People by findings, each with their newest hand-in and what the tool proposes now. */
export async function readTable(
  dependencies: Dependencies,
  person: Person,
  id: string,
): Promise<PeopleTable> {
  const assigned = await findForLab(dependencies, person, id, 'review hand-ins');
  const people = await readPeople(dependencies, assigned);
  const works = await dependencies.database.read<{ userId: string; runs: number; savedAt: string }>(
    'SELECT userId, runs, savedAt FROM assigned_work WHERE assignedId = $id',
    { id },
  );
  const newestOf = await readNewest(dependencies, id);
  const workOf = new Map(works.map((one) => [one.userId, one]));
  const rows = people.map(({ id: userId, name, state, member }): Row => {
    const work = workOf.get(userId);
    const newest = newestOf.get(userId);
    const seen = Math.max(
      Date.parse(work?.savedAt ?? '') || 0,
      Date.parse(newest?.receipt.handedInAt ?? '') || 0,
    );
    return {
      person: { id: userId, name },
      member,
      state,
      handIn: newest?.receipt ?? null,
      runs: work?.runs ?? 0,
      lastActiveAt: seen > 0 ? new Date(seen).toISOString() : null,
      cells: cellsOf(assigned, newest),
    };
  });
  return { wanted: assigned.wanted, rows };
}

/** One line a person; of every finding its value, what the tool proposes and what was decided. */
export function tableAsCsv({ wanted, rows }: PeopleTable): string {
  const head = [
    ...['person', 'state', 'member', 'hand-in', 'handed in at', 'late', 'receipt'],
    ...wanted.flatMap(({ label }) => [label, `${label}: proposal`, `${label}: judgement`]),
  ];
  const lines = rows.map(({ person, state, member, handIn, cells }) =>
    [
      csvText(person.name),
      csvText(state),
      csvText(member ? 'yes' : 'no'),
      csvNumber(handIn?.number ?? null),
      csvText(handIn?.handedInAt ?? ''),
      csvText(handIn ? (handIn.late ? 'yes' : 'no') : ''),
      csvText(handIn?.code ?? ''),
      ...wanted.flatMap(({ id }) => {
        const cell = cells[id];
        const value = cell?.value ?? null;
        return [
          value === null ? csvText(cell?.text ?? '') : csvNumber(value),
          csvText(cell?.proposal.judgement ?? ''),
          csvText(cell?.judgement ?? ''),
        ];
      }),
    ].join(','),
  );
  return csvLines([head.map(csvText).join(','), ...lines]);
}
