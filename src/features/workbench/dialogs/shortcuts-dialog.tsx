import { Dialog } from '@/components/ui/dialog';

import { labelOf, type CommandContext } from '../commands/command';
import { COMMANDS } from '../commands/index';
import { Keys } from '../commands/keys';
import { useBenchUi } from '../layout/bench-ui';

const IN_FIELDS: readonly { readonly keys: string; readonly label: string }[] = [
  { keys: 'Enter', label: 'Hand on the number, and go down in a table' },
  { keys: 'Escape', label: 'Bring back what was in the field' },
  { keys: 'Alt+Enter', label: 'Details of a trait value: survival, standard error, source' },
];

function Row({ label, keys }: { readonly label: string; readonly keys: string }) {
  return (
    <li className="flex items-center justify-between gap-4 py-1">
      <span>{label}</span>
      <Keys shortcut={keys} />
    </li>
  );
}

export function ShortcutsDialog({ context }: { readonly context: () => CommandContext }) {
  const set = useBenchUi((state) => state.set);
  const now = context();
  return (
    <Dialog open onOpenChange={() => set({ dialog: null })} title="Keyboard shortcuts">
      <ul className="divide-y">
        {COMMANDS.filter((one) => one.shortcut).map((one) => (
          <Row key={one.id} label={labelOf(one, now)} keys={one.shortcut ?? ''} />
        ))}
      </ul>
      <h3 className="mt-4 text-lg">In fields and tables</h3>
      <ul className="divide-y">
        {IN_FIELDS.map((one) => (
          <Row key={one.keys} label={one.label} keys={one.keys} />
        ))}
        <li className="py-1">Arrow keys go from cell to cell.</li>
      </ul>
    </Dialog>
  );
}
