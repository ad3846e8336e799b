import { describeClass, lowerFirst } from '../document-symbols';
import type { Population, PresetDocument } from '../preset';

/** A formula that can stand as a factor: parenthesised where a sum shows at its top level. */
export function factor(text: string): string {
  let depth = 0;
  for (const character of text) {
    if (character === '(') depth += 1;
    else if (character === ')') depth -= 1;
    else if (depth === 0 && (character === '+' || character === '-')) return `(${text})`;
  }
  return text;
}

/** A sum of terms that can stand as a factor. */
export function sumOf(terms: readonly string[]): string {
  return terms.length === 1 ? (terms[0] ?? '0') : `(${terms.join(' + ')})`;
}

/** Total of chosen classes as a formula: the population's symbol where all are meant. */
export function totalOf(population: Population, classes: readonly string[]): string {
  return classes.length === population.classes.length ? population.symbol : sumOf(classes);
}

export function populationName(population: Population): string {
  return lowerFirst(population.name || population.symbol);
}

export function className(population: Population, symbol: string): string {
  const entry = population.classes.find((one) => one.symbol === symbol);
  return entry === undefined ? symbol : describeClass(population, entry);
}

/** Units that templates give to what they add, in the units of the document. */
export function unitsOf(document: PresetDocument): {
  readonly density: string;
  readonly time: string;
  readonly perTime: string;
  /** Per density and time: attack rates, competition. */
  readonly perDensityTime: string;
  /** Per squared density and time: the sigmoid response. */
  readonly perDensitySquaredTime: string;
  readonly densityPerTime: string;
} {
  const time = document.timeUnit;
  const density = document.densityUnit;
  const grouped = /^[A-Za-z]*$/.test(density) ? density : `(${density})`;
  return {
    density,
    time,
    perTime: `1/${time}`,
    perDensityTime: density === '' ? `1/${time}` : `1/(${grouped}*${time})`,
    perDensitySquaredTime: density === '' ? `1/${time}` : `1/(${grouped}^2*${time})`,
    densityPerTime: density === '' ? `1/${time}` : `${grouped}/${time}`,
  };
}
