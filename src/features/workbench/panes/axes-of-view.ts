import type { PaneView, PresetDocument, Quantity } from '@/engine/schema/preset';
import { nameQuantity, stateQuantities, totalQuantity, type NamedQuantity } from '@/graphics/quantities';

import { planeAxes } from './views/plane-spec';
import { listClassNames } from './views/view-input';
import { spaceAxes } from './space/space-axes';

export interface AxisOption {
  readonly label: string;
  readonly value: Quantity;
  readonly choices: readonly NamedQuantity[];
  readonly allowLogarithm?: boolean;
}

const every = (quantity: 'class' | 'total' | 'proportion', name: string): NamedQuantity => ({
  quantity: { quantity, of: '', logarithm: false },
  name,
  unit: '',
});

/** Which axes a view lets one choose, with what they are now. */
export function axisOptions(
  model: PresetDocument,
  view: PaneView,
  axes: readonly Quantity[],
  parameter: string | null,
): readonly AxisOption[] {
  const states = stateQuantities(model);
  const split = model.populations.some((one) => one.classes.length > 1);
  if (view === 'trajectories')
    return [
      {
        label: 'show',
        value: axes[0] ?? { quantity: 'class', of: '', logarithm: false },
        choices: [
          every('class', 'classes'),
          ...(split ? [every('total', 'totals'), every('proportion', 'shares')] : []),
        ],
      },
    ];
  if (view === 'plane') {
    const pair = planeAxes(listClassNames(model), axes);
    if (!pair) return [];
    return [
      { label: 'across', value: pair[0], choices: states },
      { label: 'up', value: pair[1], choices: states },
    ];
  }
  if (view === 'diagram')
    return [
      {
        label: 'show',
        value: axes[0] ?? totalQuantity(model.populations.at(-1)?.symbol ?? ''),
        choices: [
          ...totals(model, states),
          every('class', 'every class'),
          nameQuantity(model, { quantity: 'period', of: '', logarithm: false }),
        ],
      },
    ];
  if (view === 'space' || view === 'space-diagram') {
    const three = spaceAxes(model, view, axes, parameter);
    if (!three) return [];
    const time = nameQuantity(model, { quantity: 'time', of: '', logarithm: false });
    const swept = parameter
      ? [nameQuantity(model, { quantity: 'parameter', of: parameter, logarithm: false })]
      : [];
    const choices = view === 'space' ? [...states, time, ...swept] : states;
    const shown = view === 'space' ? three : three.slice(1);
    const labels = view === 'space' ? ['x', 'y', 'z'] : ['across', 'up'];
    return shown.map((value, k) => ({ label: labels[k] ?? '', value, choices }));
  }
  return [];
}

/** Totals of single classes are those classes, and have no entry of their own among the states. */
function totals(model: PresetDocument, states: readonly NamedQuantity[]): readonly NamedQuantity[] {
  const alone = model.populations
    .filter((one) => one.classes.length === 1)
    .map((one) => nameQuantity(model, totalQuantity(one.symbol)));
  const single = new Set(
    model.populations.filter((one) => one.classes.length === 1).map((one) => one.classes[0]?.symbol),
  );
  const rest = states.filter((one) => !(one.quantity.quantity === 'class' && single.has(one.quantity.of)));
  return [
    ...alone,
    ...rest.filter((one) => one.quantity.quantity !== 'proportion' || one.quantity.of !== ''),
  ];
}
