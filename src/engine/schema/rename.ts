import { tokenise } from '../expression/tokens';
import { listSymbols, symbolTable } from './document-symbols';
import type { PresetDocument, Process, Quantity } from './preset';
import { isSymbol, traitDialKey, traitEntrySymbol } from './symbols';

export type EditResult =
  { readonly ok: true; readonly document: PresetDocument } | { readonly ok: false; readonly message: string };

/** Settings of templates that hold words of ours, never a symbol of the user's. */
const CHOICE_SETTINGS: ReadonlySet<string> = new Set([
  'response',
  'attack',
  'handling',
  'newborns',
  'rate',
  'mating',
  'strength',
  'catchability',
]);

/**
 * Renames a class, population, trait, parameter or intermediate formula everywhere: in every formula
 * word by word, in the values of traits that carry a class's symbol (`m_y1`), effects, box, sweeps,
 * views, known facts and the settings of templates. Refuses a name that is taken or cannot be a symbol.
 */
export function renameSymbol(document: PresetDocument, from: string, to: string): EditResult {
  if (from === to) return { ok: true, document };
  if (!isSymbol(to)) {
    return {
      ok: false,
      message: `${to || 'An empty name'} cannot be a symbol: it starts with a letter, holds letters, digits and underscores, and is no reserved name.`,
    };
  }
  const isTrait = document.traits.some((trait) => trait.symbol === from);
  const known = symbolTable(document).get(from);
  if (known?.kind === 'trait value') {
    return { ok: false, message: `${from} is a value of a trait; rename the trait or the class instead.` };
  }
  if (known === undefined && !isTrait) return { ok: false, message: `Nothing here is called ${from}.` };
  const names = collectNames(document, from, to, known !== undefined);
  const clash = findClash(document, names, to, isTrait);
  if (clash !== null) return { ok: false, message: clash };
  return { ok: true, document: renameAll(document, names, from, to) };
}

/** Replaces whole words of a formula; a text that cannot be split into words stays as it is. */
export function renameInFormula(text: string, names: ReadonlyMap<string, string>): string {
  const words = tokenise(text);
  if (!words.ok) return text;
  let out = '';
  let at = 0;
  for (const token of words.tokens) {
    const name = token.kind === 'symbol' ? names.get(token.text) : undefined;
    if (name === undefined) continue;
    out += text.slice(at, token.from) + name;
    at = token.to;
  }
  return out + text.slice(at);
}

/** Every name that changes with it: the symbol, trait values that carry it, and the key of a dial. */
function collectNames(
  document: PresetDocument,
  from: string,
  to: string,
  isOwn: boolean,
): Map<string, string> {
  const names = new Map<string, string>();
  if (isOwn) names.set(from, to);
  for (const trait of document.traits) {
    const symbol = trait.symbol === from ? to : trait.symbol;
    if (trait.symbol === from) names.set(traitDialKey(from), traitDialKey(to));
    for (const entry of trait.entries) {
      const of = isOwn ? entry.of.map((name) => (name === from ? to : name)) : entry.of;
      const [before, after] = [traitEntrySymbol(trait.symbol, entry.of), traitEntrySymbol(symbol, of)];
      if (before !== after) names.set(before, after);
    }
  }
  return names;
}

function findClash(
  document: PresetDocument,
  names: ReadonlyMap<string, string>,
  to: string,
  isTrait: boolean,
): string | null {
  if (isTrait && document.traits.some((trait) => trait.symbol === to)) {
    return `There is a trait called ${to} already.`;
  }
  const staying = new Map(
    listSymbols(document)
      .filter((entry) => !names.has(entry.symbol))
      .map((entry) => [entry.symbol, entry.label]),
  );
  for (const after of names.values()) {
    const label = staying.get(after);
    if (label !== undefined) return `${after} is taken by ${label}; choose another name.`;
    if (!after.startsWith('dial:') && !isSymbol(after)) return `${after} would be too long for a symbol.`;
  }
  return null;
}

function renameAll(
  document: PresetDocument,
  names: ReadonlyMap<string, string>,
  from: string,
  to: string,
): PresetDocument {
  const one = (symbol: string): string => names.get(symbol) ?? symbol;
  const keys = <T>(record: Readonly<Record<string, T>>): Record<string, T> =>
    Object.fromEntries(Object.entries(record).map(([key, value]) => [one(key), value]));
  const formula = (text: string): string => renameInFormula(text, names);
  const quantity = (axis: Quantity): Quantity => ({ ...axis, of: one(axis.of) });
  return {
    ...document,
    populations: document.populations.map((population) => ({
      ...population,
      symbol: one(population.symbol),
      classes: population.classes.map((entry) => ({ ...entry, symbol: one(entry.symbol) })),
    })),
    traits: document.traits.map((trait) => ({
      ...trait,
      symbol: trait.symbol === from && names.has(traitDialKey(from)) ? to : trait.symbol,
      entries: trait.entries.map((entry) => ({ ...entry, of: entry.of.map(one) })),
    })),
    parameters: document.parameters.map((parameter) => ({ ...parameter, symbol: one(parameter.symbol) })),
    intermediates: document.intermediates.map((entry) => ({
      ...entry,
      symbol: one(entry.symbol),
      formula: formula(entry.formula),
    })),
    processes: document.processes.map((process) => ({
      ...process,
      rate: formula(process.rate),
      effects: process.effects.map((effect) => ({
        class: one(effect.class),
        amount: formula(effect.amount),
      })),
      template: renameTemplate(process.template, from, to),
    })),
    constantsOfMotion: document.constantsOfMotion.map(formula),
    box: document.box.map((side) => ({ ...side, class: one(side.class) })),
    sweeps: document.sweeps.map((sweep) => ({ ...sweep, parameter: one(sweep.parameter) })),
    view: {
      ...document.view,
      panes: document.view.panes.map((pane) => ({ ...pane, axes: pane.axes.map(quantity) })),
    },
    knownFacts: document.knownFacts.map((fact) => {
      const parameters = keys(fact.parameters);
      switch (fact.kind) {
        case 'equilibrium':
          return { ...fact, parameters, at: keys(fact.at) };
        case 'special-point':
          return { ...fact, parameters, sweep: { ...fact.sweep, parameter: one(fact.sweep.parameter) } };
        default:
          return { ...fact, parameters };
      }
    }),
  };
}

/** Whether a formula reads a symbol; a text that cannot be split into words reads nothing. */
export function readsSymbol(text: string, symbol: string): boolean {
  const words = tokenise(text);
  return words.ok && words.tokens.some((token) => token.kind === 'symbol' && token.text === symbol);
}

function renameTemplate(template: Process['template'], from: string, to: string): Process['template'] {
  if (template === null) return null;
  const one = (value: unknown): unknown => {
    if (value === from) return to;
    return Array.isArray(value) ? value.map(one) : value;
  };
  const settings = Object.fromEntries(
    Object.entries(template.settings).map(([key, value]) => [
      key,
      CHOICE_SETTINGS.has(key) ? value : one(value),
    ]),
  );
  return { ...template, settings };
}
