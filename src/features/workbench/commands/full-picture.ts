import type { Command } from './command';

export const fullPicture: Command = {
  id: 'full-picture',
  label: 'Full picture: equilibria, branches and cycles',
  group: 'Explore',
  shortcut: 'Alt+P',
  isEnabled: ({ state }) => {
    if (!state.engine) return 'The engine is still starting.';
    if (!state.shownDocument) return 'There is no valid model to draw a picture of yet.';
    return state.sweepSelection !== null || 'Choose a parameter in the range strip first.';
  },
  perform: ({ state }) => {
    state.set({ arrangement: 'sweep' });
    state.engine?.picture();
  },
};
