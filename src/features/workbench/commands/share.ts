import { refuseShare } from '../dialogs/saving-rules';
import type { Command } from './command';

export const share: Command = {
  id: 'share',
  label: 'Share',
  group: 'Keep and share',
  shortcut: null,
  isEnabled: ({ state }) => refuseShare(state) ?? true,
  perform: ({ openDialog }) => openDialog('share'),
};
