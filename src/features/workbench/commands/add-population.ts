import { addPopulation as add } from '@/engine/schema/edit';
import { LIMITS } from '@/engine/schema/limits';

import { jumpToField } from '../rail/rail-state';
import type { Command } from './command';

export const addPopulation: Command = {
  id: 'add-population',
  label: 'Add a population',
  group: 'Model',
  shortcut: null,
  isEnabled: ({ state, readOnly }) => {
    if (readOnly) return 'A model is edited on a wider screen.';
    const { length } = state.document.populations;
    return length < LIMITS.populations || `A model holds at most ${LIMITS.populations} populations.`;
  },
  perform: ({ state }) => {
    const index = state.document.populations.length;
    state.edit('Add population', (document) => add(document, '', 'N'));
    jumpToField(['populations', index]);
  },
};
