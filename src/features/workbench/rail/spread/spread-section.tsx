import { useState } from 'react';

import { SPREAD_KEY, traitDialKey } from '@/engine/schema/symbols';
import { showNumber } from '@/lib/parse-number';

import { useWorkbench } from '../../state/store';
import { RailSection } from '../rail-section';
import { changeTrait } from '../traits/trait-edits';
import { DialRow } from './dial-row';

function OwnDials() {
  const traits = useWorkbench((state) => state.document.traits);
  const limits = useWorkbench((state) => state.report?.spreadLimits);
  const edit = useWorkbench((state) => state.edit);
  return (
    <div className="grid gap-2 pt-2">
      {traits.map((trait, index) => (
        <DialRow
          key={trait.symbol}
          label={trait.name || trait.symbol}
          value={trait.dial}
          limit={limits?.find((one) => one.key === traitDialKey(trait.symbol))}
          from={-1}
          to={2}
          path={`traits.${index}.dial`}
          onChange={(dial) =>
            edit(
              `Own dial of ${trait.name || trait.symbol}`,
              (document) => changeTrait(document, index, { dial }),
              `dial:${index}`,
            )
          }
        />
      ))}
      <p className="text-sm text-muted">
        A trait’s own dial multiplies the spread. Below 0 it reverses which class has the higher value.
      </p>
    </div>
  );
}

export function SpreadSection() {
  const spread = useWorkbench((state) => state.document.spread);
  const report = useWorkbench((state) => state.report);
  const hasTraits = useWorkbench((state) => state.document.traits.length > 0);
  const edit = useWorkbench((state) => state.edit);
  const [own, setOwn] = useState(false);
  const traits = useWorkbench((state) => state.document.traits);
  if (!hasTraits) return null;
  const pooled = report?.twin.pooledTraits ?? [];
  return (
    <RailSection name="spread" title="Spread">
      <DialRow
        label="Spread"
        value={spread}
        limit={report?.spreadLimits.find((one) => one.key === SPREAD_KEY)}
        from={0}
        to={2}
        path="spread"
        onChange={(next) => edit('Turn the spread', (document) => ({ ...document, spread: next }), 'spread')}
      />
      <p className="text-sm text-muted">
        0 pools the classes into their mean; 1 keeps the traits as entered. Grey lines show the pooled twin.
      </p>
      {pooled.length > 0 ? (
        <dl className="mt-1.5 grid grid-cols-[1fr_auto] gap-x-3 text-sm">
          <dt className="text-muted">Coefficient of variation</dt>
          <dd className="sr-only">by trait</dd>
          {pooled.map((one) => (
            <div key={one.trait} className="col-span-2 flex justify-between gap-3">
              <dt>{traits.find((trait) => trait.symbol === one.trait)?.name || one.trait}</dt>
              <dd className="figures">{showNumber(one.coefficientOfVariation, 3)}</dd>
            </div>
          ))}
        </dl>
      ) : null}
      {report && report.twin.kind !== 'lumped' && report.twin.reason ? (
        <p className="mt-1.5 text-sm text-muted">{report.twin.reason}</p>
      ) : null}
      <button
        type="button"
        aria-expanded={own}
        className="mt-2 text-sm text-accent underline underline-offset-2"
        onClick={() => setOwn(!own)}
      >
        {own ? 'Hide the traits’ own dials' : 'Own dials of the traits'}
      </button>
      {own ? <OwnDials /> : null}
    </RailSection>
  );
}
