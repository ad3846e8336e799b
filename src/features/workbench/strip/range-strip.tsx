import { isRangeLocked } from '../state/assigned';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { ParameterChooser } from './parameter-chooser';
import { RangeField } from './range-field';
import { RunButton } from './run-button';
import { StripTrack } from './strip-track';

function SweepFacts() {
  const sweep = useWorkbench((state) => state.sweep?.split ?? null);
  const cycles = useWorkbench((state) => state.cycles?.split ?? null);
  if (!sweep) return null;
  const points = sweep.points + (cycles?.points ?? 0);
  const milliseconds = sweep.milliseconds + (cycles?.milliseconds ?? 0);
  return (
    <span className="text-sm whitespace-nowrap text-muted max-sm:hidden">
      {points.toLocaleString('en-GB')} points, {Math.round(milliseconds).toLocaleString('en-GB')} ms
    </span>
  );
}

/** The bottom of the workbench: the swept parameter, its range, and the strip itself. */
export function RangeStrip() {
  const store = useWorkbenchStore();
  const selection = useWorkbench((state) => state.sweepSelection);
  const locked = useWorkbench((state) => isRangeLocked(state.assigned));
  const change = (patch: { from?: number; to?: number }) => {
    const { sweepSelection, set, engine } = store.getState();
    if (!sweepSelection) return;
    set({ sweepSelection: { ...sweepSelection, ...patch } });
    engine?.sweep();
  };
  return (
    <section aria-label="Range strip" className="flex flex-wrap items-center gap-x-5 gap-y-1 px-4 py-1.5">
      <div className="grid w-60 min-w-0 justify-items-start gap-0.5 max-sm:w-full">
        <ParameterChooser />
        <SweepFacts />
      </div>
      {selection ? (
        <>
          <div className="order-none flex min-w-0 flex-1 basis-80 items-center px-2">
            <StripTrack selection={selection} />
          </div>
          <div className="flex flex-wrap items-center gap-2 max-sm:hidden">
            <RangeField
              locked={locked}
              key={`from:${selection.parameter}`}
              label="from"
              value={selection.from}
              check={(value) =>
                value < selection.to ? null : `The range begins below its end, ${selection.to}.`
              }
              onChange={(from) => change({ from })}
            />
            <RangeField
              locked={locked}
              key={`to:${selection.parameter}`}
              label="to"
              value={selection.to}
              check={(value) =>
                value > selection.from ? null : `The range ends above its beginning, ${selection.from}.`
              }
              onChange={(to) => change({ to })}
            />
            <RunButton />
          </div>
        </>
      ) : (
        <p className="text-muted">Choose what to sweep: a parameter, a trait value, or the spread.</p>
      )}
    </section>
  );
}
