import type { Command } from './command';

export const pictureTable: Command = {
  id: 'picture-table',
  label: 'Table of the full picture',
  group: 'Explore',
  shortcut: null,
  isEnabled: ({ state }) => state.picture !== null || 'Run the sweep or the full picture first.',
  perform: ({ openDialog }) => openDialog('picture'),
};
