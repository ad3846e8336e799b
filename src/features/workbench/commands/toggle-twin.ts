import type { Command } from './command';

export const toggleTwin: Command = {
  id: 'toggle-twin',
  label: ({ state }) => (state.document.view.showTwin ? 'Hide the pooled twin' : 'Show the pooled twin'),
  group: 'View',
  shortcut: 'Alt+T',
  isEnabled: () => true,
  perform: ({ state }) =>
    state.edit('Show the pooled twin', (document) => ({
      ...document,
      view: { ...document.view, showTwin: !document.view.showTwin },
    })),
};
