import type { AssignedState } from '@/contract/assigned-sweeps';
import { joinClasses } from '@/lib/join-classes';

const TONES: Readonly<Record<AssignedState, string>> = {
  draft: 'border-dashed border-muted text-muted',
  open: 'border-accent text-accent font-medium',
  closed: 'border-muted text-ink',
};

/** Whether a sweep is being written, worked on, or over. */
export function AssignedStateChip({ state }: { readonly state: AssignedState }) {
  return (
    <span className={joinClasses('rounded-full border px-2 py-0.5 text-sm whitespace-nowrap', TONES[state])}>
      {state}
    </span>
  );
}
