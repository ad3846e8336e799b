import { ASSIGNED_LIMITS, type Run } from '@/contract/assigned-sweeps';
import { changedNumbers } from '@/contract/locks';

import { readParameterValues } from '../engine/parameter-values';
import type { WorkbenchState, WorkbenchStore } from '../state/store';

/** A sweep and its cycles come one after the other; what has been still for as long as this is whole. */
const STILL = 400;
const MOST_POINTS = 100;

/** The sweep on show as a line of the log; null where there is none at the present numbers. */
export function describeRun(state: WorkbenchState, at = new Date()): Run | null {
  const { sweep, cycles, assigned, document } = state;
  if (!sweep || !assigned || state.sweepOutdated || state.job) return null;
  const values = readParameterValues(document);
  const points = (['split', 'twin'] as const).flatMap((of) =>
    [...(sweep[of]?.specialPoints ?? []), ...(cycles?.[of]?.specialPoints ?? [])].map(
      ({ kind, parameter }) => ({ kind, of, parameter }),
    ),
  );
  return {
    at: at.toISOString(),
    range: {
      parameter: sweep.split.parameterKey,
      from: Math.min(sweep.split.from, sweep.split.to),
      to: Math.max(sweep.split.from, sweep.split.to),
    },
    changed: Object.fromEntries(
      changedNumbers(assigned.task.document, document)
        .filter((key) => key !== sweep.split.parameterKey && Number.isFinite(values[key]))
        .map((key) => [key, values[key] ?? 0]),
    ),
    points: points.filter((one) => Number.isFinite(one.parameter)).slice(0, MOST_POINTS),
    message: sweep.split.message.slice(0, 500),
  };
}

const same = (a: Run | undefined, b: Run) =>
  a !== undefined &&
  JSON.stringify([a.range, a.changed, a.points]) === JSON.stringify([b.range, b.changed, b.points]);

/** Keeps a line of every sweep that was run; the returned function ends it. */
export function keepRuns(store: WorkbenchStore): () => void {
  let logged: WorkbenchState['sweep'] = store.getState().sweep;
  let timer: ReturnType<typeof setTimeout> | undefined;
  const unsubscribe = store.subscribe((state, before) => {
    if (state.sweep === before.sweep && state.cycles === before.cycles && state.job === before.job) return;
    clearTimeout(timer);
    timer = setTimeout(() => {
      const now = store.getState();
      const run = now.sweep === logged ? null : describeRun(now);
      if (!run || !now.assigned) return;
      logged = now.sweep;
      const { runs } = now.assigned;
      if (same(runs.at(-1), run)) return;
      now.set({ assigned: { ...now.assigned, runs: [...runs, run].slice(-ASSIGNED_LIMITS.runs) } });
    }, STILL);
  });
  return () => {
    clearTimeout(timer);
    unsubscribe();
  };
}
