import { act, screen } from '@testing-library/react';
import { describe, expect, it } from 'vitest';

import { TraitSection } from '@/features/workbench/rail/traits/trait-section';

import { renderOnBench } from './support';

const cell = (name: string) => screen.getByRole('textbox', { name });

describe('trait table', () => {
  it('takes numbers as people type them and moves like a table', async () => {
    const { user, model, store } = renderOnBench(<TraitSection />);
    await user.click(cell('Mortality of male weasels'));
    await user.keyboard('0,35{Enter}');
    expect(model().traits[0]?.entries[0]?.value).toBe(0.35);
    expect(cell('Mortality of female weasels')).toHaveFocus();
    await user.keyboard('{ArrowRight}');
    expect(cell('Share of births of female weasels')).toHaveFocus();
    await user.keyboard('{ArrowUp}');
    expect(cell('Share of births of male weasels')).toHaveFocus();
    expect(store.getState().past.map((one) => one.label)).toEqual(['Change Mortality of male weasels']);
  });

  it('brings back what was there on Escape', async () => {
    const { user, model } = renderOnBench(<TraitSection />);
    await user.type(cell('Mortality of male weasels'), '9{Escape}');
    expect(cell('Mortality of male weasels')).toHaveValue('0.4');
    expect(model().traits[0]?.entries[0]?.value).toBe(0.4);
  });

  it('keeps what it does not understand and says why', async () => {
    const { user, model } = renderOnBench(<TraitSection />);
    await user.clear(cell('Mortality of male weasels'));
    await user.keyboard('1,234{Tab}');
    expect(cell('Mortality of male weasels')).toHaveValue('1,234');
    expect(cell('Mortality of male weasels')).toHaveAccessibleDescription(/could mean 1\.234 or 1234/);
    await user.clear(cell('Mortality of male weasels'));
    await user.keyboard('-1{Enter}');
    expect(cell('Mortality of male weasels')).toHaveAccessibleDescription(/cannot be below 0/);
    expect(model().traits[0]?.entries[0]?.value).toBe(0.4);
  });

  it('marks shares that do not sum to 1 and scales them', async () => {
    const { user, model } = renderOnBench(<TraitSection />);
    await user.clear(cell('Share of births of male weasels'));
    await user.keyboard('0.7{Enter}');
    expect(cell('Share of births of male weasels')).toBeInvalid();
    expect(screen.getByText(/Share of births of Weasels sums to/)).toHaveTextContent('1.2');
    await user.click(screen.getByRole('button', { name: 'Scale to 1' }));
    expect(model().traits[1]?.entries.map((one) => one.value)).toEqual([0.7 / 1.2, 0.5 / 1.2]);
    expect(screen.queryByText(/sums to/)).toBeNull();
  });

  it('enters a rate as survival over a period and shows both', async () => {
    const { user, model } = renderOnBench(<TraitSection />);
    await user.click(cell('Mortality of male weasels'));
    await user.keyboard('{Alt>}{Enter}{/Alt}');
    await user.selectOptions(screen.getByRole('combobox', { name: 'Entered' }), 'As survival over a period');
    await user.clear(screen.getByRole('textbox', { name: 'Survives' }));
    await user.keyboard('0.5{Enter}');
    const entry = model().traits[0]?.entries[0];
    expect(entry?.survival).toEqual({ fraction: 0.5, period: 1 });
    expect(entry?.value).toBeCloseTo(Math.LN2, 14);
    expect(screen.getByText('0.69315')).toBeInTheDocument();
    await user.clear(screen.getByRole('textbox', { name: 'Survives' }));
    await user.keyboard('2{Enter}');
    expect(screen.getByRole('textbox', { name: 'Survives' })).toHaveAccessibleDescription(/at most 1/);
  });

  it('adds a common trait for the classes of a split population', async () => {
    const { user, model } = renderOnBench(<TraitSection />);
    await user.click(screen.getByRole('button', { name: 'Trait' }));
    await user.selectOptions(screen.getByRole('combobox', { name: 'Trait' }), 'Maturation');
    await user.click(screen.getByRole('button', { name: 'Add trait' }));
    const added = model().traits.at(-1);
    expect(added?.entries.map((one) => one.of)).toEqual([['y1'], ['y2']]);
    expect(added).toMatchObject({ unit: '1/year', followsSpread: false, role: 'maturation' });
  });

  it('renames a trait in every formula and refuses a taken symbol', async () => {
    const { user, model } = renderOnBench(<TraitSection />);
    await user.click(screen.getByRole('button', { name: /Mortality m/ }));
    const symbol = screen.getByRole('textbox', { name: 'Symbol' });
    await user.clear(symbol);
    await user.type(symbol, 'q{Enter}');
    expect(symbol).toHaveAccessibleDescription(/already|taken/);
    await user.clear(symbol);
    await user.type(symbol, 'mu{Enter}');
    expect(model().processes[1]?.rate).toBe('mu_y1*y1');
  });

  it('is one step of undo an edit', async () => {
    const { user, model, store } = renderOnBench(<TraitSection />);
    await user.clear(cell('Mortality of male weasels'));
    await user.keyboard('0.3{Enter}');
    act(() => store.getState().undo());
    expect(model().traits[0]?.entries[0]?.value).toBe(0.4);
    expect(cell('Mortality of male weasels')).toHaveValue('0.4');
  });
});
