import { Lock } from 'lucide-react';

import { areTraitsLocked, isModelLocked } from '../state/assigned';
import { useWorkbench } from '../state/store';
import { EquationsSection } from './equations/equations-section';
import { IntermediatesSection } from './formulas/intermediates-section';
import { MoreSection } from './more/more-section';
import { ParameterSection } from './parameters/parameter-section';
import { PopulationSection } from './populations/population-section';
import { ProblemsList } from './problems-list';
import { ProcessSection } from './processes/process-section';
import { SpreadSection } from './spread/spread-section';
import { TraitSection } from './traits/trait-section';

/** The model, in order of use. Read-only, every control is there and none can be moved. */
export function ModelRail({ readOnly = false }: { readonly readOnly?: boolean }) {
  const assigned = useWorkbench((state) => state.assigned);
  const modelLocked = isModelLocked(assigned);
  return (
    <>
      <ProblemsList />
      {modelLocked ? (
        <p className="flex gap-2 border-b border-hairline px-4 py-2 text-sm text-muted">
          <Lock size={14} aria-hidden className="mt-0.5 shrink-0" />
          The model is part of what was set. Numbers without a lock, start values and views are yours.
        </p>
      ) : null}
      <fieldset disabled={readOnly} className="min-w-0">
        <legend className="sr-only">Model</legend>
        <fieldset disabled={areTraitsLocked(assigned)} className="min-w-0">
          <TraitSection />
          <SpreadSection />
        </fieldset>
        <EquationsSection />
        <ParameterSection />
        <fieldset disabled={modelLocked} className="min-w-0">
          <IntermediatesSection />
          <ProcessSection />
        </fieldset>
        <PopulationSection />
        <fieldset disabled={modelLocked} className="min-w-0">
          <MoreSection />
        </fieldset>
      </fieldset>
    </>
  );
}
