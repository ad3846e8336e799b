import { describe, expect, it } from 'vitest';

import { showPin } from '@/features/workbench/comments/points';
import { createWorkbenchStore } from '@/features/workbench/state/store';

import { twoSexes } from './support';

const PIN = { model: 'split', kind: 'fold', parameter: 'K', value: 1.25 } as const;

describe('a pinned comment', () => {
  it('moves the bench to its point as one step that can be undone', () => {
    const store = createWorkbenchStore(twoSexes(), { kind: 'new' });
    expect(showPin(store, PIN)).toBeNull();
    expect(store.getState().document.parameters[0]?.value).toBe(1.25);
    store.getState().undo();
    expect(store.getState().document.parameters[0]?.value).toBe(3);
  });

  it('says so where the model has no such parameter any more', () => {
    const store = createWorkbenchStore(twoSexes(), { kind: 'new' });
    expect(showPin(store, { ...PIN, parameter: 'gone' })).toContain('no gone');
    expect(store.getState().document).toEqual(twoSexes());
    expect(store.getState().past).toHaveLength(0);
  });
});
