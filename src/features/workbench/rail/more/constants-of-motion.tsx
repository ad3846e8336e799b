import { Plus, Trash2 } from 'lucide-react';

import { Button } from '@/components/ui/button';

import { useWorkbench } from '../../state/store';
import { FormulaField } from '../formulas/formula-field';
import { removeAt, replaceAt } from '../replace-at';

/** Formulas that never change along a trajectory; an equilibrium is called neutral only with a proven one. */
export function ConstantsOfMotion() {
  const formulas = useWorkbench((state) => state.document.constantsOfMotion);
  const edit = useWorkbench((state) => state.edit);
  return (
    <fieldset className="grid gap-2">
      <legend className="text-sm font-medium">Constants of motion</legend>
      <p className="text-sm text-muted">
        Each is checked. With a proven one an equilibrium may be called neutral.
      </p>
      {formulas.map((formula, index) => (
        <div key={index} className="flex items-start gap-1.5">
          <div className="min-w-0 flex-1">
            <FormulaField
              label={`Constant of motion ${index + 1}`}
              path={['constantsOfMotion', index]}
              value={formula}
              onChange={(next) =>
                edit(
                  'Change constant of motion',
                  (document) => ({
                    ...document,
                    constantsOfMotion: replaceAt(document.constantsOfMotion, index, () => next),
                  }),
                  `constant:${index}`,
                )
              }
            />
          </div>
          <button
            type="button"
            aria-label={`Delete constant of motion ${index + 1}`}
            className="grid size-8 place-items-center rounded text-muted hover:text-caution"
            onClick={() =>
              edit('Delete constant of motion', (document) => ({
                ...document,
                constantsOfMotion: removeAt(document.constantsOfMotion, index),
              }))
            }
          >
            <Trash2 size={14} aria-hidden />
          </button>
        </div>
      ))}
      <Button
        look="quiet"
        size="small"
        className="justify-self-start"
        disabled={formulas.length >= 6}
        onClick={() =>
          edit('Add constant of motion', (document) => ({
            ...document,
            constantsOfMotion: [...document.constantsOfMotion, '0'],
          }))
        }
      >
        <Plus size={14} aria-hidden /> Constant of motion
      </Button>
    </fieldset>
  );
}
