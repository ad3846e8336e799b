import { render } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import type { ReactNode } from 'react';

import { createPreset } from '@/engine/schema/create';
import type { PresetDocument } from '@/engine/schema/preset';
import { createWorkbenchStore, WorkbenchContext, type Origin } from '@/features/workbench/state/store';

/** Prey and a consumer of two sexes, small enough to read in a test. */
export function twoSexes(): PresetDocument {
  return createPreset({
    title: 'Voles and weasels',
    timeUnit: 'year',
    densityUnit: 'ha^-1',
    populations: [
      { symbol: 'x', name: 'Voles', hue: 'weld', classes: [{ symbol: 'x', name: 'Voles', start: 2 }] },
      {
        symbol: 'y',
        name: 'Weasels',
        hue: 'woad',
        classes: [
          { symbol: 'y1', name: 'Males', shade: 0, start: 0.5 },
          { symbol: 'y2', name: 'Females', shade: 1, start: 0.5 },
        ],
      },
    ],
    traits: [
      {
        symbol: 'm',
        name: 'Mortality',
        unit: '1/year',
        role: 'mortality',
        entries: [
          { of: ['y1'], value: 0.4 },
          { of: ['y2'], value: 0.2 },
        ],
      },
      {
        symbol: 'q',
        name: 'Share of births',
        unit: '',
        role: 'share-of-births',
        domain: 'share',
        followsSpread: false,
        entries: [
          { of: ['y1'], value: 0.5 },
          { of: ['y2'], value: 0.5 },
        ],
      },
    ],
    parameters: [{ symbol: 'K', name: 'Carrying capacity', value: 3, min: 0.5, max: 6, unit: 'ha^-1' }],
    processes: [
      {
        id: 'births',
        name: 'Births of voles',
        kind: 'birth',
        rate: 'x*(1 - x/K)',
        effects: [{ class: 'x', amount: '1' }],
        signed: true,
      },
      {
        id: 'deaths',
        name: 'Deaths of males',
        kind: 'death',
        rate: 'm_y1*y1',
        effects: [{ class: 'y1', amount: '-1' }],
      },
    ],
  });
}

export function renderOnBench(children: ReactNode, document = twoSexes(), origin: Origin = { kind: 'new' }) {
  const store = createWorkbenchStore(document, origin);
  const user = userEvent.setup();
  const view = render(<WorkbenchContext value={store}>{children}</WorkbenchContext>);
  return { store, user, ...view, model: () => store.getState().document };
}
