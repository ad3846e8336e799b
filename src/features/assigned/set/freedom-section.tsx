import { useId, useState } from 'react';

import { CheckField } from '@/components/fields/check-field';
import { TextField } from '@/components/fields/text-field';
import type { Freedom } from '@/contract/assigned-sweeps';

import { SetSection } from './set-section';
import type { SetPart } from './set-view';
import { numberKeys } from './sweepable';

type Numbers = 'none' | 'chosen' | 'all';

const CHOICES: readonly { readonly value: Numbers; readonly label: string }[] = [
  { value: 'none', label: 'No numbers but the swept one' },
  { value: 'chosen', label: 'Chosen numbers' },
  { value: 'all', label: 'Every number' },
];

/** What may be changed of what was set; the rest is locked. */
export function FreedomSection({ view, fixed, onChange }: SetPart) {
  const name = useId();
  const { freedom } = view;
  const [choosing, setChoosing] = useState(false);
  const [search, setSearch] = useState('');
  const chosen = freedom.parameters === 'all' ? [] : freedom.parameters;
  const numbers: Numbers =
    freedom.parameters === 'all' ? 'all' : chosen.length > 0 || choosing ? 'chosen' : 'none';
  const put = (patch: Partial<Freedom>) => onChange({ freedom: { ...freedom, ...patch } });
  const handleNumbers = (value: Numbers) => {
    setChoosing(value === 'chosen');
    put({ parameters: value === 'all' ? 'all' : value === 'none' ? [] : chosen });
  };
  const keys = numberKeys(view.document).filter(
    ({ key, label }) =>
      chosen.includes(key) || `${key} ${label}`.toLowerCase().includes(search.trim().toLowerCase()),
  );
  return (
    <SetSection
      title="What may be changed"
      note={
        fixed
          ? 'Fixed since the sweep was opened.'
          : 'Start values, views and the length of a trajectory are always free.'
      }
    >
      <fieldset className="grid gap-3">
        <legend className="sr-only">What may be changed</legend>
        <CheckField
          label="The swept parameter and its range"
          checked={freedom.range}
          disabled={fixed}
          onChange={(range) => put({ range })}
        />
        <CheckField
          label="Classes, processes and formulas"
          help="Then every number may be changed too."
          checked={freedom.model}
          disabled={fixed}
          onChange={(model) => put({ model })}
        />
        {freedom.model ? null : (
          <div role="radiogroup" aria-label="Numbers" className="flex flex-wrap gap-x-5 gap-y-1">
            {CHOICES.map(({ value, label }) => (
              <label key={value} className="flex items-center gap-2">
                <input
                  type="radio"
                  name={name}
                  className="size-4 accent-[var(--accent)]"
                  checked={numbers === value}
                  disabled={fixed}
                  onChange={() => handleNumbers(value)}
                />
                {label}
              </label>
            ))}
          </div>
        )}
        {!freedom.model && numbers === 'chosen' ? (
          <div className="grid gap-2 rounded-lg border bg-raised p-3">
            <TextField
              label="Search numbers"
              placeholder="Search by name or symbol"
              live
              className="max-w-xs"
              value={search}
              onCommit={setSearch}
            />
            <div
              role="group"
              aria-label="Numbers that may be changed"
              tabIndex={0}
              className="grid max-h-60 gap-1 overflow-y-auto sm:grid-cols-2"
            >
              {keys.map(({ key, label }) => (
                <CheckField
                  key={key}
                  label={label}
                  checked={chosen.includes(key)}
                  disabled={fixed}
                  onChange={(free) =>
                    put({ parameters: free ? [...chosen, key] : chosen.filter((one) => one !== key) })
                  }
                />
              ))}
              {keys.length === 0 ? <p className="text-muted">No number by that name.</p> : null}
            </div>
          </div>
        ) : null}
      </fieldset>
    </SetSection>
  );
}
