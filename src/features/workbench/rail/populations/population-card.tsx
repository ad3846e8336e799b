import { Plus, Settings2 } from 'lucide-react';
import { useState } from 'react';

import { CheckField } from '@/components/fields/check-field';
import { TextField } from '@/components/fields/text-field';
import { Button } from '@/components/ui/button';
import { Popover } from '@/components/ui/popover';
import { addClass, removePopulation } from '@/engine/schema/edit';
import { LIMITS } from '@/engine/schema/limits';

import { useWorkbench } from '../../state/store';
import { DiagnosticLines } from '../diagnostic-lines';
import { useDiagnostics } from '../use-diagnostics';
import { useRename } from '../use-rename';
import { ClassRow } from './class-row';
import { HueChoice } from './hue-choice';
import { changePopulation } from './population-edits';

function PopulationSettings({ index, onClose }: { readonly index: number; readonly onClose: () => void }) {
  const population = useWorkbench((state) => state.document.populations[index]);
  const edit = useWorkbench((state) => state.edit);
  const rename = useRename();
  if (!population) return null;
  const name = population.name || population.symbol;
  return (
    <div className="grid gap-3">
      <TextField
        visibleLabel
        label="Symbol of the total"
        inputClassName="figures"
        value={population.symbol}
        help="In formulas the sum of its classes."
        onCommit={(to) => rename(population.symbol, to)}
      />
      <HueChoice
        name={name}
        value={population.hue}
        onChange={(hue) => edit(`Hue of ${name}`, (document) => changePopulation(document, index, { hue }))}
      />
      <CheckField
        label="May be negative"
        help="For a state of a textbook system that takes either sign. A density may not."
        checked={population.sign === 'any'}
        onChange={(any) =>
          edit(`Sign of ${name}`, (document) =>
            changePopulation(document, index, { sign: any ? 'any' : 'nonnegative' }),
          )
        }
      />
      <div className="flex justify-between">
        <Button
          look="caution"
          size="small"
          onClick={() => {
            edit(`Delete population ${name}`, (document) => removePopulation(document, population.symbol));
            onClose();
          }}
        >
          Delete population
        </Button>
        <Button size="small" onClick={onClose}>
          Done
        </Button>
      </div>
    </div>
  );
}

/** A population with its classes, their symbols and start values. */
export function PopulationCard({ index }: { readonly index: number }) {
  const population = useWorkbench((state) => state.document.populations[index]);
  const classes = useWorkbench((state) =>
    state.document.populations.reduce((count, one) => count + one.classes.length, 0),
  );
  const edit = useWorkbench((state) => state.edit);
  const [open, setOpen] = useState(false);
  const diagnostics = useDiagnostics(['populations', index]);
  if (!population) return null;
  const name = population.name || population.symbol;
  const full = population.classes.length >= LIMITS.classesPerPopulation || classes >= LIMITS.classes;
  return (
    <li className="grid gap-1.5 border-t border-hairline pt-2 first:border-t-0 first:pt-0">
      <div className="flex items-center gap-1">
        <TextField
          live
          className="flex-1"
          inputClassName="!border-transparent !bg-transparent -ml-2 font-semibold hover:!border-hairline focus:!bg-raised"
          label={`Name of population ${population.symbol}`}
          value={population.name}
          placeholder={population.symbol}
          maxLength={120}
          data-path={`populations.${index}`}
          onCommit={(value) =>
            edit(
              `Rename population ${population.symbol}`,
              (document) => changePopulation(document, index, { name: value }),
              `population-name:${index}`,
            )
          }
        />
        <Button
          look="quiet"
          size="small"
          disabled={full}
          aria-label={`Add class to ${name}`}
          onClick={() =>
            edit(`Add class to ${name}`, (document) =>
              addClass(document, population.symbol, `class ${population.classes.length + 1}`),
            )
          }
        >
          <Plus size={14} aria-hidden /> Class
        </Button>
        <Popover
          open={open}
          onOpenChange={setOpen}
          label={`Settings of ${name}`}
          align="end"
          trigger={
            <button
              type="button"
              aria-label={`Settings of ${name}`}
              className="grid size-7 place-items-center rounded text-muted hover:bg-raised hover:text-ink"
            >
              <Settings2 size={14} aria-hidden />
            </button>
          }
        >
          <PopulationSettings index={index} onClose={() => setOpen(false)} />
        </Popover>
      </div>
      <ul className="grid gap-1">
        {Array.from({ length: population.classes.length }, (_, k) => (
          <ClassRow key={k} population={index} index={k} />
        ))}
      </ul>
      <DiagnosticLines diagnostics={diagnostics} />
    </li>
  );
}
