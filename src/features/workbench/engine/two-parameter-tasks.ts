import type { SpecialPoint } from '@/engine/continuation/contract';
import { BOUNDARY_KINDS, type BoundariesTask, type MapTask } from '@/engine/schema/analysis-tasks';

import type { WorkbenchState } from '../state/store';
import { secondParameter } from '../two-parameters/second-parameter';
import { readParameterValue, readTaskValues } from './parameter-values';

type BoundaryKind = (typeof BOUNDARY_KINDS)[number];
const isBoundaryKind = (kind: string): kind is BoundaryKind => BOUNDARY_KINDS.some((one) => one === kind);

/** Values and start values of the bench, as every task has them. */
export function commonTask(state: WorkbenchState) {
  const { document, shownReport } = state;
  return {
    parameters: { ...(shownReport ? readTaskValues(document, shownReport) : {}) },
    starts: Object.fromEntries(
      document.populations.flatMap((one) => one.classes.map((member) => [member.symbol, member.start])),
    ),
    twin: true,
  };
}

/** The task that traces what the sweep found in the second parameter, or one of its points; null without a sweep. */
export function boundariesTask(state: WorkbenchState, point?: SpecialPoint): BoundariesTask | null {
  const { sweepSelection: first } = state;
  const second = secondParameter(state);
  if (!first || !second) return null;
  const value = readParameterValue(state.document, second.parameter);
  const symbols = state.sweep?.split.stateSymbols ?? [];
  const one =
    point && isBoundaryKind(point.kind) && value !== null
      ? {
          kind: point.kind,
          first: point.parameter,
          second: value,
          state: Object.fromEntries(symbols.map((symbol, i) => [symbol, point.state[i] ?? 0])),
          ...(point.hopf ? { omega: point.hopf.omega } : {}),
        }
      : null;
  return {
    task: 'boundaries',
    ...commonTask(state),
    first,
    second,
    kinds: [...BOUNDARY_KINDS],
    ...(one ? { point: one } : {}),
    maximumPoints: 1_000,
    branches: true,
  };
}

export function mapTask(state: WorkbenchState): MapTask | null {
  const { sweepSelection: first } = state;
  const second = secondParameter(state);
  if (!first || !second) return null;
  const { cells, quantity } = state.twoParameters;
  return {
    task: 'map',
    ...commonTask(state),
    x: { ...first, cells },
    y: { ...second, cells },
    show: quantity,
  };
}
