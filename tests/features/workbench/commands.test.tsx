import { act, fireEvent, screen } from '@testing-library/react';
import { useState } from 'react';
import { afterEach, describe, expect, it } from 'vitest';

import { run, type CommandContext } from '@/features/workbench/commands/command';
import { COMMANDS } from '@/features/workbench/commands/index';
import { matchesShortcut } from '@/features/workbench/commands/shortcut';
import { useShortcuts } from '@/features/workbench/commands/use-shortcuts';
import { saveVersion } from '@/features/workbench/commands/save-version';
import { isDirty } from '@/features/workbench/dialogs/saving-rules';
import { useBenchUi } from '@/features/workbench/layout/bench-ui';
import { TraitSection } from '@/features/workbench/rail/traits/trait-section';
import { readSweep, writeSweep } from '@/features/workbench/layout/use-view-in-url';
import { useWorkbenchStore, type Origin } from '@/features/workbench/state/store';

import { renderOnBench, twoSexes } from './support';

const preset = (rights: Extract<Origin, { kind: 'preset' }>['rights']): Origin => ({
  kind: 'preset',
  id: 'p1',
  version: 3,
  rights,
  labName: null,
  starter: false,
});

function Bench() {
  const store = useWorkbenchStore();
  const [context] = useState(() => (): CommandContext => ({
    state: store.getState(),
    signedIn: true,
    readOnly: false,
    openDialog: (dialog) => useBenchUi.getState().set({ dialog }),
    navigate: () => undefined,
    toggleRail: () => undefined,
    toggleFindings: () => undefined,
  }));
  useShortcuts(context);
  return <TraitSection />;
}

afterEach(() => useBenchUi.getState().set({ dialog: null, notice: null }));

describe('commands', () => {
  it('have ids and shortcuts of their own', () => {
    const ids = COMMANDS.map((one) => one.id);
    const shortcuts = COMMANDS.flatMap((one) => one.shortcut ?? []);
    expect(new Set(ids).size).toBe(ids.length);
    expect(new Set(shortcuts).size).toBe(shortcuts.length);
  });

  it('undo and redo by keys, also from within a cell', async () => {
    const { user, model } = renderOnBench(<Bench />);
    const cell = screen.getByRole('textbox', { name: 'Mortality of male weasels' });
    await user.clear(cell);
    await user.keyboard('0.3{Enter}');
    expect(model().traits[0]?.entries[0]?.value).toBe(0.3);
    await user.keyboard('{Control>}z{/Control}');
    expect(model().traits[0]?.entries[0]?.value).toBe(0.4);
    await user.keyboard('{Control>}{Shift>}z{/Shift}{/Control}');
    expect(model().traits[0]?.entries[0]?.value).toBe(0.3);
  });

  it('leave undo to text that is still being typed', async () => {
    const { user, store } = renderOnBench(<Bench />);
    act(() => store.getState().edit('Turn the spread', (document) => ({ ...document, spread: 0.5 })));
    const cell = screen.getByRole('textbox', { name: 'Mortality of male weasels' });
    await user.type(cell, '7');
    fireEvent.keyDown(cell, { key: 'z', ctrlKey: true });
    expect(store.getState().document.spread).toBe(0.5);
  });

  it('say why they cannot be done', async () => {
    const { user } = renderOnBench(<Bench />, twoSexes(), preset(['view', 'save']));
    await user.keyboard('{Control>}s{/Control}');
    expect(useBenchUi.getState()).toMatchObject({
      dialog: null,
      notice: 'Nothing has changed since it was saved.',
    });
  });

  it('count an edit and its reverse as nothing to save', async () => {
    const { store } = renderOnBench(null, twoSexes(), preset(['view', 'save']));
    const spread = (value: number) =>
      store.getState().edit('Turn the spread', (document) => ({ ...document, spread: value }));
    spread(0.5);
    expect(isDirty(store.getState())).toBe(true);
    spread(1);
    expect(store.getState().document).not.toBe(store.getState().saved);
    expect(isDirty(store.getState())).toBe(false);
  });

  it('open the save dialog only for those who may save', () => {
    const opened: string[] = [];
    const attempt = (origin: Origin, signedIn = true) => {
      const { store, unmount } = renderOnBench(null, twoSexes(), origin);
      store.getState().edit('Turn the spread', (document) => ({ ...document, spread: 0.5 }));
      const reason = run(saveVersion, {
        state: store.getState(),
        signedIn,
        readOnly: false,
        openDialog: (name) => opened.push(name),
        navigate: () => undefined,
        toggleRail: () => undefined,
        toggleFindings: () => undefined,
      });
      unmount();
      return reason;
    };
    expect(attempt(preset(['view', 'save']))).toBeNull();
    expect(attempt(preset(['view']))).toMatch(/save a copy/);
    expect(attempt({ kind: 'shared', token: 'x', signedIn: false, mayCopy: true }, false)).toMatch(/Sign in/);
    expect(opened).toEqual(['save']);
  });

  it('keep plain characters for typing', () => {
    expect(matchesShortcut(new KeyboardEvent('keydown', { key: '?', shiftKey: true }), '?')).toBe(true);
    expect(matchesShortcut(new KeyboardEvent('keydown', { key: 'z', ctrlKey: true }), 'Mod+Shift+Z')).toBe(
      false,
    );
  });
});

describe('view in the address', () => {
  it('reads back the sweep it writes, dials included', () => {
    for (const parameter of ['K', 'dial:spread', 'dial:m'])
      for (const [from, to] of [
        [-0.5, 2],
        [1e-9, 1e9],
      ] as const) {
        const selection = { parameter, from, to };
        expect(readSweep(writeSweep(selection))).toEqual(selection);
      }
  });

  it('ignores what is not a sweep', () => {
    expect([null, '', 'K', 'K:1', 'K:2:1', 'K:a:b'].map(readSweep)).toEqual(Array(6).fill(null));
  });
});
