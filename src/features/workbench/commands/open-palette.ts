import type { Command } from './command';

export const openPalette: Command = {
  id: 'open-palette',
  label: 'All commands',
  group: 'View',
  shortcut: 'Mod+K',
  isEnabled: () => true,
  perform: ({ openDialog }) => openDialog('palette'),
};
