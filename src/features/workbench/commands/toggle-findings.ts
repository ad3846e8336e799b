import type { Command } from './command';

export const toggleFindings: Command = {
  id: 'toggle-findings',
  label: 'Show or hide the findings',
  group: 'View',
  shortcut: 'Alt+F',
  isEnabled: () => true,
  perform: ({ toggleFindings: toggle }) => toggle(),
};
