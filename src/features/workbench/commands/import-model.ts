import type { Command } from './command';

export const importModel: Command = {
  id: 'import',
  label: 'Import a preset document',
  group: 'Keep and share',
  shortcut: null,
  isEnabled: ({ readOnly }) => !readOnly || 'A model is edited on a wider screen.',
  perform: ({ openDialog }) => openDialog('import'),
};
