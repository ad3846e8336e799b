import type { Command } from './command';

export const versionHistory: Command = {
  id: 'version-history',
  label: 'Version history and comparison',
  group: 'Keep and share',
  shortcut: 'Mod+Shift+H',
  isEnabled: ({ state }) => state.origin.kind === 'preset' || 'Only saved presets have versions.',
  perform: ({ openDialog }) => openDialog('history'),
};
