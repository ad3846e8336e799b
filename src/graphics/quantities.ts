/** What can lie on an axis, and how it is read from states: a class, a total, a proportion, time, a parameter. */
import type { PresetDocument, Quantity } from '@/engine/schema/preset';

/** Reads the quantity from states[offset…], the time and the value of the swept parameter. */
export type QuantityReader = (
  states: Float64Array,
  offset: number,
  time: number,
  parameter: number,
) => number;

/** The part of a document that quantities are read with. */
export type QuantityContext = Pick<
  PresetDocument,
  'populations' | 'traits' | 'parameters' | 'timeUnit' | 'densityUnit'
>;

export interface NamedQuantity {
  readonly quantity: Quantity;
  readonly name: string;
  readonly unit: string;
}

function populationOf(context: QuantityContext, classSymbol: string) {
  return context.populations.find((one) => one.classes.some((member) => member.symbol === classSymbol));
}

/** Share of each class at birth, the weights of pooling: from the trait of that role, else equal. */
export function poolingShare(context: QuantityContext, classSymbol: string): number {
  const population = populationOf(context, classSymbol);
  if (!population || population.classes.length === 1) return 1;
  const shares = context.traits.find(
    (trait) =>
      trait.role === 'share-of-births' &&
      population.classes.every((one) => trait.entries.some((entry) => entry.of[0] === one.symbol)),
  );
  const value = (symbol: string) => shares?.entries.find((entry) => entry.of[0] === symbol)?.value ?? 1;
  const sum = population.classes.reduce((total, one) => total + value(one.symbol), 0);
  return sum > 0 ? value(classSymbol) / sum : 1 / population.classes.length;
}

/** Weighted indices into the state that make up the quantity; null where the symbols do not hold it. */
function terms(
  context: QuantityContext,
  kind: Quantity['quantity'],
  of: string,
  symbols: readonly string[],
): readonly (readonly [number, number])[] | null {
  if (kind === 'total') {
    const population = context.populations.find((one) => one.symbol === of);
    if (!population) return null;
    const members = population.classes.map((one) => symbols.indexOf(one.symbol));
    if (members.every((index) => index >= 0)) return members.map((index) => [index, 1] as const);
    const lumped = symbols.indexOf(of);
    return lumped >= 0 ? [[lumped, 1]] : null;
  }
  const index = symbols.indexOf(of);
  if (index >= 0) return [[index, 1]];
  const population = populationOf(context, of);
  const lumped = population ? symbols.indexOf(population.symbol) : -1;
  return lumped >= 0 ? [[lumped, poolingShare(context, of)]] : null;
}

/**
 * Reader of a quantity over states with the given symbols, or null where those do not hold it.
 * A class read from a lumped twin is its total divided by the shares of pooling.
 */
export function readQuantity(
  context: QuantityContext,
  quantity: Quantity,
  symbols: readonly string[],
): QuantityReader | null {
  if (quantity.quantity === 'time') return (_states, _offset, time) => time;
  if (quantity.quantity === 'parameter') return (_states, _offset, _time, parameter) => parameter;
  // A state has no period; a cycle has.
  if (quantity.quantity === 'period') return null;
  const kind = quantity.quantity === 'total' ? 'total' : 'class';
  const above = terms(context, kind, quantity.of, symbols);
  if (!above) return null;
  const sum = (parts: readonly (readonly [number, number])[], states: Float64Array, offset: number) => {
    let total = 0;
    for (const [index, weight] of parts) total += weight * (states[offset + index] ?? NaN);
    return total;
  };
  if (quantity.quantity !== 'proportion') return (states, offset) => sum(above, states, offset);
  const below = terms(context, 'total', populationOf(context, quantity.of)?.symbol ?? '', symbols);
  if (!below) return null;
  return (states, offset) => {
    const whole = sum(below, states, offset);
    return whole > 0 ? sum(above, states, offset) / whole : NaN;
  };
}

function nameOf(context: QuantityContext, quantity: Quantity): { name: string; unit: string } {
  const density = context.densityUnit;
  if (quantity.quantity === 'time') return { name: 'time', unit: context.timeUnit };
  if (quantity.quantity === 'period') return { name: 'period of the cycle', unit: context.timeUnit };
  if (quantity.quantity === 'parameter') return parameterName(context, quantity.of);
  if (quantity.quantity === 'total') {
    const population = context.populations.find((one) => one.symbol === quantity.of);
    const suffix = (population?.classes.length ?? 1) > 1 ? ', all classes' : '';
    return { name: `${population?.name || quantity.of}${suffix}`, unit: density };
  }
  const population = populationOf(context, quantity.of);
  const one = population?.classes.find((member) => member.symbol === quantity.of);
  const name = className(
    population?.name ?? '',
    one?.name ?? '',
    quantity.of,
    population?.classes.length ?? 1,
  );
  return quantity.quantity === 'proportion'
    ? { name: `share of ${name}`, unit: '' }
    : { name, unit: density };
}

/** Name of a class that can stand alone: with its population's unless it already says it. */
export function className(population: string, name: string, symbol: string, classes: number): string {
  if (!name) return classes === 1 && population ? population : symbol;
  if (classes === 1) return population || name;
  const repeated = population && name.toLowerCase().includes(population.toLowerCase().replace(/s$/, ''));
  return repeated || !population ? name : `${population}, ${name}`;
}

/** Words and unit of anything that can be moved or swept, by its key. */
export function parameterName(context: QuantityContext, key: string): { name: string; unit: string } {
  if (key === 'dial:spread') return { name: 'spread', unit: '' };
  if (key.startsWith('dial:')) {
    const trait = context.traits.find((one) => one.symbol === key.slice(5));
    return { name: `spread of ${trait?.name || key.slice(5)}`, unit: '' };
  }
  const parameter = context.parameters.find((one) => one.symbol === key);
  if (parameter) {
    const { name, unit } = parameter;
    return { name: name && name !== key ? `${name}, ${key}` : key, unit };
  }
  for (const trait of context.traits) {
    const entry = trait.entries.find((one) => [trait.symbol, ...one.of].join('_') === key);
    if (!entry) continue;
    const who = entry.of.map((symbol) => nameOf(context, classQuantity(symbol)).name).join(' on ');
    return { name: `${trait.name || trait.symbol} of ${who}`, unit: trait.unit };
  }
  return { name: key, unit: '' };
}

export function classQuantity(symbol: string): Quantity {
  return { quantity: 'class', of: symbol, logarithm: false };
}

export function totalQuantity(symbol: string): Quantity {
  return { quantity: 'total', of: symbol, logarithm: false };
}

export function nameQuantity(context: QuantityContext, quantity: Quantity): NamedQuantity {
  return { quantity, ...nameOf(context, quantity) };
}

/** Everything that can lie on an axis of states, in the order of the document. */
export function stateQuantities(context: QuantityContext): readonly NamedQuantity[] {
  const choices: Quantity[] = [];
  for (const population of context.populations) {
    for (const one of population.classes) choices.push(classQuantity(one.symbol));
    if (population.classes.length === 1) continue;
    choices.push(totalQuantity(population.symbol));
    for (const one of population.classes)
      choices.push({ quantity: 'proportion', of: one.symbol, logarithm: false });
  }
  return choices.map((quantity) => nameQuantity(context, quantity));
}
