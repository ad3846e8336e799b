import { useCommentsUi } from '../comments/comments-ui';
import { useBenchUi } from '../layout/bench-ui';
import type { Command } from './command';

export const comments: Command = {
  id: 'comments',
  label: 'Comments',
  group: 'Keep and share',
  shortcut: null,
  isEnabled: ({ state: { origin } }) =>
    origin.kind !== 'preset'
      ? 'Only saved presets have comments.'
      : !origin.starter || 'Starter presets have no comments. Comment on a copy of your own.',
  perform: () => {
    useBenchUi.getState().set({ findingsOpen: true, sheet: 'findings' });
    useCommentsUi.getState().set({ open: true });
  },
};
