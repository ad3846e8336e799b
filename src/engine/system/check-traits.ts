import { listClasses, listSymbols, lowerFirst } from '../schema/document-symbols';
import type { PresetDocument, Trait } from '../schema/preset';
import { SPREAD_KEY, traitEntrySymbol } from '../schema/symbols';
import type { Diagnostic } from './contract';
import { figure, remark } from './remark';
import { spreadLimits } from './spread-limits';
import { spreadGroups } from './spread';

/** Shares may miss 1 by this much, which is what six typed decimals leave. */
const SHARE_TOLERANCE = 1e-6;

const DOMAIN_WORDS: Readonly<Record<Trait['domain'], string>> = {
  rate: 'may not be negative',
  share: 'lies between 0 and 1',
  positive: 'must be above 0',
  any: '',
};

/** Values of the trait table: their classes, domains, sums of shares, means and spreads. */
export function checkTraits(document: PresetDocument): readonly Diagnostic[] {
  const found: Diagnostic[] = [];
  const labels = new Map(listSymbols(document).map((entry) => [entry.symbol, entry.label]));
  const classes = new Set(listClasses(document).map((entry) => entry.class.symbol));
  document.traits.forEach((trait, t) => {
    trait.entries.forEach((entry, k) => {
      const path = ['traits', t, 'entries', k];
      const strange = entry.of.find((symbol) => !classes.has(symbol));
      if (strange !== undefined) {
        found.push(
          remark(
            'error',
            [...path, 'of'],
            `There is no class ${strange}; remove this value or choose a class.`,
          ),
        );
      }
      if (entry.of.length !== (trait.per === 'pair' ? 2 : 1)) {
        const message = trait.per === 'pair' ? 'a consumer class and a resource class' : 'one class';
        found.push(remark('error', [...path, 'of'], `A value of ${trait.symbol} belongs to ${message}.`));
      }
      if (!inDomain(trait.domain, entry.value)) {
        const label = labels.get(traitEntrySymbol(trait.symbol, entry.of)) ?? trait.symbol;
        found.push(
          remark(
            'error',
            [...path, 'value'],
            `The ${label} is ${figure(entry.value)} and ${DOMAIN_WORDS[trait.domain]}.`,
          ),
        );
      }
    });
    found.push(...checkMean(document, t), ...checkShares(document, t));
  });
  if (found.length === 0) found.push(...checkDials(document));
  return found;
}

function inDomain(domain: Trait['domain'], value: number): boolean {
  if (domain === 'any') return true;
  if (domain === 'positive') return value > 0;
  return value >= 0 && (domain !== 'share' || value <= 1);
}

/** Geometric and harmonic means need positive values wherever the trait is pooled. */
function checkMean(document: PresetDocument, t: number): readonly Diagnostic[] {
  const trait = document.traits[t] as Trait;
  if (trait.mean === 'arithmetic') return [];
  const groups = spreadGroups(document).filter((group) => group.trait === t);
  return groups.flatMap((group) =>
    group.entries.flatMap((k) => {
      if ((trait.entries[k]?.value ?? 1) > 0) return [];
      const message = `The ${trait.mean} mean needs positive values; enter one or hold the arithmetic mean of ${lowerFirst(trait.name || trait.symbol)}.`;
      return [remark('error', ['traits', t, 'entries', k, 'value'], message)];
    }),
  );
}

function checkShares(document: PresetDocument, t: number): readonly Diagnostic[] {
  const trait = document.traits[t] as Trait;
  if (trait.role !== 'share-of-births' || trait.per !== 'class') return [];
  return document.populations.flatMap((population) => {
    const own = trait.entries
      .map((entry, k) => ({ entry, k }))
      .filter(({ entry }) => population.classes.some((one) => one.symbol === entry.of[0]));
    const [first] = own;
    if (first === undefined) return [];
    const sum = own.reduce((total, { entry }) => total + entry.value, 0);
    if (Math.abs(sum - 1) <= SHARE_TOLERANCE) return [];
    const name = lowerFirst(population.name || population.symbol);
    const message = `The shares at birth of ${name} sum to ${figure(sum)}; they should sum to 1.`;
    return own.map(({ k }) => remark('error', ['traits', t, 'entries', k, 'value'], message));
  });
}

/** Dials turned beyond the end of their range. */
function checkDials(document: PresetDocument): readonly Diagnostic[] {
  return spreadLimits(document).flatMap((limit) => {
    const index = document.traits.findIndex((trait) => `dial:${trait.symbol}` === limit.key);
    const common = limit.key === SPREAD_KEY && index < 0;
    const value = common ? document.spread : (document.traits[index]?.dial ?? 1);
    // Only an end with a cause in the traits is a mistake; the others are where the slider stops.
    const above = value > limit.to && limit.toReason.startsWith('Beyond it');
    const below = value < limit.from && limit.fromReason.startsWith('Beyond it');
    if (!above && !below) return [];
    const [end, reason] = above ? [limit.to, limit.toReason] : [limit.from, limit.fromReason];
    const dial = common
      ? 'The spread'
      : `The spread of ${lowerFirst(document.traits[index]?.name || 'this trait')}`;
    const message = `${dial} is ${figure(value)} and ends at ${figure(end)}. ${reason}`;
    return [remark('error', common ? ['spread'] : ['traits', index, 'dial'], message)];
  });
}
