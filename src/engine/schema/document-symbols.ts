import type { Population, PopulationClass, PresetDocument } from './preset';
import { RESERVED_SYMBOLS, SYMBOL_PATTERN, traitEntrySymbol } from './symbols';
import { LIMITS } from './limits';

export type SymbolKind = 'class' | 'total' | 'parameter' | 'trait value' | 'intermediate';

/** One symbol that formulas of a document can read, and what it stands for. */
export interface DocumentSymbol {
  readonly symbol: string;
  readonly kind: SymbolKind;
  /** What it is, in words: "mortality of males". */
  readonly label: string;
  readonly unit: string;
  /** Where it is defined. */
  readonly path: readonly (string | number)[];
  /** Index of the population, trait, parameter or intermediate it comes from. */
  readonly index: number;
  /** Classes of a trait value, else empty. */
  readonly of: readonly string[];
}

/** A class together with the population it belongs to. */
export interface PlacedClass {
  readonly population: Population;
  readonly class: PopulationClass;
  readonly populationIndex: number;
  readonly classIndex: number;
}

/** All classes in the order of the state. */
export function listClasses(document: PresetDocument): readonly PlacedClass[] {
  return document.populations.flatMap((population, populationIndex) =>
    population.classes.map((entry, classIndex) => ({
      population,
      class: entry,
      populationIndex,
      classIndex,
    })),
  );
}

/**
 * Every symbol of a document in order of definition, clashes included. A population of one class may
 * share that class's symbol; it is then listed once, as a class.
 */
export function listSymbols(document: PresetDocument): readonly DocumentSymbol[] {
  const found: DocumentSymbol[] = [];
  const names = new Map<string, string>();
  for (const placed of listClasses(document)) {
    const { population, populationIndex, classIndex } = placed;
    const label = describeClass(population, placed.class);
    names.set(placed.class.symbol, label);
    found.push({
      symbol: placed.class.symbol,
      kind: 'class',
      label,
      unit: document.densityUnit,
      path: ['populations', populationIndex, 'classes', classIndex, 'symbol'],
      index: populationIndex,
      of: [],
    });
  }
  document.populations.forEach((population, index) => {
    const only = population.classes[0];
    if (population.classes.length === 1 && only?.symbol === population.symbol) return;
    found.push({
      symbol: population.symbol,
      kind: 'total',
      label: `all ${lowerFirst(population.name || population.symbol)}`,
      unit: document.densityUnit,
      path: ['populations', index, 'symbol'],
      index,
      of: [],
    });
  });
  document.traits.forEach((trait, index) =>
    trait.entries.forEach((entry, k) =>
      found.push({
        symbol: traitEntrySymbol(trait.symbol, entry.of),
        kind: 'trait value',
        label: `${lowerFirst(trait.name || trait.symbol)} of ${entry.of.map((symbol) => names.get(symbol) ?? symbol).join(' on ')}`,
        unit: trait.unit,
        path: ['traits', index, 'entries', k],
        index,
        of: entry.of,
      }),
    ),
  );
  document.parameters.forEach((parameter, index) =>
    found.push({
      symbol: parameter.symbol,
      kind: 'parameter',
      label: parameter.name || parameter.symbol,
      unit: parameter.unit,
      path: ['parameters', index, 'symbol'],
      index,
      of: [],
    }),
  );
  document.intermediates.forEach((intermediate, index) =>
    found.push({
      symbol: intermediate.symbol,
      kind: 'intermediate',
      label: intermediate.meaning || intermediate.symbol,
      unit: intermediate.unit,
      path: ['intermediates', index, 'symbol'],
      index,
      of: [],
    }),
  );
  return found;
}

/** The symbols by name; the first definition wins where two clash. */
export function symbolTable(document: PresetDocument): ReadonlyMap<string, DocumentSymbol> {
  const table = new Map<string, DocumentSymbol>();
  for (const entry of listSymbols(document)) if (!table.has(entry.symbol)) table.set(entry.symbol, entry);
  return table;
}

/** First of `wanted`, `wanted_2`, `wanted_3`, ... that nothing in the document is called yet. */
export function freeSymbol(document: PresetDocument, wanted: string): string {
  const taken = new Set(listSymbols(document).map((entry) => entry.symbol));
  for (const trait of document.traits) taken.add(trait.symbol);
  const cleaned = wanted.replace(/[^A-Za-z0-9_]/g, '_');
  const base = SYMBOL_PATTERN.test(cleaned) && !RESERVED_SYMBOLS.has(cleaned) ? cleaned : `n_${cleaned}`;
  const short = base.slice(0, LIMITS.symbolLength - 4);
  if (!taken.has(short)) return short;
  let k = 2;
  while (taken.has(`${short}_${k}`)) k += 1;
  return `${short}_${k}`;
}

/** Adjectives that turn the plural of a class into part of a phrase: males, spiders -> male spiders. */
const ADJECTIVES: Readonly<Record<string, string>> = {
  males: 'male',
  females: 'female',
  juveniles: 'juvenile',
  subadults: 'subadult',
  adults: 'adult',
  larvae: 'larval',
  pupae: 'pupal',
  seedlings: 'seedling',
};

/** Name of a class that can stand inside a sentence: "male spiders", "voles (dark morph)". */
export function describeClass(population: Population, entry: PopulationClass): string {
  const whole = lowerFirst(population.name || population.symbol);
  const part = lowerFirst(entry.name || entry.symbol);
  if (part.toLowerCase().includes(whole.toLowerCase())) return part;
  if (population.classes.length === 1 && (entry.name === '' || entry.name === population.name)) return whole;
  const stem = ADJECTIVES[part.toLowerCase()] ?? ADJECTIVES[`${part.toLowerCase()}s`];
  return stem === undefined ? `${whole} (${part})` : `${stem} ${whole}`;
}

export function lowerFirst(text: string): string {
  // A second capital marks an abbreviation or a symbol, which stays as it is.
  if (/^[A-Z][A-Z0-9]/.test(text) || text.length < 2) return text;
  return text.charAt(0).toLowerCase() + text.slice(1);
}

export function upperFirst(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
