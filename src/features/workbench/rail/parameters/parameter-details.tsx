import { Trash2 } from 'lucide-react';

import { NumberField } from '@/components/fields/number-field';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import type { Parameter } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { useRename } from '../use-rename';
import { changeParameter, removeParameter } from './parameter-edits';

export function ParameterDetails({
  index,
  onClose,
}: {
  readonly index: number;
  readonly onClose: () => void;
}) {
  const parameter = useWorkbench((state) => state.document.parameters[index]);
  const edit = useWorkbench((state) => state.edit);
  const rename = useRename();
  if (!parameter) return null;
  const name = parameter.name || parameter.symbol;
  const change = (what: string, patch: Partial<Omit<Parameter, 'symbol'>>, merge?: string) =>
    edit(`${what} of ${name}`, (document) => changeParameter(document, index, patch), merge);
  return (
    <div className="grid grid-cols-2 gap-3">
      <TextField
        visibleLabel
        live
        label="Name"
        value={parameter.name}
        maxLength={120}
        onCommit={(value) => change('Name', { name: value }, `parameter-name:${index}`)}
      />
      <TextField
        visibleLabel
        label="Symbol"
        inputClassName="figures"
        value={parameter.symbol}
        onCommit={(value) => rename(parameter.symbol, value)}
      />
      <NumberField
        visibleLabel
        label="Range from"
        value={parameter.min}
        check={(value) => (value < parameter.max ? null : 'The range must begin below its end.')}
        onCommit={(min) => change('Range', { min })}
      />
      <NumberField
        visibleLabel
        label="to"
        value={parameter.max}
        check={(value) => (value > parameter.min ? null : 'The range must end above its beginning.')}
        onCommit={(max) => change('Range', { max })}
      />
      <TextField
        visibleLabel
        live
        label="Unit"
        value={parameter.unit}
        maxLength={60}
        onCommit={(unit) => change('Unit', { unit }, `parameter-unit:${index}`)}
      />
      <NumberField
        visibleLabel
        label="Standard error"
        placeholder="none"
        value={parameter.standardError}
        check={(value) => (value >= 0 ? null : 'A standard error is 0 or more.')}
        onCommit={(standardError) => change('Standard error', { standardError })}
        onClear={() => change('Standard error', { standardError: null })}
      />
      <TextField
        visibleLabel
        live
        className="col-span-2"
        label="Meaning"
        value={parameter.meaning}
        maxLength={500}
        onCommit={(meaning) => change('Meaning', { meaning }, `parameter-meaning:${index}`)}
      />
      <TextField
        visibleLabel
        live
        className="col-span-2"
        label="Source"
        value={parameter.source}
        maxLength={500}
        onCommit={(source) => change('Source', { source }, `parameter-source:${index}`)}
      />
      <div className="col-span-2 flex justify-between">
        <Button
          look="caution"
          size="small"
          onClick={() => {
            edit(`Delete parameter ${name}`, (document) => removeParameter(document, index));
            onClose();
          }}
        >
          <Trash2 size={14} aria-hidden /> Delete parameter
        </Button>
        <Button size="small" onClick={onClose}>
          Done
        </Button>
      </div>
    </div>
  );
}
