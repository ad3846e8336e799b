import type { PaneView, PresetDocument, Quantity } from '@/engine/schema/preset';

import type { Arrangement } from '../state/store';

export interface PaneSettings {
  readonly view: PaneView;
  readonly axes: readonly Quantity[];
}

export const VIEW_NAMES: Readonly<Record<PaneView, string>> = {
  trajectories: 'Trajectories',
  plane: 'Phase plane',
  space: 'Phase space',
  diagram: 'Sweep',
  'space-diagram': 'Sweep in space',
  'two-parameters': 'Two parameters',
  'long-run': 'Long run',
  processes: 'Processes',
  equations: 'Equations',
};

export const ARRANGEMENTS: readonly { readonly value: Arrangement; readonly label: string }[] = [
  { value: 'explore', label: 'Explore' },
  { value: 'sweep', label: 'Sweep' },
  { value: 'two-parameters', label: 'Two parameters' },
  { value: 'long-run', label: 'Long run' },
  { value: 'model', label: 'Model' },
];

export const MOST_PANES = 4;
const pane = (view: PaneView): PaneSettings => ({ view, axes: [] });

/** Panes of an arrangement: the document's own for exploring, else what suits the number of classes. */
export function defaultPanes(document: PresetDocument, arrangement: Arrangement): readonly PaneSettings[] {
  const classes = document.populations.reduce((sum, one) => sum + one.classes.length, 0);
  if (arrangement === 'model') return [pane('processes'), pane('equations')];
  if (arrangement === 'long-run') return [pane('long-run'), pane('trajectories')];
  if (arrangement === 'two-parameters') return [pane('two-parameters'), pane('diagram')];
  if (arrangement === 'sweep')
    return classes > 1 ? [pane('diagram'), pane('space-diagram')] : [pane('diagram')];
  if (document.view.panes.length > 0) return document.view.panes;
  const diagram = document.sweeps.length > 0 ? [pane('diagram')] : [];
  if (classes < 2) return [pane('trajectories'), ...diagram];
  return [pane(classes === 2 ? 'plane' : 'space'), pane('trajectories'), ...diagram];
}
