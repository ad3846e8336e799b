import { ChevronDown } from 'lucide-react';

import { Menu, MenuItem } from '@/components/layout/menu';
import { Button } from '@/components/ui/button';

import { useBenchUi } from '../layout/bench-ui';
import { useWorkbench, useWorkbenchStore } from '../state/store';

/** Runs the sweep or the full picture, or stops what is under way. */
export function RunButton() {
  const store = useWorkbenchStore();
  const engine = useWorkbench((state) => state.engine);
  const job = useWorkbench((state) => state.job);
  const ready = useWorkbench((state) => state.sweepSelection !== null && state.shownReport !== null);
  const outdated = useWorkbench((state) => state.sweepOutdated);
  const drawn = useWorkbench((state) => state.picture !== null);
  const openDialog = useBenchUi((state) => state.set);
  if (job)
    return (
      <Button size="small" onClick={() => engine?.cancel()}>
        Cancel
      </Button>
    );
  const disabled = !engine || !ready;
  return (
    <span className="inline-flex">
      <Button
        size="small"
        className="rounded-r-none"
        look={outdated ? 'primary' : 'plain'}
        disabled={disabled}
        onClick={() => engine?.sweep()}
      >
        {outdated ? 'Sweep again' : 'Run the sweep'}
      </Button>
      <Menu
        trigger={
          <Button
            size="small"
            className="-ml-px rounded-l-none px-1"
            disabled={disabled}
            aria-label="More to run"
          >
            <ChevronDown size={14} aria-hidden />
          </Button>
        }
      >
        <MenuItem
          onSelect={() => {
            store.getState().set({ arrangement: 'sweep' });
            engine?.picture();
          }}
        >
          Full picture
        </MenuItem>
        <MenuItem disabled={!drawn} onSelect={() => openDialog({ dialog: 'picture' })}>
          Table of the full picture
        </MenuItem>
      </Menu>
    </span>
  );
}
