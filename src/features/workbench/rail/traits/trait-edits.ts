import { LIMITS } from '@/engine/schema/limits';
import type { PresetDocument, Trait, TraitEntry } from '@/engine/schema/preset';

import { replaceAt } from '../replace-at';

export function changeTrait(
  document: PresetDocument,
  index: number,
  patch: Partial<Omit<Trait, 'symbol' | 'entries'>>,
): PresetDocument {
  return { ...document, traits: replaceAt(document.traits, index, (trait) => ({ ...trait, ...patch })) };
}

export function removeTrait(document: PresetDocument, index: number): PresetDocument {
  return { ...document, traits: document.traits.filter((_, at) => at !== index) };
}

export function sameOf(entry: TraitEntry, of: readonly string[]): boolean {
  return entry.of.length === of.length && entry.of.every((symbol, at) => symbol === of[at]);
}

export function findEntry(trait: Trait, of: readonly string[]): TraitEntry | undefined {
  return trait.entries.find((entry) => sameOf(entry, of));
}

/** Sets some fields of the value for a class or a pair, making it where there was none. */
export function changeEntry(
  document: PresetDocument,
  index: number,
  of: readonly string[],
  patch: Partial<Omit<TraitEntry, 'of'>>,
): PresetDocument {
  const change = (trait: Trait): Trait => {
    if (findEntry(trait, of))
      return {
        ...trait,
        entries: trait.entries.map((entry) => (sameOf(entry, of) ? { ...entry, ...patch } : entry)),
      };
    if (trait.entries.length >= LIMITS.entriesPerTrait) return trait;
    const entry = { of: [...of], value: 0, standardError: null, source: '', survival: null, ...patch };
    return { ...trait, entries: [...trait.entries, entry] };
  };
  return { ...document, traits: replaceAt(document.traits, index, change) };
}

export function removeEntry(document: PresetDocument, index: number, of: readonly string[]): PresetDocument {
  return {
    ...document,
    traits: replaceAt(document.traits, index, (trait) => ({
      ...trait,
      entries: trait.entries.filter((entry) => !sameOf(entry, of)),
    })),
  };
}

/** Why a value does not lie in the domain of its trait; null where it does. */
export function refuseValue(trait: Pick<Trait, 'domain' | 'name'>, value: number): string | null {
  const name = trait.name || 'This trait';
  if (trait.domain === 'rate' && value < 0) return `${name} is a rate and cannot be below 0.`;
  if (trait.domain === 'positive' && value <= 0) return `${name} must be above 0.`;
  if (trait.domain === 'share' && (value < 0 || value > 1)) return `${name} is a share and lies from 0 to 1.`;
  return null;
}

/** The constant rate at which a fraction survives a period. */
export function rateOfSurvival(fraction: number, period: number): number {
  const rate = -Math.log(fraction) / period;
  return rate === 0 ? 0 : rate;
}

/** The fraction that survives a period at a constant rate. */
export function survivalOfRate(rate: number, period: number): number {
  return Math.exp(-rate * period);
}
