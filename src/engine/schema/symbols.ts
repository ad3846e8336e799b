import { LIMITS } from './limits';

/** The functions of the formula language; with `t` the only reserved names. */
export const FUNCTION_NAMES = ['exp', 'log', 'sqrt', 'abs', 'min', 'max', 'sin', 'cos', 'tanh'] as const;
export type FunctionName = (typeof FUNCTION_NAMES)[number];

/** Time in formulas. */
export const TIME_SYMBOL = 't';

export const RESERVED_SYMBOLS: ReadonlySet<string> = new Set<string>([TIME_SYMBOL, ...FUNCTION_NAMES]);

export const SYMBOL_PATTERN = /^[A-Za-z][A-Za-z0-9_]*$/;

export function isSymbol(text: string): boolean {
  return SYMBOL_PATTERN.test(text) && text.length <= LIMITS.symbolLength && !RESERVED_SYMBOLS.has(text);
}

/** Symbol by which a formula reads a trait's value: `m_y1` for a class, `a_y1_x` for a pair (consumer, resource). */
export function traitEntrySymbol(trait: string, of: readonly string[]): string {
  return [trait, ...of].join('_');
}

/** Key of the dial that moves all spreading traits together, and of one trait's own dial. */
export const SPREAD_KEY = 'dial:spread';
export function traitDialKey(trait: string): string {
  return `dial:${trait}`;
}
