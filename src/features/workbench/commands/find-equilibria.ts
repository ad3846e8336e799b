import type { Command } from './command';

export const findEquilibria: Command = {
  id: 'find-equilibria',
  label: 'Search for all equilibria',
  group: 'Explore',
  shortcut: 'Alt+E',
  isEnabled: ({ state }) => {
    if (!state.engine) return 'The engine is still starting.';
    return state.shownDocument !== null || 'There is no valid model yet.';
  },
  perform: ({ state }) => state.engine?.findEquilibria(),
};
