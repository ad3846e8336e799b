import { Trash2 } from 'lucide-react';

import { NumberField } from '@/components/fields/number-field';
import { TextField } from '@/components/fields/text-field';
import { removeClass } from '@/engine/schema/edit';

import { useWorkbench } from '../../state/store';
import { DiagnosticLines } from '../diagnostic-lines';
import { HueDot } from '../hue-dot';
import { useDiagnostics } from '../use-diagnostics';
import { useRename } from '../use-rename';
import { changeClass } from './population-edits';

/** Name, symbol and start value of one class. */
export function ClassRow({ population, index }: { readonly population: number; readonly index: number }) {
  const whole = useWorkbench((state) => state.document.populations[population]);
  const densityUnit = useWorkbench((state) => state.document.densityUnit);
  const edit = useWorkbench((state) => state.edit);
  const rename = useRename();
  const path = ['populations', population, 'classes', index];
  const diagnostics = useDiagnostics(path, true);
  const entry = whole?.classes[index];
  if (!whole || !entry) return null;
  const name = entry.name || entry.symbol;
  const key = path.join('.');
  const check = (value: number) =>
    whole.sign === 'nonnegative' && value < 0 ? 'A density cannot start below 0.' : null;
  return (
    <li>
      <div className="grid grid-cols-[0.75rem_minmax(0,1fr)_4rem_4.5rem_1.5rem] items-start gap-1.5">
        <span className="grid h-8 items-center">
          <HueDot population={whole} of={entry.symbol} />
        </span>
        <TextField
          live
          label={`Name of class ${entry.symbol}`}
          value={entry.name}
          maxLength={120}
          data-path={`${key}.name`}
          onCommit={(value) =>
            edit(
              `Rename class ${entry.symbol}`,
              (document) => changeClass(document, population, index, { name: value }),
              `${key}:name`,
            )
          }
        />
        <TextField
          label={`Symbol of ${name}`}
          inputClassName="figures"
          value={entry.symbol}
          data-path={`${key}.symbol`}
          onCommit={(to) => rename(entry.symbol, to)}
        />
        <NumberField
          label={`Start value of ${name}${densityUnit ? `, ${densityUnit}` : ''}`}
          value={entry.start}
          check={check}
          data-path={`${key}.start`}
          onCommit={(start) =>
            edit(`Start value of ${name}`, (document) => changeClass(document, population, index, { start }))
          }
        />
        {whole.classes.length > 1 ? (
          <button
            type="button"
            aria-label={`Delete class ${name}`}
            className="grid h-8 w-6 place-items-center rounded text-muted hover:text-caution"
            onClick={() => edit(`Delete class ${name}`, (document) => removeClass(document, entry.symbol))}
          >
            <Trash2 size={14} aria-hidden />
          </button>
        ) : null}
      </div>
      <DiagnosticLines diagnostics={diagnostics} />
    </li>
  );
}
