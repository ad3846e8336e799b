import type { HandIn, Receipt } from '@/contract/assigned-sweeps';
import { ApiError } from '@/lib/api-client';
import { keepSweep } from '@/workers/keep-sweep';

import { rangeOf, type AssignedWork } from '../state/assigned';
import type { WorkbenchState } from '../state/store';
import { handIn } from './api/task-operations';
import { forgetLocalHandIn, keepHandInLocally, type LocalPlace } from './local-work';

/** Whether the sweep on show belongs to the numbers and the range on the bench. */
export function sweepStands(state: WorkbenchState): boolean {
  const { sweep, sweepSelection, assigned } = state;
  if (!sweep || !assigned || state.sweepOutdated || state.job) return false;
  const range = rangeOf(assigned, sweepSelection);
  const { parameterKey, from, to } = sweep.split;
  return (
    parameterKey === range.parameter && Math.min(from, to) === range.from && Math.max(from, to) === range.to
  );
}

/** All that a hand-in freezes, with the key by which the server knows it again. */
export function freeze(state: WorkbenchState, assigned: AssignedWork, note: string): HandIn {
  return {
    key: crypto.randomUUID(),
    document: state.document,
    range: rangeOf(assigned, state.sweepSelection),
    findings: [...assigned.findings],
    sweep: sweepStands(state) && state.sweep ? keepSweep(state.sweep, state.cycles) : null,
    note,
  };
}

export type Sent =
  | { readonly kind: 'received'; readonly receipt: Receipt }
  /** Kept in this browser under its key; sending it again cannot make two of it. */
  | { readonly kind: 'waiting' }
  | { readonly kind: 'refused'; readonly message: string };

/** Hands in what was frozen. It stays in this browser until its receipt has come. */
export async function sendHandIn(place: LocalPlace, body: HandIn): Promise<Sent> {
  keepHandInLocally(place, body);
  try {
    const receipt = await handIn(place.assignedId, body);
    forgetLocalHandIn(place);
    return { kind: 'received', receipt };
  } catch (error) {
    if (!(error instanceof ApiError)) throw error;
    if (error.code === 'no-connection' || error.status >= 500) return { kind: 'waiting' };
    forgetLocalHandIn(place);
    const fields = Object.values(error.fields);
    return { kind: 'refused', message: [error.message, ...fields].join(' ') };
  }
}
