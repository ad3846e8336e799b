import type { Command } from './command';

export const toggleRail: Command = {
  id: 'toggle-rail',
  label: 'Show or hide the model',
  group: 'View',
  shortcut: 'Alt+M',
  isEnabled: () => true,
  perform: ({ toggleRail: toggle }) => toggle(),
};
