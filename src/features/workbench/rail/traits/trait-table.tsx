import { Fragment } from 'react';

import { useWorkbench } from '../../state/store';
import { HueDot } from '../hue-dot';
import { TraitHeader } from './trait-header';
import { TraitRow } from './trait-row';

/** Classes down, grouped by population; traits across with their units; numbers in the cells. */
export function TraitTable() {
  const populations = useWorkbench((state) => state.document.populations);
  const traits = useWorkbench((state) => state.document.traits);
  const columns = traits.flatMap((trait, index) => (trait.per === 'class' ? [index] : []));
  if (columns.length === 0 || populations.length === 0) return null;
  const firstRows = populations.map((_, at) =>
    populations.slice(0, at).reduce((rows, one) => rows + one.classes.length, 0),
  );
  return (
    <div className="-mx-1 overflow-x-auto px-1 pb-1">
      <table className="w-full border-collapse" aria-label="Trait table">
        <thead>
          <tr className="align-bottom">
            <th
              scope="col"
              className="sticky left-0 z-10 bg-panel pb-1 text-left text-sm font-normal text-muted"
            >
              class
            </th>
            {columns.map((index) => (
              <th key={traits[index]?.symbol} scope="col" className="max-w-28 min-w-16 pb-1">
                <TraitHeader index={index} />
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {populations.map((population, at) => {
            const alone = population.classes.length === 1;
            return (
              <Fragment key={population.symbol}>
                {alone ? null : (
                  <tr className="border-t border-hairline">
                    <th
                      scope="rowgroup"
                      colSpan={columns.length + 1}
                      className="pt-1.5 text-left text-sm font-semibold"
                    >
                      <span className="flex items-center gap-1.5">
                        <HueDot population={population} />
                        {population.name || population.symbol}
                      </span>
                    </th>
                  </tr>
                )}
                {population.classes.map((entry, k) => (
                  <TraitRow
                    key={entry.symbol}
                    population={population}
                    entry={entry}
                    alone={alone}
                    row={(firstRows[at] ?? 0) + k}
                    traits={columns}
                  />
                ))}
              </Fragment>
            );
          })}
        </tbody>
      </table>
    </div>
  );
}
