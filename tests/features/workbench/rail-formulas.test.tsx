import { act, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';

import type { Diagnostic, ModelReport } from '@/engine/system/contract';
import { ModelRail } from '@/features/workbench/rail';

import { renderOnBench } from './support';

function reportWith(diagnostics: readonly Diagnostic[]): ModelReport {
  return {
    diagnostics,
    valid: diagnostics.every((one) => one.severity !== 'error'),
    autonomous: true,
    smooth: true,
    deterministicOnly: false,
    harvested: false,
    parameters: [],
    twin: { kind: 'no-split', reason: '', pooledTraits: [], leftTraits: [] },
    spreadLimits: [
      {
        key: 'dial:spread',
        from: 0,
        to: 1.5,
        fromReason: 'pooled',
        toReason: 'mortality of females would become negative',
      },
    ],
    equations: [],
    intermediates: [],
    diagram: { nodes: [], arrows: [] },
    constantsOfMotion: [],
    backend: 'closure',
  };
}

describe('model rail', () => {
  it('marks a mistake at its field and mends it by one click', async () => {
    const { user, store, model } = renderOnBench(<ModelRail />);
    const rate = screen.getByRole('textbox', { name: 'Rate of Deaths of males' });
    await user.clear(rate);
    await user.type(rate, 'm_y3*y1');
    const problem: Diagnostic = {
      severity: 'error',
      path: ['processes', 1, 'rate'],
      range: { from: 0, to: 4 },
      message: 'm_y3 is not known.',
      suggestion: 'm_y1',
    };
    act(() => store.getState().set({ report: reportWith([problem]) }));
    expect(rate).toBeInvalid();
    expect(rate).toHaveAccessibleDescription(/m_y3 is not known/);
    expect(screen.queryByText(/last valid model/)).toBeNull();
    act(() => store.getState().set({ shownReport: reportWith([]) }));
    expect(screen.getByText(/last valid model/)).toBeInTheDocument();
    await user.click(screen.getByRole('button', { name: /Did you mean m_y1/ }));
    expect(model().processes[1]?.rate).toBe('m_y1*y1');
  });

  it('takes typing in one field as one step of undo', async () => {
    const { user, store, model } = renderOnBench(<ModelRail />);
    const rate = screen.getByRole('textbox', { name: 'Rate of Deaths of males' });
    await user.type(rate, ' + 1');
    expect(model().processes[1]?.rate).toBe('m_y1*y1 + 1');
    expect(store.getState().past).toHaveLength(1);
    await user.keyboard('{Escape}');
    expect(model().processes[1]?.rate).toBe('m_y1*y1');
  });

  it('renames a class everywhere', async () => {
    const { user, model } = renderOnBench(<ModelRail />);
    const symbol = screen.getByRole('textbox', { name: 'Symbol of Males' });
    await user.clear(symbol);
    await user.type(symbol, 'male{Enter}');
    expect(model().processes[1]?.rate).toBe('m_male*male');
    expect(model().traits[0]?.entries[0]?.of).toEqual(['male']);
  });

  it('says where the spread ends and why', async () => {
    const { user, store, model } = renderOnBench(<ModelRail />);
    act(() => store.getState().set({ report: reportWith([]) }));
    const value = screen.getByRole('textbox', { name: 'Spread, value' });
    await user.clear(value);
    await user.type(value, '1.8{Enter}');
    expect(value).toHaveAccessibleDescription(/ends at 1\.5: mortality of females would become negative/);
    await user.clear(value);
    await user.type(value, '0{Enter}');
    expect(model().spread).toBe(0);
  });

  it('writes a process from a template with a preview', async () => {
    const { user, model } = renderOnBench(<ModelRail />);
    await user.click(screen.getByRole('button', { name: 'Add process' }));
    await user.click(screen.getByRole('menuitem', { name: 'Deaths' }));
    await user.selectOptions(screen.getByRole('combobox', { name: 'Population' }), 'Weasels');
    expect(screen.getByRole('region', { name: 'Preview' })).toHaveTextContent('m_y2*y2');
    await user.click(screen.getByRole('button', { name: 'Add' }));
    expect(model().processes.map((one) => one.rate)).toContain('m_y2*y2');
  });

  it('adds a population, and a class that inherits the traits of the last', async () => {
    const { user, model } = renderOnBench(<ModelRail />);
    await user.click(screen.getByRole('button', { name: 'Add class to Weasels' }));
    expect(model().populations[1]?.classes).toHaveLength(3);
    expect(model().traits[0]?.entries).toHaveLength(3);
    await user.click(screen.getByRole('button', { name: 'Add population' }));
    expect(model().populations).toHaveLength(3);
  });
});
