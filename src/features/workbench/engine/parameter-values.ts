/** Reading and moving the numbers of a document by the keys that sliders, sweeps and the strip use. */
import type { PresetDocument } from '@/engine/schema/preset';
import { SPREAD_KEY, traitDialKey, traitEntrySymbol } from '@/engine/schema/symbols';
import type { ModelReport } from '@/engine/system/contract';
import type { ParameterValues } from '@/workers/protocol';

export function readParameterValues(document: PresetDocument): ParameterValues {
  const values: Record<string, number> = { [SPREAD_KEY]: document.spread };
  for (const parameter of document.parameters) values[parameter.symbol] = parameter.value;
  for (const trait of document.traits) {
    values[traitDialKey(trait.symbol)] = trait.dial;
    for (const entry of trait.entries) values[traitEntrySymbol(trait.symbol, entry.of)] = entry.value;
  }
  return values;
}

/** Those values that the model on show can be given: tasks refuse the dial of a trait that does not spread. */
export function readTaskValues(document: PresetDocument, report: ModelReport): ParameterValues {
  const known = new Set(report.parameters.map((one) => one.key));
  return Object.fromEntries(Object.entries(readParameterValues(document)).filter(([key]) => known.has(key)));
}

export function readParameterValue(document: PresetDocument, key: string): number | null {
  return readParameterValues(document)[key] ?? null;
}

/** The document with one number moved; the same document where there is no such key or no change. */
export function withParameterValue(document: PresetDocument, key: string, value: number): PresetDocument {
  if (!Number.isFinite(value) || readParameterValue(document, key) === value) return document;
  if (key === SPREAD_KEY) return { ...document, spread: value };
  const parameter = document.parameters.findIndex((one) => one.symbol === key);
  if (parameter >= 0)
    return {
      ...document,
      parameters: document.parameters.map((one, index) => (index === parameter ? { ...one, value } : one)),
    };
  for (const [index, trait] of document.traits.entries()) {
    const changed = (next: typeof trait) => ({
      ...document,
      traits: document.traits.map((one, at) => (at === index ? next : one)),
    });
    if (traitDialKey(trait.symbol) === key) return changed({ ...trait, dial: value });
    const entry = trait.entries.findIndex((one) => traitEntrySymbol(trait.symbol, one.of) === key);
    if (entry < 0) continue;
    return changed({
      ...trait,
      entries: trait.entries.map((one, at) => (at === entry ? { ...one, value, survival: null } : one)),
    });
  }
  return document;
}

/** Start values in the order of the state. */
export function readStarts(document: PresetDocument): number[] {
  return document.populations.flatMap((population) => population.classes.map((one) => one.start));
}

export function withStart(document: PresetDocument, classSymbol: string, start: number): PresetDocument {
  if (!Number.isFinite(start)) return document;
  let changed = false;
  const populations = document.populations.map((population) => {
    if (!population.classes.some((one) => one.symbol === classSymbol && one.start !== start))
      return population;
    changed = true;
    const bounded = population.sign === 'nonnegative' ? Math.max(0, start) : start;
    return {
      ...population,
      classes: population.classes.map((one) =>
        one.symbol === classSymbol ? { ...one, start: bounded } : one,
      ),
    };
  });
  return changed ? { ...document, populations } : document;
}
