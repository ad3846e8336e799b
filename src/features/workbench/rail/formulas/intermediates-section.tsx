import { Plus, Trash2 } from 'lucide-react';

import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import { freeSymbol } from '@/engine/schema/document-symbols';
import { LIMITS } from '@/engine/schema/limits';
import type { Intermediate, PresetDocument } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { DiagnosticLines } from '../diagnostic-lines';
import { RailSection } from '../rail-section';
import { removeAt, replaceAt } from '../replace-at';
import { useDiagnostics } from '../use-diagnostics';
import { useRename } from '../use-rename';
import { FormulaField } from './formula-field';

function addIntermediate(document: PresetDocument): PresetDocument {
  const one: Intermediate = { symbol: freeSymbol(document, 'F'), formula: '0', unit: '', meaning: '' };
  return { ...document, intermediates: [...document.intermediates, one] };
}

function IntermediateRow({ index }: { readonly index: number }) {
  const one = useWorkbench((state) => state.document.intermediates[index]);
  const edit = useWorkbench((state) => state.edit);
  const rename = useRename();
  const diagnostics = useDiagnostics(['intermediates', index, 'symbol']);
  if (!one) return null;
  const change = (what: string, patch: Partial<Intermediate>) =>
    edit(
      `${what} of ${one.symbol}`,
      (document) => ({
        ...document,
        intermediates: replaceAt(document.intermediates, index, (before) => ({ ...before, ...patch })),
      }),
      `intermediate:${index}:${what}`,
    );
  return (
    <li className="grid gap-1.5 rounded-md border border-hairline bg-raised/40 p-2">
      <div className="grid grid-cols-[5rem_1fr_4.5rem_1.75rem] items-start gap-1.5">
        <TextField
          label="Symbol of the intermediate formula"
          inputClassName="figures"
          value={one.symbol}
          data-path={`intermediates.${index}.symbol`}
          onCommit={(to) => rename(one.symbol, to)}
        />
        <TextField
          live
          label={`Meaning of ${one.symbol}`}
          placeholder="meaning"
          value={one.meaning}
          maxLength={500}
          onCommit={(meaning) => change('Meaning', { meaning })}
        />
        <TextField
          live
          label={`Unit of ${one.symbol}`}
          placeholder="unit"
          value={one.unit}
          maxLength={60}
          onCommit={(unit) => change('Unit', { unit })}
        />
        <button
          type="button"
          aria-label={`Delete ${one.symbol}`}
          className="grid size-8 place-items-center rounded text-muted hover:text-caution"
          onClick={() =>
            edit(`Delete ${one.symbol}`, (document) => ({
              ...document,
              intermediates: removeAt(document.intermediates, index),
            }))
          }
        >
          <Trash2 size={14} aria-hidden />
        </button>
      </div>
      <FormulaField
        label={`Formula of ${one.symbol}`}
        path={['intermediates', index, 'formula']}
        before={<span className="figures">{one.symbol} =</span>}
        value={one.formula}
        onChange={(formula) => change('Formula', { formula })}
      />
      <DiagnosticLines diagnostics={diagnostics} />
    </li>
  );
}

export function IntermediatesSection() {
  const count = useWorkbench((state) => state.document.intermediates.length);
  const edit = useWorkbench((state) => state.edit);
  return (
    <RailSection
      name="intermediates"
      title="Intermediate formulas"
      actions={
        <Button
          look="quiet"
          size="small"
          disabled={count >= LIMITS.intermediates}
          onClick={() => edit('Add intermediate formula', addIntermediate)}
        >
          <Plus size={14} aria-hidden /> Formula
        </Button>
      }
    >
      {count === 0 ? (
        <p className="text-sm text-muted">
          A formula named once and read by others, such as an encounter rate or a season.
        </p>
      ) : (
        <ul className="grid gap-2">
          {Array.from({ length: count }, (_, index) => (
            <IntermediateRow key={index} index={index} />
          ))}
        </ul>
      )}
    </RailSection>
  );
}
