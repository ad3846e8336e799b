import { useWorkbench } from '../../state/store';
import { Tex } from '../../rail/equations/tex';

/** The equations of the last valid model, typeset large. */
export function EquationsPane() {
  const report = useWorkbench((state) => state.shownReport);
  if (!report || report.equations.length === 0)
    return (
      <p className="grid flex-1 place-items-center p-6 text-center text-muted">
        No equations yet. Add a population and a process in the model rail.
      </p>
    );
  return (
    <div
      role="region"
      aria-label="Equations, set large"
      tabIndex={0}
      className="grid min-h-0 flex-1 content-start gap-4 overflow-auto p-5 text-lg"
    >
      {report.equations.map((one) => (
        <Tex key={one.symbol} source={one.tex} display />
      ))}
      {report.intermediates.length > 0 ? <p className="text-base text-muted">with</p> : null}
      {report.intermediates.map((one) => (
        <Tex key={one.symbol} source={one.tex} display />
      ))}
      {report.constantsOfMotion.length > 0 ? (
        <p className="text-base text-muted">
          Constant along every trajectory:{' '}
          <span className="figures">{report.constantsOfMotion.join('; ')}</span>
        </p>
      ) : null}
    </div>
  );
}
