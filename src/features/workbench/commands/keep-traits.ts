import type { Command } from './command';

export const keepTraits: Command = {
  id: 'keep-traits',
  label: 'Turn the spread to 1 (traits as entered)',
  group: 'Explore',
  shortcut: 'Alt+1',
  isEnabled: ({ state }) => state.document.spread !== 1 || 'The spread is 1 already.',
  perform: ({ state }) => state.edit('Turn the spread to 1', (document) => ({ ...document, spread: 1 })),
};
