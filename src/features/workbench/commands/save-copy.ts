import { refuseCopy } from '../dialogs/saving-rules';
import type { Command } from './command';

export const saveCopy: Command = {
  id: 'save-copy',
  label: 'Save as a copy',
  group: 'Keep and share',
  shortcut: 'Mod+Shift+S',
  isEnabled: ({ state, signedIn }) =>
    refuseCopy(state) ?? (signedIn || 'Sign in to keep presets of your own.'),
  perform: ({ openDialog }) => openDialog('save-copy'),
};
