import { freeSymbol, listClasses } from './document-symbols';
import { HUES, type Population, type PresetDocument, type Trait, type TraitEntry } from './preset';
import { renameInFormula } from './rename';
import { rewriteUntouched } from './templates/rewrite';
import { traitEntrySymbol } from './symbols';

export { freeProcessId, removeGroup } from './process-groups';

/** Adds a population of one class, both under one free symbol, in the first hue not yet in use. */
export function addPopulation(document: PresetDocument, name: string, wanted = 'N'): PresetDocument {
  const symbol = freeSymbol(document, wanted);
  const used = new Set(document.populations.map((population) => population.hue));
  const hue =
    HUES.find((candidate) => !used.has(candidate)) ?? HUES[document.populations.length % HUES.length];
  const population: Population = {
    symbol,
    name,
    hue: hue ?? 'weld',
    sign: 'nonnegative',
    classes: [{ symbol, name, shade: 0, start: 1 }],
  };
  return { ...document, populations: [...document.populations, population] };
}

/**
 * Adds a class to a population, keeping its total: the new class shares the last one's start value and
 * share of births with it. A population that shared its symbol with its only class keeps it as the name of
 * the total, and that class gets a symbol of its own, so that formulas go on reading the total. Other
 * traits that every class had get a value equal to the last one. Processes of templates that
 * were not changed by hand are written anew, the new class included.
 */
export function addClass(document: PresetDocument, population: string, name: string): PresetDocument {
  const before = document.populations.find((entry) => entry.symbol === population);
  const last = before?.classes[before.classes.length - 1];
  if (before === undefined || last === undefined) return document;
  const split = separateOnlyClass(document, before);
  const current = split.populations.find((entry) => entry.symbol === population) ?? before;
  const symbol = freeSymbol(split, `${population}${current.classes.length + 1}`);
  const shade = Math.min(11, current.classes.length);
  const halved = current.classes.map((one, k) =>
    k === current.classes.length - 1 ? { ...one, start: one.start / 2 } : one,
  );
  const grown = { ...current, classes: [...halved, { symbol, name, shade, start: last.start / 2 }] };
  const after = {
    ...split,
    populations: split.populations.map((entry) => (entry.symbol === population ? grown : entry)),
    traits: split.traits.map((trait) => ({ ...trait, entries: extendEntries(trait, current, symbol) })),
  };
  const first = current.classes[0]?.symbol ?? population;
  return rewriteUntouched(document, after, population, (one) =>
    one === before.classes[0]?.symbol ? first : one,
  );
}

function separateOnlyClass(document: PresetDocument, population: Population): PresetDocument {
  const only = population.classes[0];
  if (population.classes.length !== 1 || only?.symbol !== population.symbol) return document;
  const symbol = freeSymbol(document, `${population.symbol}1`);
  const one = (name: string): string => (name === only.symbol ? symbol : name);
  const values = new Map(
    document.traits.flatMap((trait) =>
      trait.entries
        .filter((entry) => entry.of.includes(only.symbol))
        .map((entry): [string, string] => [
          traitEntrySymbol(trait.symbol, entry.of),
          traitEntrySymbol(trait.symbol, entry.of.map(one)),
        ]),
    ),
  );
  const formula = (text: string): string => renameInFormula(text, values);
  return {
    ...document,
    populations: document.populations.map((entry) =>
      entry.symbol === population.symbol ? { ...entry, classes: [{ ...only, symbol }] } : entry,
    ),
    traits: document.traits.map((trait) => ({
      ...trait,
      entries: trait.entries.map((entry) => ({ ...entry, of: entry.of.map(one) })),
    })),
    processes: document.processes.map((process) => ({
      ...process,
      rate: formula(process.rate),
      effects: process.effects.map((effect) => ({
        class: one(effect.class),
        amount: formula(effect.amount),
      })),
    })),
    intermediates: document.intermediates.map((entry) => ({ ...entry, formula: formula(entry.formula) })),
    constantsOfMotion: document.constantsOfMotion.map(formula),
    box: document.box.map((side) => ({ ...side, class: one(side.class) })),
    sweeps: document.sweeps.map((sweep) => ({
      ...sweep,
      parameter: values.get(sweep.parameter) ?? sweep.parameter,
    })),
  };
}

/** Entries of a trait with copies for a new class wherever the population had them for all its classes. */
function extendEntries(trait: Trait, population: Population, added: string): TraitEntry[] {
  const last = population.classes[population.classes.length - 1]?.symbol;
  const complete = (slot: number): boolean =>
    population.classes.every((entry) => trait.entries.some((value) => value.of[slot] === entry.symbol));
  const entries = [...trait.entries];
  for (const slot of [0, 1]) {
    if (!complete(slot)) continue;
    for (const entry of [...entries]) {
      if (entry.of[slot] !== last) continue;
      const of = entry.of.map((name, k) => (k === slot ? added : name));
      const value = trait.role === 'share-of-births' ? entry.value / 2 : entry.value;
      entries.splice(entries.indexOf(entry), 1, { ...entry, value });
      entries.push({ ...entry, of, value, standardError: null, source: '' });
    }
  }
  return entries;
}

/**
 * Removes a class with its trait values, effects and box side; a population's last class takes the
 * population along. Shares of births of the classes that stay are scaled to their old sum. Processes of
 * templates that were not changed by hand are written anew without it.
 */
export function removeClass(document: PresetDocument, symbol: string): PresetDocument {
  const gone = listClasses(document).find((entry) => entry.class.symbol === symbol);
  if (gone === undefined) return document;
  const population = gone.population.symbol;
  const stays = gone.population.classes.length > 1;
  const after = {
    ...document,
    populations: document.populations
      .map((entry) =>
        entry.symbol === population
          ? { ...entry, classes: entry.classes.filter((one) => one.symbol !== symbol) }
          : entry,
      )
      .filter((entry) => entry.classes.length > 0),
    traits: document.traits.map((trait) => ({
      ...trait,
      entries: withoutClass(trait, gone.population, symbol),
    })),
    processes: document.processes
      .map((process) => ({
        ...process,
        effects: process.effects.filter((effect) => effect.class !== symbol),
      }))
      .filter((process, k) => process.effects.length > 0 || document.processes[k]?.effects.length === 0),
    box: document.box.filter((side) => side.class !== symbol),
  };
  const renamed = (one: string): string | null =>
    one === symbol || (!stays && one === population) ? null : one;
  return rewriteUntouched(document, after, population, renamed);
}

function withoutClass(trait: Trait, population: Population, symbol: string): TraitEntry[] {
  const rest = trait.entries.filter((entry) => !entry.of.includes(symbol));
  if (trait.role !== 'share-of-births') return rest;
  const own = (entry: TraitEntry): boolean => population.classes.some((one) => one.symbol === entry.of[0]);
  const sumOf = (entries: readonly TraitEntry[]): number =>
    entries.filter(own).reduce((sum, entry) => sum + entry.value, 0);
  const scale = sumOf(trait.entries) / sumOf(rest);
  return Number.isFinite(scale)
    ? rest.map((entry) => (own(entry) ? { ...entry, value: Math.min(1, entry.value * scale) } : entry))
    : rest;
}

/** Removes a population with all its classes. */
export function removePopulation(document: PresetDocument, symbol: string): PresetDocument {
  const population = document.populations.find((entry) => entry.symbol === symbol);
  if (population === undefined) return document;
  return population.classes.reduce((rest, entry) => removeClass(rest, entry.symbol), document);
}
