import type { PresetDocument, Quantity } from '@/engine/schema/preset';
import { classQuantity } from '@/graphics/quantities';

import { listClassNames } from '../views/view-input';

/** Axes of a space: as chosen, else the first three classes, or the parameter and two classes. */
export function spaceAxes(
  model: PresetDocument,
  view: 'space' | 'space-diagram',
  chosen: readonly Quantity[],
  parameter: string | null,
): readonly [Quantity, Quantity, Quantity] | null {
  const classes = listClassNames(model);
  if (classes.length < 2) return null;
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
  const last = Math.max(0, symbols.length - 2);
  return [
    { quantity: 'parameter', of: parameter, logarithm: false },
    known(chosen[0]) ?? nth(last),
    known(chosen[1]) ?? nth(last + 1),
  ];
}
