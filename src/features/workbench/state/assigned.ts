import type { GivenFinding, Run, Task } from '@/contract/assigned-sweeps';
import { lockBreaches, mayChange } from '@/contract/locks';
import type { SweepRange } from '@/contract/kept-sweep';
import type { PresetDocument } from '@/engine/schema/preset';

/** How far the work is from the server's copy of it. */
export type Saving =
  | { readonly kind: 'saved'; readonly at: string | null }
  | { readonly kind: 'saving' }
  /** Kept in this browser, and sent when the connection is back. */
  | { readonly kind: 'no connection' }
  /** Another window saved since this one began. */
  | { readonly kind: 'conflict'; readonly revision: number; readonly savedAt: string }
  | { readonly kind: 'refused'; readonly message: string };

/** An assigned sweep on the bench, as its assignee works on it. */
export interface AssignedWork {
  readonly task: Task;
  readonly findings: readonly GivenFinding[];
  /** Oldest first. */
  readonly runs: readonly Run[];
  /** Revision of the server's copy that this work goes on from; 0 before the first. */
  readonly revision: number;
  readonly saving: Saving;
}

/** Why an edit is not allowed by the locks, in words; null where it is. */
export function refuseByLocks(
  { task }: AssignedWork,
  next: PresetDocument,
  chosen: SweepRange | null,
): string | null {
  const range = task.freedom.range && chosen ? chosen : task.range;
  const [breach] = lockBreaches(task, { document: next, range });
  return breach === undefined ? null : `${breach} It is part of what was set.`;
}

/** Whether a number is held by the locks. */
export function isLocked(assigned: AssignedWork | null, key: string): boolean {
  return assigned !== null && !mayChange(assigned.task, key);
}

export function isModelLocked(assigned: AssignedWork | null): boolean {
  return assigned !== null && !assigned.task.freedom.model;
}

/** Whether no trait value and no dial may be moved. */
export function areTraitsLocked(assigned: AssignedWork | null): boolean {
  if (!isModelLocked(assigned) || !assigned) return false;
  const { document, freedom, range } = assigned.task;
  if (freedom.parameters === 'all') return false;
  const plain = new Set(document.parameters.map(({ symbol }) => symbol));
  return [...freedom.parameters, range.parameter].every((key) => plain.has(key));
}

export function isRangeLocked(assigned: AssignedWork | null): boolean {
  return assigned !== null && !assigned.task.freedom.range;
}

/** The range that goes with the work: the one that was set where it is locked or none is chosen. */
export function rangeOf({ task }: AssignedWork, chosen: SweepRange | null): SweepRange {
  if (!task.freedom.range || !chosen) return task.range;
  const { parameter, from, to } = chosen;
  return { parameter, from, to };
}

export function givenFor(findings: readonly GivenFinding[], id: string): GivenFinding {
  return findings.find((one) => one.id === id) ?? { id, value: null, text: '', pin: null };
}

export function withFinding(findings: readonly GivenFinding[], next: GivenFinding): readonly GivenFinding[] {
  const others = findings.filter((one) => one.id !== next.id);
  const empty = next.value === null && next.text === '' && next.pin === null;
  return empty ? others : [...others, next];
}
