import { Lock, SlidersHorizontal } from 'lucide-react';
import { useState } from 'react';

import { NumberField } from '@/components/fields/number-field';
import { Slider } from '@/components/fields/slider';
import { Popover } from '@/components/ui/popover';
import { showNumber } from '@/lib/parse-number';

import { isLocked } from '../../state/assigned';
import { useWorkbench } from '../../state/store';
import { DiagnosticLines } from '../diagnostic-lines';
import { useDiagnostics } from '../use-diagnostics';
import { setParameterValue } from './parameter-edits';
import { ParameterDetails } from './parameter-details';

interface ParameterRowProps {
  readonly index: number;
  /** Where given, moves of the slider go through it. */
  readonly onSlide?: (value: number) => void;
}

/** Name and symbol, slider, typed value, and the rest behind a button. */
export function ParameterRow({ index, onSlide }: ParameterRowProps) {
  const parameter = useWorkbench((state) => state.document.parameters[index]);
  const edit = useWorkbench((state) => state.edit);
  const diagnostics = useDiagnostics(['parameters', index], true);
  const locked = useWorkbench(
    (state) => parameter !== undefined && isLocked(state.assigned, parameter.symbol),
  );
  const [open, setOpen] = useState(false);
  if (!parameter) return null;
  const name = parameter.name || parameter.symbol;
  const set = (value: number, merge?: string) =>
    edit(`Change ${parameter.symbol}`, (document) => setParameterValue(document, index, value), merge);
  return (
    <div className="py-0.5 font-text text-[15px]">
      <div className="grid grid-cols-[minmax(0,1fr)_minmax(4rem,5.5rem)_4.75rem_1.5rem] items-center gap-x-2">
        <span
          className="flex min-w-0 gap-1 text-sm"
          title={parameter.meaning || `${name}, ${parameter.symbol}`}
        >
          {name === parameter.symbol ? null : <span className="truncate">{name}</span>}
          <span className="figures shrink-0 text-muted italic">{parameter.symbol}</span>
          {locked ? <Lock size={12} aria-label="locked" className="shrink-0 self-center text-muted" /> : null}
        </span>
        <Slider
          label={`${name}, slider`}
          value={parameter.value}
          min={parameter.min}
          max={parameter.max}
          disabled={locked}
          valueText={`${showNumber(parameter.value, 5)} ${parameter.unit}`}
          onChange={(value) => (onSlide ? onSlide(value) : set(value, `slide:${parameter.symbol}`))}
        />
        <NumberField
          label={`${name}, value`}
          value={parameter.value}
          disabled={locked}
          onCommit={(value) => set(value)}
          data-path={`parameters.${index}`}
        />
        <Popover
          open={open}
          onOpenChange={setOpen}
          label={`Details of ${name}`}
          width="wide"
          align="end"
          trigger={
            <button
              type="button"
              aria-label={`Details of ${name}`}
              className="grid size-6 place-items-center rounded text-muted hover:bg-raised hover:text-ink"
            >
              <SlidersHorizontal size={14} aria-hidden />
            </button>
          }
        >
          <ParameterDetails index={index} onClose={() => setOpen(false)} />
        </Popover>
      </div>
      <DiagnosticLines diagnostics={diagnostics} />
    </div>
  );
}
