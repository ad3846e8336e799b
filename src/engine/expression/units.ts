/** Key of time among the base dimensions; no word of a unit text can equal it. */
const TIME = '#time';

/**
 * A physical dimension: exponents of base dimensions (time, and every other word as one of its own),
 * and the size of the unit in the base units (seconds, and the words themselves). `scale` is null
 * where a bare number has entered, which may have been a conversion.
 */
export interface Dimension {
  readonly exponents: ReadonlyMap<string, number>;
  readonly scale: number | null;
}

export type UnitResult =
  /** `dimension` null: the text is empty, the unit unknown, and it fits everywhere. */
  | { readonly ok: true; readonly dimension: Dimension | null }
  | { readonly ok: false; readonly message: string };

const DAY = 86_400;
/** Mean lengths in the Gregorian sense commonly used in ecology: a year of 365.25 days. */
const TIME_UNITS: readonly (readonly [string, number, readonly string[]])[] = [
  ['second', 1, ['s', 'sec', 'second', 'seconds']],
  ['minute', 60, ['min', 'minute', 'minutes']],
  ['hour', 3600, ['h', 'hr', 'hour', 'hours']],
  ['day', DAY, ['d', 'day', 'days']],
  ['week', 7 * DAY, ['wk', 'week', 'weeks']],
  ['month', 30.4375 * DAY, ['mo', 'month', 'months']],
  ['year', 365.25 * DAY, ['y', 'yr', 'year', 'years']],
];
const SECONDS = new Map(TIME_UNITS.flatMap(([, size, words]) => words.map((word) => [word, size] as const)));
const SAME_WORD = new Map([
  ['individual', 'ind'],
  ['inds', 'ind'],
]);
const SUPERSCRIPTS: Readonly<Record<string, string>> = Object.fromEntries(
  [...'⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺'].map((character, k) => [character, '0123456789-+'.charAt(k)]),
);

export const DIMENSIONLESS: Dimension = { exponents: new Map(), scale: 1 };
/** A number without a unit. */
export const BARE_NUMBER: Dimension = { exponents: new Map(), scale: null };

/** a times b^power. */
export function multiplyDimensions(a: Dimension, b: Dimension, power = 1): Dimension {
  const exponents = new Map(a.exponents);
  for (const [base, exponent] of b.exponents) {
    const sum = (exponents.get(base) ?? 0) + exponent * power;
    if (Math.abs(sum) < 1e-9) exponents.delete(base);
    else exponents.set(base, sum);
  }
  const scale = a.scale === null || b.scale === null ? null : a.scale * b.scale ** power;
  return { exponents, scale };
}

export function sameExponents(a: Dimension, b: Dimension): boolean {
  if (a.exponents.size !== b.exponents.size) return false;
  for (const [base, exponent] of a.exponents) {
    if (Math.abs((b.exponents.get(base) ?? 0) - exponent) > 1e-9) return false;
  }
  return true;
}

/** Whether two scales agree, as far as both are known. */
export function sameScale(a: Dimension, b: Dimension): boolean {
  if (a.scale === null || b.scale === null) return true;
  return Math.abs(a.scale - b.scale) <= 1e-9 * Math.max(Math.abs(a.scale), Math.abs(b.scale));
}

/** In words: "week^-1", "ind m^-2", "no unit". */
export function describeDimension(dimension: Dimension): string {
  const words = [...dimension.exponents].map(([base, exponent]) => {
    const word = base === TIME ? timeWord(dimension.scale, exponent) : base;
    return exponent === 1 ? word : `${word}^${Number(exponent.toFixed(4))}`;
  });
  return words.length === 0 ? 'no unit' : words.join(' ');
}

function timeWord(scale: number | null, exponent: number): string {
  const unit = TIME_UNITS.find(([, size]) => scale !== null && Math.abs(size ** exponent / scale - 1) < 1e-9);
  return unit?.[0] ?? 'time';
}

