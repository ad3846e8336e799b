import { refuseSave } from '../dialogs/saving-rules';
import type { Command } from './command';

export const saveVersion: Command = {
  id: 'save-version',
  label: 'Save version',
  group: 'Keep and share',
  shortcut: 'Mod+S',
  isEnabled: ({ state, signedIn }) => refuseSave(state, signedIn) ?? true,
  perform: ({ openDialog }) => openDialog('save'),
};
