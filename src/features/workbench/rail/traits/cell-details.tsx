import { useState } from 'react';

import { NumberField } from '@/components/fields/number-field';
import { SelectField } from '@/components/fields/select-field';
import { TextAreaField } from '@/components/fields/text-area-field';
import type { TraitEntry } from '@/engine/schema/preset';
import { showNumber } from '@/lib/parse-number';

import { useWorkbench } from '../../state/store';
import { changeEntry, findEntry, rateOfSurvival, refuseValue, survivalOfRate } from './trait-edits';

interface CellDetailsProps {
  readonly traitIndex: number;
  readonly of: readonly string[];
  readonly label: string;
}

const WAYS = [
  { value: 'rate', label: 'As a rate' },
  { value: 'survival', label: 'As survival over a period' },
] as const;

function checkFraction(value: number): string | null {
  return value > 0 && value <= 1 ? null : 'Survival is a fraction above 0 and at most 1.';
}

/** How a value was come by: rate or survival (both shown), standard error, source. */
export function CellDetails({ traitIndex, of, label }: CellDetailsProps) {
  const trait = useWorkbench((state) => state.document.traits[traitIndex]);
  const timeUnit = useWorkbench((state) => state.document.timeUnit);
  const edit = useWorkbench((state) => state.edit);
  const [period, setPeriod] = useState(1);
  const entry = trait ? findEntry(trait, of) : undefined;
  if (!trait || !entry) return null;
  const change = (what: string, patch: Partial<Omit<TraitEntry, 'of'>>, merge?: string) =>
    edit(`${what} of ${label}`, (document) => changeEntry(document, traitIndex, of, patch), merge);
  const setSurvival = (fraction: number, over: number) =>
    change('Survival', { survival: { fraction, period: over }, value: rateOfSurvival(fraction, over) });
  const survival = entry.survival;
  const over = survival?.period ?? period;
  return (
    <div className="grid gap-3">
      <h3 className="text-base">{label}</h3>
      {trait.domain === 'rate' ? (
        <SelectField
          label="Entered"
          value={survival ? 'survival' : 'rate'}
          choices={WAYS}
          onChange={(way) =>
            way === 'rate'
              ? change('Way of entering', { survival: null })
              : setSurvival(Math.max(Number.MIN_VALUE, survivalOfRate(entry.value, period)), period)
          }
        />
      ) : null}
      {survival ? (
        <div className="grid grid-cols-2 gap-2">
          <NumberField
            visibleLabel
            label="Survives"
            value={survival.fraction}
            check={checkFraction}
            onCommit={(fraction) => setSurvival(fraction, survival.period)}
          />
          <NumberField
            visibleLabel
            label="Over"
            unit={timeUnit}
            value={survival.period}
            check={(value) => (value > 0 ? null : 'The period must be above 0.')}
            onCommit={(next) => setSurvival(survival.fraction, next)}
          />
        </div>
      ) : (
        <NumberField
          visibleLabel
          label="Value"
          unit={trait.unit}
          value={entry.value}
          check={(value) => refuseValue(trait, value)}
          onCommit={(value) => change('Value', { value, survival: null })}
        />
      )}
      {trait.domain === 'rate' ? (
        <p className="text-sm text-muted">
          {survival ? (
            <>
              Rate <span className="figures text-ink">{showNumber(entry.value, 5)}</span> {trait.unit}
            </>
          ) : (
            <>
              Survival over{' '}
              <input
                aria-label={`Period for survival, in ${timeUnit}`}
                type="number"
                min="0.001"
                step="any"
                className="figures mx-1 w-14 rounded border bg-raised px-1 text-ink"
                value={period}
                onChange={(event) => setPeriod(Math.max(1e-6, Number(event.target.value) || 1))}
              />{' '}
              {timeUnit}:{' '}
              <span className="figures text-ink">{showNumber(survivalOfRate(entry.value, over), 5)}</span>
            </>
          )}
        </p>
      ) : null}
      <NumberField
        visibleLabel
        label="Standard error"
        unit={trait.unit}
        placeholder="none"
        value={entry.standardError}
        check={(value) => (value >= 0 ? null : 'A standard error is 0 or more.')}
        onCommit={(standardError) => change('Standard error', { standardError })}
        onClear={() => change('Standard error', { standardError: null })}
      />
      <TextAreaField
        label="Source"
        rows={2}
        value={entry.source}
        maxLength={500}
        onChange={(source) => change('Source', { source }, `source:${traitIndex}:${of.join()}`)}
      />
    </div>
  );
}
