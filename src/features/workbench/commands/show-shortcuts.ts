import type { Command } from './command';

export const showShortcuts: Command = {
  id: 'show-shortcuts',
  label: 'Keyboard shortcuts',
  group: 'View',
  shortcut: '?',
  isEnabled: () => true,
  perform: ({ openDialog }) => openDialog('shortcuts'),
};
