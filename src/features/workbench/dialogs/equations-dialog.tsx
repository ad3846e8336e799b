import { useState } from 'react';

import { Button } from '@/components/ui/button';
import { Dialog } from '@/components/ui/dialog';
import { documentFromEquations, parameterNamesIn } from '@/engine/schema/equations';
import { parseNumber } from '@/lib/parse-number';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';

const EXAMPLE = "x' = r*x*(1 - x/K) - a*x*y\ny' = e*a*x*y - m*y";
const FIELD = 'rounded-md border border-hairline bg-raised px-2.5 py-1.5 aria-invalid:border-caution';

/** Equations typed as in a textbook become a model of free equations; undo brings back what was there. */
export function EquationsDialog() {
  const set = useBenchUi((state) => state.set);
  const edit = useWorkbench((state) => state.edit);
  const title = useWorkbench((state) => state.document.title);
  const [text, setText] = useState('');
  const [values, setValues] = useState<Readonly<Record<string, string>>>({});
  const [sign, setSign] = useState<'nonnegative' | 'any'>('nonnegative');
  const [problem, setProblem] = useState('');
  const lines = text.split('\n').filter((line) => line.trim() !== '');
  const names = parameterNamesIn(lines);
  const close = () => set({ dialog: null });

  const handleApply = () => {
    const parameters: Record<string, number> = {};
    for (const name of names) {
      const read = parseNumber(values[name] ?? '1');
      if ('problem' in read) return setProblem(`${name}: ${read.problem}`);
      parameters[name] = read.value;
    }
    const made = documentFromEquations({ equations: lines, parameters, sign, title });
    if (!made.ok) return setProblem(`Line ${made.line + 1}: ${made.message}`);
    edit('Type equations', () => made.document);
    set({ dialog: null, notice: 'The equations are on the bench. Undo brings back the model before.' });
  };

  return (
    <Dialog
      open
      onOpenChange={close}
      title="Type equations"
      description="One line a state. They take the place of the model on the bench; undo brings the present one back."
    >
      <div className="grid gap-4">
        <label className="grid gap-1">
          <span className="font-medium">Equations</span>
          <textarea
            rows={5}
            spellCheck={false}
            className={`figures ${FIELD}`}
            placeholder={EXAMPLE}
            value={text}
            aria-invalid={problem ? true : undefined}
            aria-describedby={problem ? 'equations-problem' : undefined}
            onChange={(event) => {
              setText(event.target.value);
              setProblem('');
            }}
          />
        </label>
        {names.length > 0 ? (
          <fieldset>
            <legend className="mb-1 font-medium">Parameters</legend>
            <div className="grid grid-cols-2 gap-2 sm:grid-cols-4">
              {names.map((name) => (
                <label key={name} className="flex items-center gap-2">
                  <span className="figures">{name}</span>
                  <input
                    inputMode="decimal"
                    className={`figures w-full min-w-0 ${FIELD}`}
                    value={values[name] ?? '1'}
                    onChange={(event) => setValues({ ...values, [name]: event.target.value })}
                  />
                </label>
              ))}
            </div>
          </fieldset>
        ) : null}
        <label className="flex items-center gap-2">
          <input
            type="checkbox"
            checked={sign === 'nonnegative'}
            onChange={(event) => setSign(event.target.checked ? 'nonnegative' : 'any')}
          />
          States are densities and never negative
        </label>
        {problem ? (
          <p id="equations-problem" role="alert" className="text-caution">
            {problem}
          </p>
        ) : null}
        <div className="flex justify-end gap-2">
          <Button onClick={close}>Cancel</Button>
          <Button look="primary" disabled={lines.length === 0} onClick={handleApply}>
            Put on the bench
          </Button>
        </div>
      </div>
    </Dialog>
  );
}
