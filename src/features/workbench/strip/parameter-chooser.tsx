import { Command } from 'cmdk';
import { Popover } from 'radix-ui';
import { useState } from 'react';

import { parameterName } from '@/graphics/quantities';

import { useShownModel } from '../panes/use-shown-model';
import { isRangeLocked } from '../state/assigned';
import { useWorkbench, useWorkbenchStore } from '../state/store';
import { defaultRange } from './default-range';

const GROUPS = [
  { group: 'parameter', label: 'Parameters' },
  { group: 'dial', label: 'Spread' },
  { group: 'trait', label: 'Trait values' },
] as const;

/** What lies along the strip: any parameter, dial or trait value, found by typing. */
export function ParameterChooser() {
  const store = useWorkbenchStore();
  const model = useShownModel();
  const parameters = useWorkbench((state) => state.shownReport?.parameters ?? null);
  const selected = useWorkbench((state) => state.sweepSelection?.parameter ?? null);
  const locked = useWorkbench((state) => isRangeLocked(state.assigned));
  const [open, setOpen] = useState(false);
  const named = selected ? parameterName(model, selected) : null;
  if (locked)
    return (
      <span
        className="max-w-full truncate px-1 font-heading text-lg font-semibold"
        title="The sweep is part of what was set."
      >
        {named?.name}
      </span>
    );
  return (
    <Popover.Root open={open} onOpenChange={setOpen}>
      <Popover.Trigger
        className="max-w-full truncate rounded px-1 text-left font-heading text-lg font-semibold hover:bg-panel"
        aria-label={`Along the strip: ${named?.name ?? 'nothing yet'}. Choose a parameter`}
      >
        {named?.name ?? 'Choose a parameter'}{' '}
        <span aria-hidden className="text-sm text-muted">
          ▾
        </span>
      </Popover.Trigger>
      <Popover.Portal>
        <Popover.Content
          side="top"
          align="start"
          sideOffset={6}
          className="z-50 w-80 rounded-lg border bg-raised p-1 shadow-lg"
        >
          <Command label="Parameters">
            <Command.Input
              placeholder="Search by name or symbol"
              className="mb-1 w-full rounded border bg-raised px-2 py-1.5"
            />
            <Command.List className="max-h-72 overflow-y-auto">
              <Command.Empty className="p-2 text-muted">Nothing by that name.</Command.Empty>
              {GROUPS.map(({ group, label }) => {
                const members = (parameters ?? []).filter((one) => one.group === group);
                if (members.length === 0) return null;
                return (
                  <Command.Group key={group} heading={label} className="text-sm text-muted">
                    {members.map((one) => (
                      <Command.Item
                        key={one.key}
                        value={`${one.key} ${one.label} ${parameterName(model, one.key).name}`}
                        className="cursor-pointer rounded px-2 py-1 text-base text-ink data-[selected=true]:bg-panel"
                        onSelect={() => {
                          const { document, set, engine } = store.getState();
                          set({ sweepSelection: { parameter: one.key, ...defaultRange(document, one) } });
                          setOpen(false);
                          engine?.sweep();
                        }}
                      >
                        {parameterName(model, one.key).name}
                      </Command.Item>
                    ))}
                  </Command.Group>
                );
              })}
            </Command.List>
          </Command>
        </Popover.Content>
      </Popover.Portal>
    </Popover.Root>
  );
}
