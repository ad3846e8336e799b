import type { Command } from './command';

export const undo: Command = {
  id: 'undo',
  label: ({ state }) => {
    const last = state.past.at(-1);
    return last ? `Undo: ${last.label}` : 'Undo';
  },
  group: 'Edit',
  shortcut: 'Mod+Z',
  isEnabled: ({ state }) => state.past.length > 0 || 'There is nothing to undo.',
  perform: ({ state }) => state.undo(),
};
