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
  return (
    <>
      <ProblemsList />
      <fieldset disabled={readOnly} className="min-w-0">
        <legend className="sr-only">Model</legend>
        <TraitSection />
        <SpreadSection />
        <EquationsSection />
        <ParameterSection />
        <IntermediatesSection />
        <ProcessSection />
        <PopulationSection />
        <MoreSection />
      </fieldset>
    </>
  );
}
