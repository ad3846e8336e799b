import { createPreset } from './create';
import { HUES, type PresetDocument } from './preset';
import { isSymbol } from './symbols';

/** A system in the notation of textbooks, to be made into a document of free equations. */
export interface EquationsText {
  /** One a state, in order: `x' = x*(1 - y)`. */
  readonly equations: readonly string[];
  readonly parameters?: Readonly<Record<string, number>>;
  /** Start values; a state left out starts at 1. */
  readonly init?: Readonly<Record<string, number>>;
  /** Where equilibria are sought, by state. */
  readonly box?: Readonly<Record<string, readonly [number, number]>>;
  /** Whether states are densities that stay >= 0, or may take either sign (the default). */
  readonly sign?: 'nonnegative' | 'any';
  readonly title?: string;
}

export type EquationsDocument =
  | { readonly ok: true; readonly document: PresetDocument }
  | { readonly ok: false; readonly line: number; readonly message: string };

const EQUATION = /^\s*([A-Za-z][A-Za-z0-9_]*)\s*'\s*=(?!=)([\s\S]*)$/;
const WORD = /[A-Za-z][A-Za-z0-9_]*/g;

/**
 * A document with one population a state and one signed process an equation. Names in the formulas that are
 * neither states nor given parameters are left for the checks of the definition to mark.
 * Fails with the line (from 0) and a message; what formulas say is not judged here.
 */
export function documentFromEquations(text: EquationsText): EquationsDocument {
  const sides: { readonly symbol: string; readonly formula: string }[] = [];
  for (const [line, equation] of text.equations.entries()) {
    const match = EQUATION.exec(equation);
    if (match === null)
      return { ok: false, line, message: `“${equation.trim().slice(0, 60)}” is not written x' = formula.` };
    const symbol = match[1] ?? '';
    if (!isSymbol(symbol))
      return { ok: false, line, message: `${symbol} cannot name a state; it is reserved or too long.` };
    if (sides.some((side) => side.symbol === symbol))
      return { ok: false, line, message: `${symbol} has two equations.` };
    sides.push({ symbol, formula: (match[2] ?? '').trim() });
  }
  if (sides.length === 0)
    return { ok: false, line: 0, message: "Write at least one equation, such as x' = x*(1 - x)." };
  const clash = Object.keys(text.parameters ?? {}).find((key) => sides.some((side) => side.symbol === key));
  if (clash !== undefined)
    return { ok: false, line: 0, message: `${clash} is both a state and a parameter.` };
  const odd = Object.keys(text.parameters ?? {}).find((key) => !isSymbol(key));
  if (odd !== undefined) return { ok: false, line: 0, message: `${odd} cannot name a parameter.` };
  return { ok: true, document: assemble(text, sides) };
}

function assemble(
  text: EquationsText,
  sides: readonly { symbol: string; formula: string }[],
): PresetDocument {
  return createPreset({
    title: text.title ?? 'Free equations',
    populations: sides.map(({ symbol }, index) => ({
      symbol,
      name: symbol,
      hue: HUES[index % HUES.length] ?? 'slate',
      sign: text.sign ?? 'any',
      classes: [{ symbol, name: symbol, start: text.init?.[symbol] ?? 1, shade: 1 }],
    })),
    parameters: Object.entries(text.parameters ?? {}).map(([symbol, value]) => ({
      symbol,
      name: symbol,
      value,
      ...sliderRange(value),
    })),
    processes: sides.map(({ symbol, formula }) => ({
      id: `equation-${symbol}`,
      name: `Equation of ${symbol}`,
      kind: 'equation' as const,
      rate: formula,
      effects: [{ class: symbol, amount: '1' }],
      signed: true,
    })),
    box: Object.entries(text.box ?? {}).map(([symbol, [from, to]]) => ({ class: symbol, from, to })),
  });
}

/** A range around a value that a slider can use: from nought to three times the value, or -1 to 1 about nought. */
function sliderRange(value: number): { readonly min: number; readonly max: number } {
  if (value === 0) return { min: -1, max: 1 };
  return value > 0 ? { min: 0, max: 3 * value } : { min: 3 * value, max: 0 };
}

/** Names in equations that are neither states nor reserved: what a form asks values for. */
export function parameterNamesIn(equations: readonly string[]): string[] {
  const states = new Set(
    equations.map((equation) => EQUATION.exec(equation)?.[1]).filter((name) => name !== undefined),
  );
  const names = new Set<string>();
  for (const equation of equations) {
    for (const [name] of (EQUATION.exec(equation)?.[2] ?? '').matchAll(WORD)) {
      if (isSymbol(name) && !states.has(name)) names.add(name);
    }
  }
  return [...names];
}
