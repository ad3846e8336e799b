import { useEffect } from 'react';

import { useBenchUi } from '../layout/bench-ui';
import { run, type CommandContext } from './command';
import { COMMANDS } from './index';
import { belongsToText, matchesShortcut } from './shortcut';

/** Listens for the commands' shortcuts while the workbench is on the page. */
export function useShortcuts(context: () => CommandContext): void {
  useEffect(() => {
    const handleKey = (event: KeyboardEvent) => {
      if (event.defaultPrevented || belongsToText(event)) return;
      const command = COMMANDS.find((one) => one.shortcut && matchesShortcut(event, one.shortcut));
      if (!command) return;
      event.preventDefault();
      // A dialog has the keys to itself until it is closed.
      if (useBenchUi.getState().dialog !== null) return;
      const reason = run(command, context());
      if (reason) useBenchUi.getState().set({ notice: reason });
    };
    window.addEventListener('keydown', handleKey);
    return () => window.removeEventListener('keydown', handleKey);
  }, [context]);
}
