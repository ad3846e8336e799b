import { LIMITS } from '@/engine/schema/limits';

import { addParameter as add } from '../rail/parameters/parameter-edits';
import { jumpToField } from '../rail/rail-state';
import type { Command } from './command';

export const addParameter: Command = {
  id: 'add-parameter',
  label: 'Add a parameter',
  group: 'Model',
  shortcut: null,
  isEnabled: ({ state, readOnly }) => {
    if (readOnly) return 'A model is edited on a wider screen.';
    const { length } = state.document.parameters;
    return length < LIMITS.parameters || `A model holds at most ${LIMITS.parameters} parameters.`;
  },
  perform: ({ state }) => {
    const index = state.document.parameters.length;
    state.edit('Add parameter', (document) => add(document, 'p', ''));
    jumpToField(['parameters', index]);
  },
};
