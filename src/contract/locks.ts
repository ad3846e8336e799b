import type { PresetDocument } from '../engine/schema/preset';
import { SPREAD_KEY, traitDialKey, traitEntrySymbol } from '../engine/schema/symbols';
import type { Freedom } from './assigned-sweeps';
import type { SweepRange } from './kept-sweep';

/** Every number of a model that a key names: parameters, trait values and dials. */
function numbersOf(document: PresetDocument): Map<string, number> {
  const numbers = new Map<string, number>([[SPREAD_KEY, document.spread]]);
  for (const { symbol, value } of document.parameters) numbers.set(symbol, value);
  for (const { symbol, dial, entries } of document.traits) {
    numbers.set(traitDialKey(symbol), dial);
    for (const entry of entries) numbers.set(traitEntrySymbol(symbol, entry.of), entry.value);
  }
  return numbers;
}

/** Which numbers differ, by key; a key that only one of the two has counts as different. */
export function changedNumbers(set: PresetDocument, other: PresetDocument): string[] {
  const [before, after] = [numbersOf(set), numbersOf(other)];
  return [...new Set([...before.keys(), ...after.keys()])].filter(
    (key) => before.get(key) !== after.get(key),
  );
}

/** The model without its numbers: what `freedom.model` is about. Words about the model are no part of it. */
function structureOf({ populations, traits, parameters, intermediates, processes, ...rest }: PresetDocument) {
  return {
    populations: populations.map(({ symbol, sign, classes }) => [
      symbol,
      sign,
      classes.map((one) => one.symbol),
    ]),
    traits: traits.map(({ symbol, per, domain, mean, followsSpread, entries }) => [
      symbol,
      per,
      domain,
      mean,
      followsSpread,
      entries.map((entry) => entry.of),
    ]),
    parameters: parameters.map(({ symbol }) => symbol),
    intermediates: intermediates.map(({ symbol, formula }) => [symbol, formula]),
    processes: processes.map(({ rate, effects, signed }) => [rate, effects, signed]),
    constants: rest.constantsOfMotion,
  };
}

export function structureChanged(set: PresetDocument, other: PresetDocument): boolean {
  return JSON.stringify(structureOf(set)) !== JSON.stringify(structureOf(other));
}

/** What was set: the model, the sweep and what may be changed of them. */
export interface SetWork {
  readonly document: PresetDocument;
  readonly range: SweepRange;
  readonly freedom: Freedom;
}

/** Whether a number may be moved under these locks. The swept one always may: the sweep runs over all its values. */
export function mayChange({ freedom, range }: Pick<SetWork, 'freedom' | 'range'>, key: string): boolean {
  return (
    freedom.model ||
    freedom.parameters === 'all' ||
    freedom.parameters.includes(key) ||
    key === range.parameter
  );
}

/** What was changed although it is locked, one sentence each; empty when the locks were kept. */
export function lockBreaches(set: SetWork, other: Pick<SetWork, 'document' | 'range'>): string[] {
  const { freedom, document, range } = set;
  const breaches: string[] = [];
  if (!freedom.model && structureChanged(document, other.document))
    breaches.push('The classes, processes or formulas of the model are locked.');
  else
    for (const key of changedNumbers(document, other.document))
      if (!mayChange(set, key) && !(freedom.range && key === other.range.parameter))
        breaches.push(`${key} is locked.`);
  if (
    !freedom.range &&
    (range.parameter !== other.range.parameter ||
      range.from !== other.range.from ||
      range.to !== other.range.to)
  )
    breaches.push(`The sweep is locked to ${range.parameter} from ${range.from} to ${range.to}.`);
  return breaches;
}

/** A document as an assignee receives it: nothing in it tells what is expected. */
export function withoutAnswers(document: PresetDocument): PresetDocument {
  return { ...document, knownFacts: [], notes: '', summary: '', tags: [] };
}
