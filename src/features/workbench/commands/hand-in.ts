import type { Command } from './command';

export const handIn: Command = {
  id: 'hand-in',
  label: 'Hand in the assigned sweep',
  group: 'Keep and share',
  shortcut: null,
  isEnabled: ({ state }) => {
    if (!state.assigned) return 'This is no assigned sweep.';
    return state.assigned.task.state === 'open' || 'This sweep is closed.';
  },
  perform: ({ openDialog }) => openDialog('hand-in'),
};
