import type { Command } from './command';
import { boundariesTask } from '../engine/two-parameter-tasks';

const NEEDS_SWEEP = 'Choose a parameter on the range strip first; it lies across.';

export const traceBoundaries: Command = {
  id: 'trace-boundaries',
  label: 'Trace the special points in two parameters',
  group: 'Explore',
  shortcut: null,
  isEnabled: ({ state }) => boundariesTask(state) !== null || NEEDS_SWEEP,
  perform: ({ state }) => {
    state.set({ arrangement: 'two-parameters' });
    state.engine?.traceBoundaries();
  },
};

export const computeMap: Command = {
  id: 'compute-map',
  label: 'Compute the map over two parameters',
  group: 'Explore',
  shortcut: null,
  isEnabled: ({ state }) => boundariesTask(state) !== null || NEEDS_SWEEP,
  perform: ({ state }) => {
    state.set({ arrangement: 'two-parameters' });
    state.engine?.computeMap();
  },
};
