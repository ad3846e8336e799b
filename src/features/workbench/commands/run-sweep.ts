import type { Command } from './command';

export const runSweep: Command = {
  id: 'run-sweep',
  label: 'Run the sweep',
  group: 'Explore',
  shortcut: 'Alt+S',
  isEnabled: ({ state }) => {
    if (!state.engine) return 'The engine is still starting.';
    if (!state.shownDocument) return 'There is no valid model to sweep yet.';
    return state.sweepSelection !== null || 'Choose a parameter to sweep in the range strip first.';
  },
  perform: ({ state }) => state.engine?.sweep(),
};
