import type { SpecialPoint } from '@/engine/continuation/contract';
import type { CycleSpecialPoint } from '@/engine/cycles/contract';
import { formatNumber, formatToTolerance } from '@/graphics/numbers';

import { isOfCycles } from '../cycles/marked-points';
import { useShownModel } from '../panes/use-shown-model';
import { useWorkbench, useWorkbenchStore, type MarkedPoint } from '../state/store';
import { LowestDensities } from './lowest-densities';
import { Multipliers } from './multipliers';

/** Kinds that go on as curves when a second parameter moves. */
const TRACED: ReadonlySet<string> = new Set(['fold', 'Hopf', 'transcritical', 'pitchfork']);

function TraceButton({ point }: { readonly point: SpecialPoint }) {
  const store = useWorkbenchStore();
  if (!TRACED.has(point.kind)) return null;
  return (
    <button
      type="button"
      className="mt-1 text-accent underline underline-offset-2"
      onClick={() => {
        const { set, engine } = store.getState();
        set({ arrangement: 'two-parameters' });
        engine?.traceBoundaries(point);
      }}
    >
      Trace in two parameters
    </button>
  );
}

function EquilibriumPoint({ point }: { readonly point: SpecialPoint }) {
  const { hopf, foldCoefficient } = point;
  if (foldCoefficient !== null)
    return (
      <p>
        Quadratic coefficient <span className="figures">{formatNumber(foldCoefficient, 4)}</span>, in units of
        the states’ own size
      </p>
    );
  if (!hopf) return null;
  return (
    <>
      {hopf.meaning === point.meaning ? null : <p>{hopf.meaning}</p>}
      {hopf.l1 === null ? null : (
        <p>
          First Lyapunov coefficient <span className="figures">{formatNumber(hopf.l1, 4)}</span>, period{' '}
          <span className="figures">{formatNumber((2 * Math.PI) / hopf.omega, 4)}</span>
        </p>
      )}
    </>
  );
}

function CyclePoint({ point }: { readonly point: CycleSpecialPoint }) {
  const model = useShownModel();
  const branch = useWorkbench((state) => state.cycles?.split.branches[point.branch] ?? null);
  const forced = useWorkbench((state) => (state.cycles?.split.forcingPeriod ?? null) !== null);
  return (
    <div className="mt-1 grid gap-1">
      <p>
        Period <span className="figures">{formatNumber(point.period, 5)}</span> {model.timeUnit}
        {point.angle === null ? null : (
          <>
            , angle of the pair <span className="figures">{formatNumber(point.angle, 4)}</span>
          </>
        )}
      </p>
      <Multipliers values={point.multipliers} forced={forced} />
      {branch ? <LowestDensities quantities={branch.quantities} lowest={point.lowest} /> : null}
    </div>
  );
}

/** Where a special point lies, how well that is known, and what it means. */
export function SpecialPointDetails({
  point,
  range,
}: {
  readonly point: MarkedPoint;
  readonly range: number;
}) {
  return (
    <>
      <p>
        At <span className="figures">{formatToTolerance(point.parameter, point.accuracy * range)}</span>,
        located to <span className="figures">{formatNumber(point.accuracy, 1)}</span> of the range.
      </p>
      <p>{point.meaning}</p>
      {isOfCycles(point) ? (
        <CyclePoint point={point} />
      ) : (
        <>
          <EquilibriumPoint point={point} />
          <TraceButton point={point} />
        </>
      )}
    </>
  );
}
