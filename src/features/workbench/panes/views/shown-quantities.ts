import type { Quantity } from '@/engine/schema/preset';
import { classColours, populationColour } from '@/graphics/palette';
import { classQuantity, nameQuantity, totalQuantity } from '@/graphics/quantities';

import { listClassNames, type ViewInput } from './view-input';

/** A quantity that a diagram shows, in its colour. */
export interface Shown {
  readonly quantity: Quantity;
  readonly label: string;
  readonly colour: string;
}

/** The quantity of the axis; all classes where it names none; by default the last population's total. */
export function shownQuantities({ model, palette, axes }: ViewInput): readonly Shown[] {
  const last = model.populations.at(-1);
  const quantity = axes[0] ?? totalQuantity(last?.symbol ?? '');
  const whole = last ? populationColour(last.hue, palette, last.classes.length) : palette.ink;
  if (quantity.quantity === 'period')
    return [{ quantity, label: nameQuantity(model, quantity).name, colour: whole }];
  const colours = classColours(model.populations, palette);
  if (quantity.of === '')
    return listClassNames(model).map((one) => ({
      quantity: { ...classQuantity(one.symbol), logarithm: quantity.logarithm },
      label: one.name,
      colour: colours.get(one.symbol) ?? palette.ink,
    }));
  const population = model.populations.find((one) => one.symbol === quantity.of);
  const colour =
    quantity.quantity === 'total' && population
      ? populationColour(population.hue, palette, population.classes.length)
      : (colours.get(quantity.of) ?? palette.ink);
  return [{ quantity, label: nameQuantity(model, quantity).name, colour }];
}
