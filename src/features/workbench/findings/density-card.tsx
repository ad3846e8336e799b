import { useMemo } from 'react';

import { NumberField } from '@/components/fields/number-field';
import { formatNumber, formatShort } from '@/graphics/numbers';

import { quantityName } from '../cycles/cycle-words';
import { usePresentCycles } from '../cycles/use-present-cycles';
import { useShownModel } from '../panes/use-shown-model';
import { listClassNames, showsTwin } from '../panes/views/view-input';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { Card } from './card';
import { lowInTrajectory, lowOnCycles, warningThreshold, type LowDensity } from './low-densities';

function useLowDensities(threshold: number | null): readonly LowDensity[] {
  const model = useShownModel();
  const result = useWorkbench((state) => state.result);
  const withTwin = useWorkbench(showsTwin);
  const split = usePresentCycles('split').cycles;
  const twin = usePresentCycles('twin').cycles;
  return useMemo(() => {
    if (threshold === null || !result) return [];
    const symbols = listClassNames(model).map((one) => one.symbol);
    const pooled = result.twinStateSymbols;
    const densities = new Set(
      model.populations
        .filter((one) => one.sign === 'nonnegative')
        .flatMap((one) => [one.symbol, ...one.classes.map((member) => member.symbol)]),
    );
    return [
      ...lowInTrajectory(result.trajectory, symbols, 'split', threshold),
      ...lowOnCycles(split, symbols, 'split', threshold),
      ...(withTwin && result.twinTrajectory
        ? lowInTrajectory(result.twinTrajectory, pooled, 'twin', threshold)
        : []),
      ...(withTwin ? lowOnCycles(twin, pooled, 'twin', threshold) : []),
    ].filter((low) => densities.has(low.symbol));
  }, [model, result, withTwin, split, twin, threshold]);
}

function Warning({ low }: { readonly low: LowDensity }) {
  const model = useShownModel();
  return (
    <li>
      {low.side === 'twin' ? 'Pooled twin, ' : ''}
      {quantityName(model, low.symbol)}:{' '}
      {low.where === 'cycle' ? 'lowest on the attracting cycle ' : 'lowest in the trajectory '}
      <span className="figures whitespace-nowrap">{formatNumber(low.lowest, 3)}</span>
      {low.time === null ? null : (
        <>
          , below from t = <span className="figures">{formatShort(low.time, 4)}</span> on
        </>
      )}
    </li>
  );
}

/** A quiet warning where densities fall below what a population can have, by default one individual. */
export function DensityCard() {
  const store = useWorkbenchStore();
  const own = useWorkbench((state) => state.document.lowDensity);
  const individuals = useWorkbench((state) => state.document.individualsPerUnit);
  const unit = useWorkbench((state) => state.document.densityUnit);
  const anyDensity = useShownModel().populations.some((one) => one.sign === 'nonnegative');
  const threshold = warningThreshold({ lowDensity: own, individualsPerUnit: individuals });
  const found = useLowDensities(threshold);
  const change = (lowDensity: number | null) =>
    store.getState().edit('Density to warn below', (document) => ({ ...document, lowDensity }));
  const single = own === null && individuals !== null;
  if (!anyDensity) return null;
  return (
    <Card title="Low densities">
      <div role="status">
        {threshold === null ? (
          <p className="text-sm text-muted">
            Say below which density to warn, or under More in the model rail how many individuals make one
            unit of density.
          </p>
        ) : found.length === 0 ? (
          <p className="text-sm text-muted">
            Nothing falls below{' '}
            {single ? 'one individual' : <span className="figures">{formatShort(threshold, 4)}</span>},
            neither in the trajectory nor on a cycle that attracts here.
          </p>
        ) : (
          <div className="border-l-2 border-caution pl-2 text-sm">
            <p className="text-caution">
              Below {single ? 'one individual' : `${formatShort(threshold, 4)} ${unit}`}, where these
              equations say nothing of whether a population lives on:
            </p>
            <ul className="mt-1 list-disc pl-4">
              {found.map((low) => (
                <Warning key={`${low.side}${low.where}${low.symbol}`} low={low} />
              ))}
            </ul>
          </div>
        )}
      </div>
      <NumberField
        className="mt-2 max-sm:hidden"
        visibleLabel
        label="Warn below"
        unit={unit}
        value={own}
        placeholder={individuals === null ? 'not set' : `${formatShort(1 / individuals, 4)}, one individual`}
        check={(value) => (value > 0 ? null : 'The density must be above 0.')}
        onCommit={change}
        onClear={() => change(null)}
      />
    </Card>
  );
}
