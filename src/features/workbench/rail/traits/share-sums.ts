import type { PresetDocument, Trait } from '@/engine/schema/preset';

/** A population whose shares do not sum to 1. */
export interface WrongSum {
  readonly population: string;
  readonly name: string;
  readonly sum: number;
  readonly classes: readonly string[];
}

const TOLERANCE = 1e-9;

/** Populations whose shares of births do not sum to 1; a population without any is left out. */
export function findWrongSums(document: PresetDocument, trait: Trait): readonly WrongSum[] {
  if (trait.role !== 'share-of-births' || trait.per !== 'class') return [];
  return document.populations.flatMap((population) => {
    const symbols = new Set(population.classes.map((one) => one.symbol));
    const entries = trait.entries.filter((entry) => symbols.has(entry.of[0] ?? ''));
    const sum = entries.reduce((total, entry) => total + entry.value, 0);
    if (entries.length === 0 || Math.abs(sum - 1) <= TOLERANCE) return [];
    const classes = entries.map((entry) => entry.of[0] ?? '');
    return [{ population: population.symbol, name: population.name || population.symbol, sum, classes }];
  });
}

/** Scales the shares of some classes so that they sum to 1; equal shares where all are 0. */
export function scaleShares(
  document: PresetDocument,
  index: number,
  classes: readonly string[],
): PresetDocument {
  return {
    ...document,
    traits: document.traits.map((trait, at) => {
      if (at !== index) return trait;
      const concerned = trait.entries.filter((entry) => classes.includes(entry.of[0] ?? ''));
      const sum = concerned.reduce((total, entry) => total + entry.value, 0);
      const scale = (value: number) => (sum > 0 ? value / sum : 1 / concerned.length);
      return {
        ...trait,
        entries: trait.entries.map((entry) =>
          concerned.includes(entry) ? { ...entry, value: scale(entry.value) } : entry,
        ),
      };
    }),
  };
}
