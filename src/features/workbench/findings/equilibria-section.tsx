import { useState } from 'react';

import { Button } from '@/components/ui/button';

import { useShownModel } from '../panes/use-shown-model';
import { showsTwin } from '../panes/views/view-input';
import { useWorkbench } from '../state/store';
import { EquilibriumCard } from './equilibrium-card';

/** Every equilibrium found, feasible ones first; those of the twin on request. */
export function EquilibriaSection() {
  const model = useShownModel();
  const found = useWorkbench((state) => state.result?.equilibria ?? null);
  const twinFound = useWorkbench((state) =>
    showsTwin(state) ? (state.result?.twinEquilibria ?? null) : null,
  );
  const twinSymbols = useWorkbench((state) => state.result?.twinStateSymbols ?? null);
  const lumped = useWorkbench((state) => state.shownReport?.twin.kind === 'lumped');
  const engine = useWorkbench((state) => state.engine);
  const [withTwin, setWithTwin] = useState(false);
  // Under forcing the fixed points of the period map stand in another card.
  if (!found || found.status === 'needs-period-map') return null;
  const feasible = found.equilibria.filter((one) => one.feasible);
  const others = found.equilibria.filter((one) => !one.feasible);
  const twinNames = lumped
    ? twinSymbols?.map((symbol) => model.populations.find((one) => one.symbol === symbol)?.name || symbol)
    : undefined;
  return (
    <section aria-label="Equilibria" className="grid grid-cols-[minmax(0,1fr)] gap-3">
      {found.status === 'complete' ? null : (
        <p className="rounded-lg border bg-raised p-3.5 text-muted">{found.message}</p>
      )}
      {feasible.map((one, k) => (
        <EquilibriumCard key={k} equilibrium={one} model={model} />
      ))}
      {found.status === 'complete' && feasible.length === 0 ? (
        <p className="rounded-lg border bg-raised p-3.5 text-muted">
          No feasible equilibrium was found in the box after {found.startsTried} starts. Widen the box under
          More in the model rail, or look at the trajectories.
        </p>
      ) : null}
      {others.length > 0 ? (
        <details className="text-sm">
          <summary className="cursor-pointer px-1 text-muted">
            {others.length} not feasible (a density below zero)
          </summary>
          <div className="mt-2 grid gap-3 text-base">
            {others.map((one, k) => (
              <EquilibriumCard key={k} equilibrium={one} model={model} />
            ))}
          </div>
        </details>
      ) : null}
      {withTwin
        ? twinFound?.equilibria
            .filter((one) => one.feasible)
            .map((one, k) => (
              <EquilibriumCard
                key={`twin${k}`}
                equilibrium={one}
                model={model}
                twin
                {...(twinNames ? { stateNames: twinNames } : {})}
              />
            ))
        : null}
      <div className="flex flex-wrap gap-1.5">
        <Button size="small" disabled={!engine} onClick={() => engine?.findEquilibria()}>
          Search again
        </Button>
        {twinFound ? (
          <Button size="small" aria-pressed={withTwin} onClick={() => setWithTwin(!withTwin)}>
            {withTwin ? 'Hide those of the twin' : 'Show those of the twin'}
          </Button>
        ) : null}
      </div>
    </section>
  );
}
