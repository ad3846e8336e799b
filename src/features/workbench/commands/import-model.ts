import type { Command } from './command';

export const importModel: Command = {
  id: 'import',
  label: 'Import a preset document',
  group: 'Keep and share',
  shortcut: null,
  isEnabled: ({ readOnly, state }) =>
    state.origin.kind === 'assigned'
      ? 'An assigned sweep keeps the model that was set.'
      : !readOnly || 'A model is edited on a wider screen.',
  perform: ({ openDialog }) => openDialog('import'),
};
