import { MoreHorizontal } from 'lucide-react';
import { useEffect, useState, type KeyboardEvent } from 'react';

import { COMPACT_INPUT } from '@/components/fields/field-styles';
import { useNumberText } from '@/components/fields/use-number-text';
import { Popover } from '@/components/ui/popover';
import { joinClasses } from '@/lib/join-classes';

import { useWorkbench } from '../../state/store';
import { useDiagnostics } from '../use-diagnostics';
import { CellDetails } from './cell-details';
import { moveByKey, moveDown } from './move-in-table';
import { changeEntry, findEntry, refuseValue, removeEntry } from './trait-edits';

interface TraitCellProps {
  readonly traitIndex: number;
  readonly of: readonly string[];
  /** "Mortality of male spiders". */
  readonly label: string;
  readonly row: number;
  readonly column: number;
  /** A wrong sum marks the cell without a message of its own. */
  readonly marked: boolean;
  readonly messageId: string;
  readonly onProblem: (problem: string | null) => void;
}

/** One number of the trait table: typed in place, with its details (survival, error, source) behind a button. */
export function TraitCell(props: TraitCellProps) {
  const { traitIndex, of, label, row, column, marked, messageId, onProblem } = props;
  const trait = useWorkbench((state) => state.document.traits[traitIndex]);
  const edit = useWorkbench((state) => state.edit);
  const [open, setOpen] = useState(false);
  const entryIndex = trait?.entries.findIndex((one) => one.of.join() === of.join()) ?? -1;
  const path = ['traits', traitIndex, 'entries', entryIndex];
  const diagnostics = useDiagnostics(path, true);
  const entry = trait ? findEntry(trait, of) : undefined;
  const text = useNumberText({
    value: entry?.value ?? null,
    onCommit: (value) =>
      edit(`Change ${label}`, (d) => changeEntry(d, traitIndex, of, { value, survival: null })),
    onClear: () => edit(`Clear ${label}`, (d) => removeEntry(d, traitIndex, of)),
    check: (value) => (trait ? refuseValue(trait, value) : null),
  });
  useEffect(() => onProblem(text.problem), [text.problem, onProblem]);

  const handleKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    if (event.altKey && (event.key === 'Enter' || event.key === 'ArrowDown')) {
      event.preventDefault();
      if (text.commit(event.currentTarget.value) && entry) setOpen(true);
      return;
    }
    if (event.key === 'Enter') {
      if (text.commit(event.currentTarget.value)) moveDown(event.currentTarget);
      return;
    }
    text.inputProps.onKeyDown(event);
    moveByKey(event);
  };
  const invalid = text.problem !== null || marked || diagnostics.some((one) => one.severity === 'error');
  return (
    <div className="group relative">
      <input
        {...text.inputProps}
        aria-label={label}
        aria-invalid={invalid ? true : undefined}
        aria-describedby={text.problem !== null || invalid ? messageId : undefined}
        aria-keyshortcuts="Alt+Enter"
        placeholder="·"
        data-row={row}
        data-column={column}
        {...(entryIndex >= 0 ? { 'data-path': path.join('.') } : {})}
        className={joinClasses(
          'figures h-7 w-full min-w-14 px-1.5 text-right text-sm',
          COMPACT_INPUT,
          !entry && 'bg-transparent',
        )}
        onKeyDown={handleKeyDown}
      />
      {entry ? (
        <Popover
          open={open}
          onOpenChange={setOpen}
          label={`Details of ${label}`}
          align="end"
          trigger={
            <button
              type="button"
              tabIndex={-1}
              aria-label={`Details of ${label}`}
              className="absolute top-0 left-0 grid h-7 w-4 place-items-center rounded text-muted opacity-0 group-focus-within:opacity-100 group-hover:opacity-100 hover:text-ink focus-visible:opacity-100"
            >
              <MoreHorizontal size={12} aria-hidden />
            </button>
          }
        >
          <CellDetails traitIndex={traitIndex} of={of} label={label} />
        </Popover>
      ) : null}
      {entry && (entry.survival || entry.source || entry.standardError !== null) ? (
        <span
          aria-hidden
          className="pointer-events-none absolute top-0.5 right-0.5 size-1 rounded-full bg-accent"
        />
      ) : null}
    </div>
  );
}
