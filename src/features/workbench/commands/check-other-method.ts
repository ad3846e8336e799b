import type { Command } from './command';

export const checkOtherMethod: Command = {
  id: 'check-other-method',
  label: 'Check the trajectory with the other method',
  group: 'Explore',
  shortcut: null,
  isEnabled: ({ state }) => (state.engine && state.result ? true : 'There is no trajectory yet.'),
  perform: ({ state }) => state.engine?.secondOpinion(),
};
