/** The task behind a sweep: equilibria, branches and the cycles from them, split and pooled. */
import type { PictureResult } from '@/engine/analyses/contract';
import type { SweepResult } from '@/engine/continuation/contract';
import type { CyclesResult } from '@/engine/cycles/contract';
import type { PictureTask } from '@/engine/schema/analysis-tasks';
import type { PresetDocument } from '@/engine/schema/preset';
import type { ParameterValues, SweepRequest } from '@/workers/protocol';

/** @param values those of the request that the model knows, see `readTaskValues` */
export function pictureTask(
  request: SweepRequest,
  document: PresetDocument,
  values: ParameterValues,
): PictureTask {
  const symbols = document.populations.flatMap((one) => one.classes.map((member) => member.symbol));
  return {
    task: 'picture',
    parameter: request.parameter,
    from: request.from,
    to: request.to,
    parameters: { ...values },
    starts: Object.fromEntries(symbols.map((symbol, k) => [symbol, request.starts[k] ?? 0])),
    twin: request.withTwin,
    branches: true,
  };
}

/** Whether attracting cycles begin at a Hopf point from which none could be continued. */
export function hasUnfollowedCycles({ sweep, cycles }: PictureResult): boolean {
  return (
    isUnfollowed(sweep.split, cycles.split) || (sweep.twin !== null && isUnfollowed(sweep.twin, cycles.twin))
  );
}

function isUnfollowed({ specialPoints }: SweepResult, cycles: CyclesResult | null): boolean {
  return specialPoints.some(
    ({ id, kind, feasible, hopf }) =>
      kind === 'Hopf' &&
      feasible &&
      hopf?.criticality !== 'subcritical' &&
      !cycles?.branches.some(
        ({ origin, parameters }) =>
          origin.kind === 'Hopf' && origin.specialPoint === id && parameters.length > 1,
      ),
  );
}
