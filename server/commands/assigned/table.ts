import { proposeJudgement } from '@/contract/agreement';
import type { PeopleTable } from '@/contract/assigned-sweeps';

import type { Dependencies } from '../../dependencies';
import type { Person } from '../../middleware/current-user';
import type { AssignedSweep } from '../../models/assigned-sweep';
import type { HandIn } from '../../models/hand-in';
import { csvLines, csvNumber, csvText } from '../../presenters/csv';
import { presentReceipt } from '../../presenters/present-assigned';
import { findForLab } from './find';
import { readPeople } from './read';

type Row = PeopleTable['rows'][number];

function cellsOf({ wanted, reference }: AssignedSweep, handIn: HandIn | undefined): Row['cells'] {
  return Object.fromEntries(
    wanted.map((one) => {
      const given = handIn?.findings.find(({ id }) => id === one.id);
      const expected = reference.findings.find(({ id }) => id === one.id);
      return [
        one.id,
        {
          value: given?.value ?? null,
          text: given?.text ?? '',
          proposal: proposeJudgement(one, expected, given),
          judgement: handIn?.review?.judgements[one.id] ?? null,
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
  const { AssignedWork, HandIn } = dependencies.database.models;
  const people = await readPeople(dependencies, assigned);
  const works = await AssignedWork.findAll({
    where: { assignedId: id },
    attributes: ['userId', 'runs', 'savedAt'],
  });
  const handIns = await HandIn.findAll({
    where: { assignedId: id },
    attributes: { exclude: ['frozen'] },
    include: [{ association: 'review' }],
    order: [['number', 'ASC']],
  });
  const workOf = new Map(works.map((one) => [one.userId, one]));
  // In the order of their numbers, so that the newest of each person is what stays.
  const newestOf = new Map(handIns.map((one) => [one.userId, one]));
  const rows = people.map(({ id: userId, name, state, member }): Row => {
    const work = workOf.get(userId);
    const newest = newestOf.get(userId);
    const seen = Math.max(work?.savedAt.getTime() ?? 0, newest?.handedInAt.getTime() ?? 0);
    return {
      person: { id: userId, name },
      member,
      state,
      handIn: newest ? presentReceipt(newest) : null,
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
