import type { Command } from './command';

export const exportModel: Command = {
  id: 'export',
  label: 'Export the preset or a study',
  group: 'Keep and share',
  shortcut: 'Mod+E',
  isEnabled: () => true,
  perform: ({ openDialog }) => openDialog('export'),
};
