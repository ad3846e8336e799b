import { Plus, X } from 'lucide-react';

import { CheckField } from '@/components/fields/check-field';
import { SelectField } from '@/components/fields/select-field';
import { Button } from '@/components/ui/button';
import { listClasses } from '@/engine/schema/document-symbols';
import type { Process } from '@/engine/schema/preset';

import { useWorkbench } from '../../state/store';
import { FormulaField } from '../formulas/formula-field';
import { removeAt, replaceAt } from '../replace-at';
import { classInWords } from '../traits/common-traits';
import { changeProcess } from './process-edits';

/** What one event adds to (or takes from) each class, and whether the rate may be negative. */
export function ProcessEffects({ index }: { readonly index: number }) {
  const document = useWorkbench((state) => state.document);
  const edit = useWorkbench((state) => state.edit);
  const process = document.processes[index];
  if (!process) return null;
  const name = process.name || process.id;
  const setEffects = (label: string, effects: Process['effects'], merge?: string) =>
    edit(`${label} of ${name}`, (before) => changeProcess(before, index, { effects }), merge);
  const all = listClasses(document).map((one) => one.class.symbol);
  const unused = all.filter((symbol) => !process.effects.some((effect) => effect.class === symbol));
  return (
    <div className="grid gap-1.5 py-1.5">
      <p className="text-sm text-muted">One event changes</p>
      {process.effects.map((effect, k) => (
        <div key={k} className="grid grid-cols-[minmax(5rem,8rem)_minmax(0,1fr)_1.5rem] items-start gap-1.5">
          <SelectField
            label={`Class of effect ${k + 1}`}
            visibleLabel={false}
            value={effect.class}
            data-path={`processes.${index}.effects.${k}.class`}
            choices={[effect.class, ...unused].map((symbol) => ({
              value: symbol,
              label: classInWords(document, symbol),
            }))}
            onChange={(symbol) =>
              setEffects(
                'Effects',
                replaceAt(process.effects, k, (one) => ({ ...one, class: symbol })),
              )
            }
          />
          <FormulaField
            label={`Change of ${classInWords(document, effect.class)}`}
            path={['processes', index, 'effects', k, 'amount']}
            before="by"
            value={effect.amount}
            onChange={(amount) =>
              setEffects(
                'Effects',
                replaceAt(process.effects, k, (one) => ({ ...one, amount })),
                `effect:${index}:${k}`,
              )
            }
          />
          <button
            type="button"
            aria-label={`Remove effect on ${classInWords(document, effect.class)}`}
            className="grid size-6 place-items-center self-center rounded text-muted hover:text-caution"
            onClick={() => setEffects('Effects', removeAt(process.effects, k))}
          >
            <X size={14} aria-hidden />
          </button>
        </div>
      ))}
      <Button
        look="quiet"
        size="small"
        className="justify-self-start"
        disabled={unused.length === 0}
        onClick={() => setEffects('Effects', [...process.effects, { class: unused[0] ?? '', amount: '1' }])}
      >
        <Plus size={14} aria-hidden /> Effect
      </Button>
      <CheckField
        label="The rate may be negative"
        help="The model is then deterministic only."
        checked={process.signed}
        onChange={(signed) => edit(`Sign of ${name}`, (before) => changeProcess(before, index, { signed }))}
      />
    </div>
  );
}
