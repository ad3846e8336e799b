import type { WantedFinding } from '@/contract/assigned-sweeps';
import type { PointKind } from '@/contract/kept-sweep';

import { givenFor, withFinding, type AssignedWork } from '../state/assigned';
import type { WorkbenchState, WorkbenchStore } from '../state/store';

/** A special point of the sweep on show that can stand for a finding. */
export interface Candidate {
  readonly kind: PointKind;
  readonly of: 'split' | 'twin';
  readonly parameter: number;
}

/** Special points of the sweep on show, by value. */
export function candidatesOf(state: Pick<WorkbenchState, 'sweep' | 'cycles'>): Candidate[] {
  return (['split', 'twin'] as const)
    .flatMap((of) =>
      [...(state.sweep?.[of]?.specialPoints ?? []), ...(state.cycles?.[of]?.specialPoints ?? [])].map(
        ({ kind, parameter }) => ({ kind, of, parameter }),
      ),
    )
    .sort((a, b) => a.parameter - b.parameter);
}

/** The finding that a point would be pinned to: of its kind, unanswered ones first; null where none asks for it. */
export function findingFor(assigned: AssignedWork | null, point: Candidate): WantedFinding | null {
  const asking = (assigned?.task.wanted ?? []).filter(
    (one) => one.kind === 'special point' && one.point === point.kind && one.of === point.of,
  );
  const open = asking.find((one) => givenFor(assigned?.findings ?? [], one.id).value === null);
  return open ?? asking[0] ?? null;
}

/** Gives a point as the answer to a finding. */
export function pinFinding(store: WorkbenchStore, id: string, point: Candidate): void {
  const { assigned, set } = store.getState();
  if (!assigned) return;
  const given = givenFor(assigned.findings, id);
  const { kind, of, parameter } = point;
  const next = { ...given, value: parameter, pin: { kind, of, parameter } };
  set({ assigned: { ...assigned, findings: withFinding(assigned.findings, next) } });
}
