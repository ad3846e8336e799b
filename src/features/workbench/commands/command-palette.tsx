import { Command as Palette } from 'cmdk';
import { Dialog } from 'radix-ui';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench } from '../state/store';
import { COMMAND_GROUPS, labelOf, type CommandContext } from './command';
import { COMMANDS } from './index';
import { Keys } from './keys';

/** Every command by name; those that cannot be done now say why. */
export function CommandPalette({ context }: { readonly context: () => CommandContext }) {
  const open = useBenchUi((state) => state.dialog === 'palette');
  const set = useBenchUi((state) => state.set);
  // Labels name the last edit, so they follow the history.
  useWorkbench((state) => state.past);
  const now = context();
  return (
    <Dialog.Root open={open} onOpenChange={(next) => set({ dialog: next ? 'palette' : null })}>
      <Dialog.Portal>
        <Dialog.Overlay className="fixed inset-0 z-40 bg-black/35" />
        <Dialog.Content
          aria-describedby={undefined}
          className="fixed top-[12vh] left-1/2 z-50 w-[min(36rem,calc(100vw-1.5rem))] -translate-x-1/2 overflow-hidden rounded-lg border bg-raised shadow-xl"
        >
          <Dialog.Title className="sr-only">All commands</Dialog.Title>
          <Palette label="All commands">
            <Palette.Input
              placeholder="What would you like to do?"
              aria-label="Search commands"
              className="w-full border-b border-hairline bg-transparent px-4 py-3 outline-none placeholder:text-muted"
            />
            <Palette.List className="max-h-[55vh] overflow-y-auto p-1.5">
              <Palette.Empty className="px-3 py-4 text-muted">No command is called that.</Palette.Empty>
              {COMMAND_GROUPS.map((group) => (
                <Palette.Group
                  key={group}
                  heading={group}
                  className="[&_[cmdk-group-heading]]:px-2.5 [&_[cmdk-group-heading]]:pt-2 [&_[cmdk-group-heading]]:pb-1 [&_[cmdk-group-heading]]:text-sm [&_[cmdk-group-heading]]:text-muted"
                >
                  {COMMANDS.filter((one) => one.group === group && one.id !== 'open-palette').map((one) => {
                    const enabled = one.isEnabled(now);
                    return (
                      <Palette.Item
                        key={one.id}
                        value={`${labelOf(one, now)} ${group}`}
                        disabled={enabled !== true}
                        className="flex cursor-pointer items-center gap-3 rounded px-2.5 py-1.5 data-[disabled=true]:cursor-not-allowed data-[disabled=true]:text-muted data-[selected=true]:bg-panel"
                        onSelect={() => {
                          set({ dialog: null });
                          one.perform(now);
                        }}
                      >
                        <span className="min-w-0 flex-1">
                          {labelOf(one, now)}
                          {enabled === true ? null : <span className="block text-sm">{enabled}</span>}
                        </span>
                        {one.shortcut ? <Keys shortcut={one.shortcut} /> : null}
                      </Palette.Item>
                    );
                  })}
                </Palette.Group>
              ))}
            </Palette.List>
          </Palette>
        </Dialog.Content>
      </Dialog.Portal>
    </Dialog.Root>
  );
}
