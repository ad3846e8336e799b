import { Link } from 'react-router-dom';

import type { AssignedBody, PeopleTable } from '@/contract/assigned-sweeps';
import { formatDayAndTime, plural } from '@/lib/format';

import { WorkStateChip } from '../components/work-state-chip';
import { FindingCell } from './finding-cell';
import { ToleranceHead } from './tolerance-head';

type Row = PeopleTable['rows'][number];

interface PeopleRowsProps {
  readonly assigned: AssignedBody;
  readonly wanted: PeopleTable['wanted'];
  readonly rows: readonly Row[];
  readonly chosen: ReadonlySet<string>;
  readonly onChoose: (ids: readonly string[], chosen: boolean) => void;
}

function lastWords({ handIn, lastActiveAt, runs }: Row): string {
  const ran = runs > 0 ? `, ${plural(runs, 'run')}` : '';
  if (handIn) return `handed in ${formatDayAndTime(handIn.handedInAt)}${handIn.late ? ', late' : ''}${ran}`;
  return lastActiveAt ? `last active ${formatDayAndTime(lastActiveAt)}${ran}` : 'not begun';
}

/** People by findings. Those who have handed in can be chosen, to be sent back. */
export function PeopleRows({ assigned, wanted, rows, chosen, onChoose }: PeopleRowsProps) {
  const choosable = rows.filter((row) => row.handIn).map((row) => row.person.id);
  const all = choosable.length > 0 && choosable.every((id) => chosen.has(id));
  return (
    <div
      tabIndex={0}
      role="region"
      aria-label="People by findings"
      className="relative overflow-x-auto rounded-lg border bg-raised"
    >
      <table className="w-full border-collapse">
        <thead className="bg-panel text-left align-top">
          <tr>
            <th scope="col" className="w-10 px-3 py-2">
              <input
                type="checkbox"
                aria-label="Choose everyone shown who has handed in"
                className="size-4 accent-[var(--accent)]"
                disabled={choosable.length === 0}
                checked={all}
                onChange={(event) => onChoose(choosable, event.target.checked)}
              />
            </th>
            <th scope="col" className="px-3 py-2 font-medium">
              Person
            </th>
            <th scope="col" className="px-3 py-2 font-medium">
              State
            </th>
            {wanted.map((one) => (
              <th key={one.id} scope="col" className="min-w-52 px-3 py-2 font-medium">
                <span className="block pb-1">{one.label}</span>
                <ToleranceHead assigned={assigned} wanted={one} />
              </th>
            ))}
          </tr>
        </thead>
        <tbody className="divide-y">
          {rows.map((row) => (
            <tr key={row.person.id} className="align-top">
              <td className="px-3 py-2">
                <input
                  type="checkbox"
                  aria-label={`Choose ${row.person.name}`}
                  className="size-4 accent-[var(--accent)]"
                  disabled={!row.handIn}
                  checked={chosen.has(row.person.id)}
                  onChange={(event) => onChoose([row.person.id], event.target.checked)}
                />
              </td>
              <th scope="row" className="min-w-44 px-3 py-2 text-left font-normal">
                {row.handIn ? (
                  <Link
                    to={`/hand-ins/${row.handIn.id}`}
                    className="font-medium text-accent underline underline-offset-2"
                  >
                    {row.person.name}
                  </Link>
                ) : (
                  row.person.name
                )}
                {row.member ? null : <span className="text-muted"> (has left the lab)</span>}
                <span className="block text-sm text-muted">{lastWords(row)}</span>
              </th>
              <td className="px-3 py-2">
                <WorkStateChip state={row.state} />
              </td>
              {wanted.map((one) => (
                <td key={one.id} className="px-3 py-2">
                  {row.handIn ? <FindingCell wanted={one} cell={row.cells[one.id]} /> : null}
                </td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
