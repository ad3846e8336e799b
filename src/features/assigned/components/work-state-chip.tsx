import type { WorkState } from '@/contract/assigned-sweeps';
import { joinClasses } from '@/lib/join-classes';

const TONES: Readonly<Record<WorkState, string>> = {
  untouched: 'text-muted',
  running: 'border-muted text-ink',
  sent: 'border-ink text-ink font-medium',
  agreed: 'border-accent text-accent font-medium',
  differs: 'border-caution text-caution font-medium',
  'sent back': 'border-caution text-caution font-medium',
};

/** Where someone stands with a sweep, in a word. */
export function WorkStateChip({ state }: { readonly state: WorkState }) {
  return (
    <span className={joinClasses('rounded-full border px-2 py-0.5 text-sm whitespace-nowrap', TONES[state])}>
      {state}
    </span>
  );
}
