import type { PresetDocument, Quantity } from '@/engine/schema/preset';
import { classQuantity } from '@/graphics/quantities';

import { listClassNames } from '../views/view-input';

/** Axes of a space: as chosen, else the first three classes, or the parameter and classes of two populations. */
export function spaceAxes(
  model: PresetDocument,
  view: 'space' | 'space-diagram',
  chosen: readonly Quantity[],
  parameter: string | null,
): readonly [Quantity, Quantity, Quantity] | null {
  const classes = listClassNames(model);
  const [first] = classes;
  // Classes of one population often move as one; those of two open up a cycle.
  const second = classes.find((one) => one.population !== first?.population) ?? classes[1];
  if (!first || !second) return null;
  const symbols = classes.map((one) => one.symbol);
  const known = (quantity: Quantity | undefined) => {
    if (!quantity) return null;
    if (quantity.quantity === 'class' || quantity.quantity === 'proportion')
      return symbols.includes(quantity.of) ? quantity : null;
    return quantity;
  };
  const time: Quantity = { quantity: 'time', of: '', logarithm: false };
  const nth = (k: number) => (symbols[k] ? classQuantity(symbols[k]) : time);
  if (view === 'space')
    return [known(chosen[0]) ?? nth(0), known(chosen[1]) ?? nth(1), known(chosen[2]) ?? nth(2)];
  if (!parameter) return null;
  return [
    { quantity: 'parameter', of: parameter, logarithm: false },
    known(chosen[0]) ?? classQuantity(first.symbol),
    known(chosen[1]) ?? classQuantity(second.symbol),
  ];
}
