import { FieldMessage } from '@/components/fields/field-message';
import { showNumber } from '@/lib/parse-number';

import { useWorkbench } from '../../state/store';
import { DiagnosticLines } from '../diagnostic-lines';
import { RailSection } from '../rail-section';
import { useDiagnostics } from '../use-diagnostics';
import { AddTrait } from './add-trait';
import { PairMatrix } from './pair-matrix';
import { findWrongSums, scaleShares } from './share-sums';
import { TraitTable } from './trait-table';

function WrongSums() {
  const document = useWorkbench((state) => state.document);
  const edit = useWorkbench((state) => state.edit);
  return document.traits.flatMap((trait, index) =>
    findWrongSums(document, trait).map((wrong) => (
      <FieldMessage key={`${trait.symbol}:${wrong.population}`}>
        {trait.name || trait.symbol} of {wrong.name} sums to{' '}
        <span className="figures">{showNumber(wrong.sum, 6)}</span>, not 1.{' '}
        <button
          type="button"
          className="font-medium text-accent underline underline-offset-2"
          onClick={() =>
            edit(`Scale ${trait.name || trait.symbol} to sum to 1`, (before) =>
              scaleShares(before, index, wrong.classes),
            )
          }
        >
          Scale to 1
        </button>
      </FieldMessage>
    )),
  );
}

export function TraitSection() {
  const traits = useWorkbench((state) => state.document.traits);
  const hasPopulations = useWorkbench((state) => state.document.populations.length > 0);
  const diagnostics = useDiagnostics(['traits'], true);
  const shares = traits.map((trait) => trait.role === 'share-of-births');
  // Sums of shares have a line of their own, with the way to mend them.
  const others = diagnostics.filter((one) => !(shares[Number(one.path[1])] ?? false));
  return (
    <RailSection name="traits" title="Traits" aside="by class" actions={<AddTrait />}>
      {traits.length === 0 ? (
        <p className="text-sm text-muted">
          {hasPopulations
            ? 'No traits yet. Add what is measured by class: mortality, attack rate, share of births. Formulas read a value as trait_class, e.g. m_y1.'
            : 'Traits come after the first population.'}
        </p>
      ) : null}
      <TraitTable />
      {traits.map((trait, index) =>
        trait.per === 'pair' ? <PairMatrix key={trait.symbol} index={index} /> : null,
      )}
      <div className="grid gap-1 pt-1">
        <WrongSums />
        <DiagnosticLines diagnostics={others} />
      </div>
    </RailSection>
  );
}
