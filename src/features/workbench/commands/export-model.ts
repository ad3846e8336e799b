import { refuseCopy } from '../dialogs/saving-rules';
import type { Command } from './command';

export const exportModel: Command = {
  id: 'export',
  label: 'Export the preset or a study',
  group: 'Keep and share',
  shortcut: 'Mod+E',
  isEnabled: ({ state }) => refuseCopy(state) ?? true,
  perform: ({ openDialog }) => openDialog('export'),
};