/**
 * Reads the text of a unit: "1/week", "per week", "week^-1", "ind/m²", "m² / (ind week)", "1", "%".
 * Words are multiplied by spaces, `*` or a middle dot; `/` and `per` divide by the next word or
 * parenthesis; powers follow as `^2`, `²`, or digits. Time words are related by their lengths, every
 * other word is a base dimension of its own. An empty text is an unknown unit.
 */
export function parseUnit(text: string): UnitResult {
  if (text.trim() === '') return { ok: true, dimension: null };
  const plain = text.replace(
    /[⁰¹²³⁴⁵⁶⁷⁸⁹⁻⁺]+/g,
    (run) => `^${[...run].map((c) => SUPERSCRIPTS[c]).join('')}`,
  );
  const words = plain.match(/\d+(?:\.\d+)?|\p{L}+|\^\s*\(?\s*[-+]?\d+(?:\/\d+)?\s*\)?|[-+]\d+|\S/gu) ?? [];
  const reader = new UnitReader(words);
  const dimension = reader.product();
  if (dimension === null || !reader.atEnd) {
    return { ok: false, message: `The unit "${text}" cannot be read; write it as in 1/week or ind/m^2.` };
  }
  return { ok: true, dimension };
}

class UnitReader {
  private next = 0;
  private depth = 0;

  constructor(private readonly words: readonly string[]) {}

  get atEnd(): boolean {
    return this.next === this.words.length;
  }

  /** Words until the end or a closing parenthesis; null where they cannot be read. */
  product(): Dimension | null {
    let result: Dimension = DIMENSIONLESS;
    let power = 1;
    let wordDue = true;
    while (!this.atEnd) {
      const word = this.words[this.next] as string;
      if (word === ')') break;
      if (word === '/' || word === 'per') {
        if (power === -1 || (wordDue && word === '/')) return null;
        power = -1;
        wordDue = true;
        this.next += 1;
        continue;
      }
      if (word === '*' || word === '·' || word === '.' || word === '⋅') {
        if (wordDue) return null;
        wordDue = true;
        this.next += 1;
        continue;
      }
      const factor = this.factor();
      if (factor === null) return null;
      result = multiplyDimensions(result, factor, power);
      power = 1;
      wordDue = false;
    }
    return wordDue ? null : result;
  }

  private factor(): Dimension | null {
    const word = this.words[this.next] as string;
    this.next += 1;
    if (word === '(') {
      if (this.depth >= 8) return null;
      this.depth += 1;
      const inner = this.product();
      this.depth -= 1;
      if (inner === null || this.words[this.next] !== ')') return null;
      this.next += 1;
      return multiplyDimensions(DIMENSIONLESS, inner, this.power());
    }
    if (word === '%') return { exponents: new Map(), scale: 0.01 };
    if (/^\d/.test(word))
      return Number(word) > 0 ? { exponents: new Map(), scale: Number(word) ** this.power() } : null;
    if (!/^\p{L}+$/u.test(word)) return null;
    return multiplyDimensions(DIMENSIONLESS, ofWord(word), this.power(true));
  }

  /** A power that follows: `^-2`, `^(1/2)`; after a word also plain digits as in m2 or week-1. */
  private power(afterWord = false): number {
    const word = this.words[this.next];
    // A bare ^ is left standing, so that the text is refused.
    if (word === undefined || word === '^') return 1;
    const written = word.startsWith('^');
    if (!written && !(afterWord && /^[-+]?\d+$/.test(word))) return 1;
    this.next += 1;
    const [above, below = 1] = word
      .replace(/[\^()\s]/g, '')
      .split('/')
      .map(Number);
    return (above ?? 1) / (below || 1);
  }
}

function ofWord(word: string): Dimension {
  const seconds = SECONDS.get(word) ?? SECONDS.get(word.toLowerCase());
  if (seconds !== undefined) return { exponents: new Map([[TIME, 1]]), scale: seconds };
  const singular = word.length > 3 && /[^s]s$/.test(word) ? word.slice(0, -1) : word;
  return { exponents: new Map([[SAME_WORD.get(singular) ?? singular, 1]]), scale: 1 };
}
