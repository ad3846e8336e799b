import type { Command } from './command';

export const poolClasses: Command = {
  id: 'pool-classes',
  label: 'Turn the spread to 0 (pool the classes)',
  group: 'Explore',
  shortcut: 'Alt+0',
  isEnabled: ({ state }) => state.document.spread !== 0 || 'The spread is 0 already.',
  perform: ({ state }) => state.edit('Turn the spread to 0', (document) => ({ ...document, spread: 0 })),
};
