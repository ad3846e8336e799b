/** Reading a quantity from branches of cycles: lowest, highest and mean over one period. */
import type { CycleBranch } from '@/engine/cycles/contract';
import type { PresetDocument, Quantity } from '@/engine/schema/preset';
import { poolingShare, readQuantity } from '@/graphics/quantities';

/** Where a list of quantities holds one: its column and the factor it is multiplied by. */
export function quantityColumn(
  model: PresetDocument,
  quantities: readonly string[],
  quantity: Quantity,
): readonly [number, number] | null {
  const population = model.populations.find((one) =>
    quantity.quantity === 'total'
      ? one.symbol === quantity.of
      : one.classes.some((member) => member.symbol === quantity.of),
  );
  if (quantity.quantity === 'total') {
    const total = quantities.lastIndexOf(quantity.of);
    if (total >= 0) return [total, 1];
    // The total of a population of one class is that class.
    const alone = population?.classes.length === 1 ? population.classes[0] : undefined;
    const column = alone ? quantities.indexOf(alone.symbol) : -1;
    return column >= 0 ? [column, 1] : null;
  }
  if (quantity.quantity !== 'class') return null;
  const column = quantities.indexOf(quantity.of);
  if (column >= 0) return [column, 1];
  const total = population ? quantities.indexOf(population.symbol) : -1;
  return total >= 0 ? [total, poolingShare(model, quantity.of)] : null;
}

/** Lowest, highest and mean at each point of a branch. */
export interface CycleExtent {
  readonly low: Float64Array;
  readonly high: Float64Array;
  readonly mean: Float64Array;
}

/**
 * Extent of a quantity along a branch; null where its states do not hold it. Shares of a population are
 * read from the cycles themselves, since their lowest is no quotient of lowest densities.
 */
export function cycleExtent(
  model: PresetDocument,
  branch: CycleBranch,
  stateSymbols: readonly string[],
  quantity: Quantity,
): CycleExtent | null {
  if (quantity.quantity === 'period')
    return { low: branch.periods, high: branch.periods, mean: branch.periods };
  const column = quantityColumn(model, branch.quantities, quantity);
  if (column) {
    const m = branch.quantities.length;
    const pick = (values: Float64Array) =>
      Float64Array.from(branch.parameters, (_value, k) => column[1] * (values[k * m + column[0]] ?? NaN));
    return { low: pick(branch.lowest), high: pick(branch.highest), mean: pick(branch.mean) };
  }
  if (quantity.quantity !== 'proportion') return null;
  const read = readQuantity(model, quantity, stateSymbols);
  return read ? extentFromOrbits(branch, read) : null;
}

function extentFromOrbits(
  { parameters, orbits, orbitPhases, orbitSamples, dimension }: CycleBranch,
  read: (states: Float64Array, offset: number, time: number, parameter: number) => number,
): CycleExtent {
  const count = parameters.length;
  const extent = {
    low: new Float64Array(count).fill(Infinity),
    high: new Float64Array(count).fill(-Infinity),
    mean: new Float64Array(count),
  };
  for (let k = 0; k < count; k++) {
    let before = NaN;
    for (let s = 0; s < orbitSamples; s++) {
      const at = k * orbitSamples + s;
      const value = read(orbits, at * dimension, NaN, NaN);
      extent.low[k] = Math.min(extent.low[k] ?? NaN, value);
      extent.high[k] = Math.max(extent.high[k] ?? NaN, value);
      if (s > 0)
        extent.mean[k] =
          (extent.mean[k] ?? 0) +
          (((orbitPhases[at] ?? NaN) - (orbitPhases[at - 1] ?? NaN)) * (value + before)) / 2;
      before = value;
    }
  }
  return extent;
}
