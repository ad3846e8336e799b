import { LIMITS } from '../schema/limits';
import type { FormulaFailure } from './tree';

/** A word of a formula, with its place in the text. */
export interface Token {
  readonly kind: 'number' | 'symbol' | 'operator' | 'open' | 'close' | 'comma' | 'question' | 'colon';
  readonly text: string;
  readonly from: number;
  readonly to: number;
}

export type TokenResult =
  | { readonly ok: true; readonly tokens: readonly Token[] }
  | { readonly ok: false; readonly failure: FormulaFailure };

const NUMBER = /(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?/y;
const SYMBOL = /[A-Za-z][A-Za-z0-9_]*/y;
const OPERATOR = /<=|>=|==|!=|[-+*/^<>]/y;
const SINGLE: Readonly<Record<string, Token['kind']>> = {
  '(': 'open',
  ')': 'close',
  ',': 'comma',
  '?': 'question',
  ':': 'colon',
};

/** What is no part of the formula language, why, and what to write instead (null: nothing fits). */
const FOREIGN: readonly (readonly [RegExp, string, string | null])[] = [
  [/\*\*/y, 'Powers are written with ^.', '^'],
  [
    /\.[*/^]/y,
    'Formulas hold single numbers, so the dot before an operator has no meaning; leave it out.',
    '',
  ],
  [/=/y, 'A formula gives a value and assigns nothing; write == to compare.', '=='],
  [/!/y, 'The factorial ! is not part of the formula language; write != for "is not equal to".', null],
  [/%/y, 'The percent sign is not part of the formula language; write 0.05 for 5 percent.', null],
  [/["'`]/y, 'Text in quotation marks is not part of the formula language; use symbols and numbers.', null],
  [/[[\]{}]/y, 'Lists, matrices and braces are not part of the formula language; use parentheses ( ).', null],
  [/;/y, 'A formula is a single expression; leave out the semicolon.', ''],
  [/&&?|\|\|?/y, 'Conditions are joined by nesting them: a < b ? (c < d ? x : y) : y.', null],
  [/[−–—]/y, 'This dash is not the minus sign of the keyboard; write -.', '-'],
  [/[×·⋅∙]/y, 'Multiplication is written with *.', '*'],
  [/[÷∕]/y, 'Division is written with /.', '/'],
  [/≤/y, 'Write <= for "at most".', '<='],
  [/≥/y, 'Write >= for "at least".', '>='],
  [/≠/y, 'Write != for "is not equal to".', '!='],
  [/²/y, 'Powers are written with ^.', '^2'],
  [/³/y, 'Powers are written with ^.', '^3'],
  [/\./y, 'A dot belongs inside a number, as in 0.5; nothing has parts that could be read with a dot.', null],
  [/_/y, 'A symbol starts with a letter; the underscore may only follow.', null],
  [
    /\p{L}[\p{L}\p{N}_]*/uy,
    'Symbols use the letters A to Z, digits and underscores; write the name in words.',
    null,
  ],
];

/**
 * Splits a formula into words, or says which character does not belong and what to write instead.
 * The text's length is checked first, so that the cost is bounded for any input.
 */
export function tokenise(text: string): TokenResult {
  if (text.length > LIMITS.formulaLength) {
    return refuse(
      `This formula has ${text.length} characters and at most ${LIMITS.formulaLength} are allowed; split it into intermediate formulas.`,
      0,
      text.length,
    );
  }
  const tokens: Token[] = [];
  let at = 0;
  while (at < text.length) {
    const character = text.charAt(at);
    if (/\s/.test(character)) {
      at += 1;
      continue;
    }
    const token = readToken(text, at);
    if (token === null) return refuseForeign(text, at);
    if (token.kind === 'symbol' && token.text.length > LIMITS.symbolLength) {
      return refuse(`A symbol has at most ${LIMITS.symbolLength} characters; shorten it.`, at, token.to);
    }
    if (token.kind === 'number' && !Number.isFinite(Number(token.text))) {
      return refuse('This number is too large to be held; write a smaller one.', at, token.to);
    }
    tokens.push(token);
    at = token.to;
  }
  return { ok: true, tokens };
}

function readToken(text: string, from: number): Token | null {
  const number = match(NUMBER, text, from);
  if (number !== null) return { kind: 'number', text: number, from, to: from + number.length };
  const symbol = match(SYMBOL, text, from);
  if (symbol !== null) return { kind: 'symbol', text: symbol, from, to: from + symbol.length };
  const operator = match(OPERATOR, text, from);
  if (operator !== null && text.slice(from, from + 2) !== '**') {
    return { kind: 'operator', text: operator, from, to: from + operator.length };
  }
  const kind = SINGLE[text.charAt(from)];
  return kind === undefined ? null : { kind, text: text.charAt(from), from, to: from + 1 };
}

function refuseForeign(text: string, from: number): TokenResult {
  for (const [pattern, message, suggestion] of FOREIGN) {
    const found = match(pattern, text, from);
    if (found !== null) return refuse(message, from, from + found.length, suggestion);
  }
  const character = String.fromCodePoint(text.codePointAt(from) ?? 0);
  return refuse(
    'This character is not part of the formula language; remove it.',
    from,
    from + character.length,
    '',
  );
}

function match(pattern: RegExp, text: string, from: number): string | null {
  pattern.lastIndex = from;
  return pattern.exec(text)?.[0] ?? null;
}

function refuse(message: string, from: number, to: number, suggestion: string | null = null): TokenResult {
  return { ok: false, failure: { message, range: { from, to }, suggestion } };
}
