import { Popover } from 'radix-ui';

import type { Quantity } from '@/engine/schema/preset';

import type { AxisOption } from './axes-of-view';
import { AxisChoice } from './axis-choice';

interface AxisChoicesProps {
  readonly options: readonly AxisOption[];
  readonly onChange: (axes: readonly Quantity[]) => void;
}

/** One choice stands in the head of the pane; several open from a button. */
export function AxisChoices({ options, onChange }: AxisChoicesProps) {
  const rows = options.map((option, k) => (
    <AxisChoice
      key={option.label}
      {...option}
      onChange={(next) => onChange(options.map((one, at) => (at === k ? next : one.value)))}
    />
  ));
  if (rows.length < 2) return rows;
  return (
    <Popover.Root>
      <Popover.Trigger className="rounded px-1.5 py-0.5 text-sm text-muted hover:bg-panel hover:text-ink">
        Axes <span aria-hidden>▾</span>
      </Popover.Trigger>
      <Popover.Portal>
        <Popover.Content
          align="end"
          sideOffset={4}
          aria-label="Axes"
          className="z-50 grid justify-items-end gap-2 rounded-lg border bg-raised p-3 shadow-lg"
        >
          {rows}
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  );
}
