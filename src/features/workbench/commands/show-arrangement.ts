import type { Arrangement } from '../state/store';
import type { Command } from './command';

function showArrangement(arrangement: Arrangement, label: string): Command {
  return {
    id: `show-${arrangement}`,
    label: `Arrange the panes: ${label}`,
    group: 'View',
    shortcut: null,
    isEnabled: ({ state }) => state.arrangement !== arrangement || 'The panes stand like this already.',
    perform: ({ state }) => state.set({ arrangement }),
  };
}

export const showExplore = showArrangement('explore', 'explore');
export const showSweep = showArrangement('sweep', 'sweep');
export const showTwoParameters = showArrangement('two-parameters', 'two parameters');
export const showLongRun = showArrangement('long-run', 'long run');
export const showModel = showArrangement('model', 'model');
