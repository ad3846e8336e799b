import { Pin } from 'lucide-react';
import { useMemo, useState } from 'react';

import { specialPointGlyph } from '@/graphics/glyphs';
import { formatNumber } from '@/graphics/numbers';
import { parameterName } from '@/graphics/quantities';
import { joinClasses } from '@/lib/join-classes';

import { findingFor, pinFinding, type Candidate } from '../assigned/pin-finding';
import { CommentOnPoint } from '../comments/comment-on-point';
import { moveToPoint } from '../panes/move-to-point';
import { GlyphSign } from '../panes/plot/plot-legend';
import { useShownModel } from '../panes/use-shown-model';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { Card } from './card';
import { SpecialPointDetails } from './special-point-details';
import {
  sortRows,
  specialPointRows,
  type SortKey,
  type SortOrder,
  type SpecialPointRow,
} from './special-point-rows';

const COLUMNS: readonly { readonly key: SortKey; readonly label: string }[] = [
  { key: 'kind', label: 'point' },
  { key: 'split', label: 'split' },
  { key: 'twin', label: 'pooled' },
  { key: 'shift', label: 'shift' },
];

function HeaderCell({
  column,
  order,
  onSort,
}: {
  readonly column: (typeof COLUMNS)[number];
  readonly order: SortOrder;
  readonly onSort: (order: SortOrder) => void;
}) {
  const active = order.key === column.key;
  return (
    <th
      scope="col"
      aria-sort={active ? (order.descending ? 'descending' : 'ascending') : 'none'}
      className={column.key === 'kind' ? 'text-left' : 'text-right'}
    >
      <button
        type="button"
        className="rounded font-medium whitespace-nowrap text-muted hover:text-ink"
        onClick={() => onSort({ key: column.key, descending: active && !order.descending })}
      >
        {column.label}
        {active ? <span aria-hidden>{order.descending ? '↓' : '↑'}</span> : null}
      </button>
    </th>
  );
}

function Row({
  row,
  withTwin,
  range,
  parameter,
  selected,
  pinTo,
  onPin,
  onChoose,
}: {
  readonly row: SpecialPointRow;
  readonly withTwin: boolean;
  readonly range: number;
  /** Key of what is swept. */
  readonly parameter: string;
  readonly selected: boolean;
  /** Label of the wanted finding that this point can be given for; null where none asks for it. */
  readonly pinTo: string | null;
  readonly onPin: () => void;
  readonly onChoose: () => void;
}) {
  const value = (point: SpecialPointRow['split']) => (point ? formatNumber(point.parameter, 4) : 'none');
  const point = row.split ?? row.twin;
  return (
    <>
      <tr className={joinClasses('border-t', selected && 'bg-panel')}>
        <th scope="row" className="py-1 text-left font-normal">
          <button
            type="button"
            className="flex items-center gap-1 rounded text-left hover:underline disabled:no-underline"
            disabled={!row.split}
            aria-pressed={selected}
            onClick={onChoose}
          >
            <GlyphSign
              glyph={specialPointGlyph(row.kind)}
              colour={row.split ? 'var(--ink)' : 'var(--twin)'}
            />
            <span>
              {row.kind}
              {point?.feasible ? null : <span className="text-muted">, not feasible</span>}
            </span>
          </button>
          {pinTo === null ? null : (
            <button
              type="button"
              className="flex items-center gap-1 rounded text-left text-xs text-accent hover:underline"
              onClick={onPin}
            >
              <Pin size={12} aria-hidden /> Pin as “{pinTo}”
            </button>
          )}
          {selected || !row.split ? <CommentOnPoint row={row} parameter={parameter} /> : null}
        </th>
        <td className="figures py-1 pl-1 text-right text-xs whitespace-nowrap">{value(row.split)}</td>
        {withTwin ? (
          <>
            <td className="figures py-1 pl-1 text-right text-xs whitespace-nowrap text-muted">
              {value(row.twin)}
            </td>
            <td className="figures py-1 pl-1 text-right text-xs whitespace-nowrap">
              {row.shift === null ? '' : `${row.shift > 0 ? '+' : ''}${formatNumber(row.shift, 2)}`}
            </td>
          </>
        ) : null}
      </tr>
      {selected && row.split ? (
        <tr className="bg-panel">
          <td colSpan={4} className="px-1 pb-2 text-sm text-muted">
            <SpecialPointDetails point={row.split} range={range} />
          </td>
        </tr>
      ) : null}
    </>
  );
}

/** The point of a row, as a finding takes it. */
function pointOf(row: SpecialPointRow): Candidate {
  return {
    kind: row.kind,
    of: row.split ? 'split' : 'twin',
    parameter: (row.split ?? row.twin)?.parameter ?? NaN,
  };
}

/** Special points of the sweep, split beside pooled; choosing one moves the model there. */
export function SpecialPointsCard() {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const sweep = useWorkbench((state) => state.sweep);
  const cycles = useWorkbench((state) => state.cycles);
  const outdated = useWorkbench((state) => state.sweepOutdated);
  const assigned = useWorkbench((state) => state.assigned);
  const selected = useWorkbench((state) => state.selectedPoint?.id ?? null);
  const [order, setOrder] = useState<SortOrder>({ key: 'split', descending: false });
  const rows = useMemo(
    () => (sweep ? sortRows(specialPointRows(sweep, cycles), order) : []),
    [sweep, cycles, order],
  );
  if (!sweep) return null;
  const columns = sweep.twin ? COLUMNS : COLUMNS.slice(0, 2);
  const name = parameterName(model, sweep.split.parameterKey).name;
  return (
    <Card title="Special points" aside={<span className="text-sm text-muted">along {name}</span>}>
      {outdated ? (
        <p className="mb-1 text-sm text-caution">Computed before the last edit. Run the sweep again.</p>
      ) : null}
      {rows.length === 0 ? (
        <p className="text-muted">
          {sweep.split.status === 'complete' || sweep.split.status === 'needs-period-map'
            ? 'None in this range: no branch changes its stability here.'
            : sweep.split.message}
        </p>
      ) : (
        <table className="w-full border-collapse text-[13px]">
          <thead>
            <tr>
              {columns.map((column) => (
                <HeaderCell key={column.key} column={column} order={order} onSort={setOrder} />
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <Row
                key={row.id}
                row={row}
                withTwin={sweep.twin !== null}
                range={Math.abs(sweep.split.to - sweep.split.from)}
                parameter={sweep.split.parameterKey}
                selected={row.split !== null && row.split.id === selected}
                pinTo={findingFor(assigned, pointOf(row))?.label ?? null}
                onPin={() => {
                  const wanted = findingFor(assigned, pointOf(row));
                  if (wanted) pinFinding(store, wanted.id, pointOf(row));
                }}
                onChoose={() => row.split && moveToPoint(store, row.split)}
              />
            ))}
          </tbody>
        </table>
      )}
    </Card>
  );
}
