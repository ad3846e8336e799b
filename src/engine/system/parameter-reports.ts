import { listSymbols, lowerFirst } from '../schema/document-symbols';
import type { PresetDocument, Trait } from '../schema/preset';
import { SPREAD_KEY, traitDialKey, traitEntrySymbol } from '../schema/symbols';
import type { ParameterReport, SpreadLimit } from './contract';

/** Every number of a document that can be moved, in the order of p, with a range for its slider. */
export function listParameters(
  document: PresetDocument,
  limits: readonly SpreadLimit[],
): readonly ParameterReport[] {
  const labels = new Map(listSymbols(document).map((entry) => [entry.symbol, entry.label]));
  const parameters = document.parameters.map((one): ParameterReport => ({
    key: one.symbol,
    label: one.name || one.symbol,
    unit: one.unit,
    value: one.value,
    min: one.min,
    max: one.max,
    group: 'parameter',
  }));
  const traits = document.traits.flatMap((trait) =>
    trait.entries.map((entry): ParameterReport => {
      const key = traitEntrySymbol(trait.symbol, entry.of);
      const range = rangeOf(trait, entry.value);
      return {
        key,
        label: labels.get(key) ?? key,
        unit: trait.unit,
        value: entry.value,
        ...range,
        group: 'trait',
      };
    }),
  );
  const dialed = document.traits.filter(
    (trait) => differs(trait) && limits.some((limit) => limit.key === traitDialKey(trait.symbol)),
  );
  const dials = dialed.map((trait) =>
    dial(
      limits,
      traitDialKey(trait.symbol),
      `Spread of ${lowerFirst(trait.name || trait.symbol)}`,
      trait.dial,
    ),
  );
  return limits.length === 0
    ? [...parameters, ...traits]
    : [...parameters, ...traits, ...dials, dial(limits, SPREAD_KEY, 'Spread', document.spread)];
}

/** A dial of a trait whose values are all the same would move nothing, so it is not listed. */
function differs(trait: Trait): boolean {
  return trait.entries.some((entry) => entry.value !== trait.entries[0]?.value);
}

function rangeOf(trait: Trait, value: number): { readonly min: number; readonly max: number } {
  if (trait.domain === 'share') return { min: 0, max: 1 };
  const reach = 3 * (Math.abs(value) || 1);
  if (trait.domain === 'any') return { min: -reach, max: reach };
  return { min: trait.domain === 'positive' ? reach / 1000 : 0, max: reach };
}

function dial(limits: readonly SpreadLimit[], key: string, label: string, value: number): ParameterReport {
  const limit = limits.find((one) => one.key === key);
  return { key, label, unit: '', value, min: limit?.from ?? 0, max: limit?.to ?? 1, group: 'dial' };
}
