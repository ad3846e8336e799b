import type { Command } from './command';

export const typeEquations: Command = {
  id: 'type-equations',
  label: 'Type equations as text',
  group: 'Model',
  shortcut: null,
  isEnabled: ({ readOnly }) => !readOnly || 'A model is edited on a wider screen.',
  perform: ({ openDialog }) => openDialog('equations'),
};
