import { traitEntrySymbol } from '../schema/symbols';
import type { FlowSource, ModelGraph } from './model-graph';

/** A random state of the size of the start values; of either sign where the state may have it. */
export function sampleState(
  source: Pick<FlowSource, 'starts' | 'nonnegative'>,
  random: () => number,
): Float64Array {
  return Float64Array.from(source.starts, (start, i) => {
    const size = (Math.abs(start) || 1) * Math.exp(2 * (random() - 0.5));
    return source.nonnegative[i] !== true && random() < 0.5 ? -size : size;
  });
}

/**
 * Random parameters in their ranges and trait values in their domains, every trait value different,
 * so that what holds at them holds whatever the sliders show. Dials stay as the document has them.
 */
export function sampleParameters(model: ModelGraph, random: () => number): Float64Array {
  const { document } = model;
  const p = Float64Array.from(model.defaults);
  const at = new Map(model.parameterKeys.map((key, k) => [key, k]));
  const put = (key: string, value: number): void => {
    const k = at.get(key);
    if (k !== undefined) p[k] = value;
  };
  for (const one of document.parameters)
    put(one.symbol, one.min + (one.max - one.min) * (0.05 + 0.9 * random()));
  for (const trait of document.traits) {
    for (const entry of trait.entries) {
      const size = (Math.abs(entry.value) || 1) * (0.5 + random());
      const value = trait.domain === 'share' ? 0.05 + 0.9 * random() : entry.value < 0 ? -size : size;
      put(traitEntrySymbol(trait.symbol, entry.of), value);
    }
  }
  return p;
}
