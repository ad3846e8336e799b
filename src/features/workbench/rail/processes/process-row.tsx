import { ArrowDown, ArrowUp, ChevronRight, Copy, Trash2 } from 'lucide-react';
import { useState } from 'react';

import { TextField } from '@/components/fields/text-field';
import { joinClasses } from '@/lib/join-classes';

import { useWorkbench } from '../../state/store';
import { DiagnosticLines } from '../diagnostic-lines';
import { FormulaField } from '../formulas/formula-field';
import { useDiagnostics } from '../use-diagnostics';
import { ProcessEffects } from './process-effects';
import { changeProcess, duplicateProcess, moveProcess, removeProcess } from './process-edits';

const TOOL =
  'grid size-7 place-items-center rounded text-muted hover:bg-raised hover:text-ink disabled:opacity-40';

/** One process: its name, its rate edited in place, and what one event does to each class behind a fold. */
export function ProcessRow({ index }: { readonly index: number }) {
  const process = useWorkbench((state) => state.document.processes[index]);
  const count = useWorkbench((state) => state.document.processes.length);
  const edit = useWorkbench((state) => state.edit);
  const [open, setOpen] = useState(false);
  const all = useDiagnostics(['processes', index], true);
  if (!process) return null;
  const name = process.name || process.id;
  const [only] = process.effects;
  const isEquation = process.kind === 'equation' && process.effects.length === 1 && only?.amount === '1';
  const own = all.filter((one) => one.path.length < 3 || one.path[2] === 'name' || one.path[2] === 'signed');
  const inEffects = all.some((one) => one.path[2] === 'effects');
  return (
    <li className="grid gap-1">
      <div className="flex items-center gap-0.5">
        <button
          type="button"
          aria-expanded={open || inEffects}
          aria-label={`Effects of ${name}`}
          className={TOOL}
          onClick={() => setOpen(!open)}
        >
          <ChevronRight size={14} aria-hidden className={joinClasses((open || inEffects) && 'rotate-90')} />
        </button>
        <TextField
          live
          className="flex-1"
          inputClassName="!h-7 !border-transparent !bg-transparent !px-1 text-sm font-medium hover:!border-hairline focus:!bg-raised"
          label={`Name of process ${index + 1}`}
          value={process.name}
          placeholder={process.id}
          maxLength={120}
          onCommit={(value) =>
            edit('Rename process', (d) => changeProcess(d, index, { name: value }), `process-name:${index}`)
          }
        />
        {process.signed && !isEquation ? <span className="text-xs text-muted">signed</span> : null}
        {open ? (
          <>
            <button
              type="button"
              aria-label={`Move ${name} up`}
              disabled={index === 0}
              className={TOOL}
              onClick={() => edit(`Move ${name}`, (d) => moveProcess(d, index, -1))}
            >
              <ArrowUp size={14} aria-hidden />
            </button>
            <button
              type="button"
              aria-label={`Move ${name} down`}
              disabled={index === count - 1}
              className={TOOL}
              onClick={() => edit(`Move ${name}`, (d) => moveProcess(d, index, 1))}
            >
              <ArrowDown size={14} aria-hidden />
            </button>
            <button
              type="button"
              aria-label={`Duplicate ${name}`}
              className={TOOL}
              onClick={() => edit(`Duplicate ${name}`, (d) => duplicateProcess(d, index))}
            >
              <Copy size={14} aria-hidden />
            </button>
          </>
        ) : null}
        <button
          type="button"
          aria-label={`Delete ${name}`}
          className={joinClasses(TOOL, 'hover:!text-caution')}
          onClick={() => edit(`Delete ${name}`, (d) => removeProcess(d, index))}
        >
          <Trash2 size={14} aria-hidden />
        </button>
      </div>
      <div className="pl-7">
        <FormulaField
          label={isEquation ? `Right-hand side of ${only.class}` : `Rate of ${name}`}
          path={['processes', index, 'rate']}
          before={isEquation ? <span className="figures">d{only.class}/dt =</span> : 'rate'}
          value={process.rate}
          onChange={(rate) =>
            edit(`Change rate of ${name}`, (d) => changeProcess(d, index, { rate }), `process-rate:${index}`)
          }
        />
        <DiagnosticLines diagnostics={own} />
        {open || inEffects ? <ProcessEffects index={index} /> : null}
      </div>
    </li>
  );
}
