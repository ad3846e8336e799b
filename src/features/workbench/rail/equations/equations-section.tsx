import { useWorkbench } from '../../state/store';
import { RailSection } from '../rail-section';
import { Tex } from './tex';

/** The equations that follow from the processes, typeset. */
export function EquationsSection() {
  const report = useWorkbench((state) => state.report);
  const shown = useWorkbench((state) => state.shownReport);
  // While a formula is being typed the last valid equations stay.
  const current = report?.valid ? report : shown;
  if (!current || current.equations.length === 0) return null;
  return (
    <RailSection name="equations" title="Equations" aside={report?.valid ? null : 'of the last valid model'}>
      <div
        role="region"
        aria-label="Typeset equations"
        tabIndex={0}
        className="grid gap-2 overflow-x-auto rounded-lg border border-hairline bg-raised px-3 py-2.5"
      >
        {current.equations.map((one) => (
          <Tex key={one.symbol} source={one.tex} />
        ))}
        {current.intermediates.length > 0 ? <p className="pt-1 text-sm text-muted">with</p> : null}
        {current.intermediates.map((one) => (
          <Tex key={one.symbol} source={one.tex} />
        ))}
      </div>
    </RailSection>
  );
}
