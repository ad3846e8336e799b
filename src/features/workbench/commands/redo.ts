import type { Command } from './command';

export const redo: Command = {
  id: 'redo',
  label: ({ state }) => (state.future[0] ? `Redo: ${state.future[0].label}` : 'Redo'),
  group: 'Edit',
  shortcut: 'Mod+Shift+Z',
  isEnabled: ({ state }) => state.future.length > 0 || 'There is nothing to redo.',
  perform: ({ state }) => state.redo(),
};
