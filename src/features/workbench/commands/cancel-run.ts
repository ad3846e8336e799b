import type { Command } from './command';

export const cancelRun: Command = {
  id: 'cancel-run',
  label: 'Cancel the computation',
  group: 'Explore',
  shortcut: null,
  isEnabled: ({ state }) => state.job !== null || 'Nothing is being computed.',
  perform: ({ state }) => state.engine?.cancel(),
};
