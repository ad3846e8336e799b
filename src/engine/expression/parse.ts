import {
  create,
  parseDependencies,
  type MathNode,
  type OperatorNode,
  type FunctionNode,
  type ConditionalNode,
  type ParenthesisNode,
} from 'mathjs/number';

import { LIMITS } from '../schema/limits';
import { checkGrammar, isFunctionName } from './grammar';
import { tokenise, type Token } from './tokens';
import {
  visit,
  type BinaryOperator,
  type CompareOperator,
  type FormulaFailure,
  type FormulaNode,
} from './tree';

export type ParseResult =
  | { readonly ok: true; readonly tree: FormulaNode }
  | { readonly ok: false; readonly failure: FormulaFailure };

const mathjs = create({ parseDependencies }, {});

/**
 * Text of a formula to its checked tree, or a refusal in words with its place.
 *
 * The words of the text are checked first (length, characters, order, nesting), then written anew
 * for mathjs with every number and name replaced by a neutral one of our own: mathjs settles
 * precedence and grouping alone and never meets a name it gives a meaning to (`e`, `i`, `mod`, `in`,
 * units). Its tree is then rebuilt as ours, leaf by leaf in the order of the text, which is how each
 * node gets its character range. Precedence: `^` (to the right), unary minus, `* /`, `+ -`,
 * comparisons, `? :`.
 */
export function parseFormula(text: string): ParseResult {
  const words = tokenise(text);
  if (!words.ok) return words;
  const problem = checkGrammar(words.tokens, text);
  if (problem !== null) return { ok: false, failure: problem };
  const whole = { from: 0, to: text.length };
  let parsed: MathNode;
  try {
    parsed = mathjs.parse(words.tokens.map(neutralWord).join(' '));
  } catch {
    return refuse('This formula cannot be read; simplify it or split it into intermediate formulas.', whole);
  }
  const converted = new Conversion(words.tokens).convert(parsed);
  if (converted === null) {
    return refuse(
      'Comparisons cannot be chained; compare two values at a time, as in a < b ? (b < c ? 1 : 0) : 0.',
      whole,
    );
  }
  let count = 0;
  visit(converted.node, () => (count += 1));
  if (count > LIMITS.formulaNodes) {
    return refuse(
      `This formula has ${count} parts and at most ${LIMITS.formulaNodes} are allowed; split it into intermediate formulas.`,
      whole,
    );
  }
  return { ok: true, tree: converted.node };
}

function refuse(message: string, range: { from: number; to: number }): ParseResult {
  return { ok: false, failure: { message, range, suggestion: null } };
}

function neutralWord(token: Token, k: number): string {
  return token.kind === 'number' || token.kind === 'symbol' ? `v${k}` : token.text;
}

/** A node with its extent in the text, enclosing parentheses included. */
interface Placed {
  readonly node: FormulaNode;
  readonly from: number;
  readonly to: number;
}

const BINARY: ReadonlySet<string> = new Set(['+', '-', '*', '/', '^']);
const COMPARE: ReadonlySet<string> = new Set(['<', '<=', '>', '>=', '==', '!=']);

/** Rebuilds the tree of mathjs as ours. A null stands for a construct that is not in the language. */
class Conversion {
  /** Partner of each parenthesis token, by index. */
  private readonly partner: ReadonlyMap<number, number>;
  private readonly indexAt: ReadonlyMap<number, number>;

  constructor(private readonly tokens: readonly Token[]) {
    this.partner = pairParentheses(tokens);
    this.indexAt = new Map(tokens.map((token, k) => [token.from, k]));
  }

  convert(source: MathNode): Placed | null {
    switch (source.type) {
      case 'SymbolNode':
        return this.leaf(Number((source as unknown as { name: string }).name.slice(1)));
      case 'ParenthesisNode': {
        const inner = this.convert((source as ParenthesisNode).content);
        return inner === null ? null : this.enclosed(inner);
      }
      case 'OperatorNode':
        return this.operator(source as OperatorNode);
      case 'FunctionNode':
        return this.call(source as FunctionNode);
      case 'ConditionalNode':
        return this.conditional(source as ConditionalNode);
      default:
        return null;
    }
  }

  private leaf(index: number): Placed | null {
    const token = this.tokens[index];
    if (token === undefined) return null;
    const { from, to } = token;
    const node: FormulaNode =
      token.kind === 'number'
        ? { kind: 'number', value: Number(token.text), from, to }
        : { kind: 'symbol', name: token.text, from, to };
    return { node, from, to };
  }

  /** Widens the extent by the pair of parentheses just outside it. */
  private enclosed(inner: Placed): Placed {
    const open = (this.indexAt.get(inner.from) ?? 0) - 1;
    const close = this.partner.get(open);
    const [first, last] = [this.tokens[open], close === undefined ? undefined : this.tokens[close]];
    return first === undefined || last === undefined ? inner : { ...inner, from: first.from, to: last.to };
  }

  private operator(source: OperatorNode): Placed | null {
    const [first, second] = source.args.map((argument) => this.convert(argument));
    const operator: string = source.op;
    if (first === undefined || first === null) return null;
    if (second === undefined) {
      if (operator !== '-') return null;
      const sign = this.tokens[(this.indexAt.get(first.from) ?? 0) - 1];
      const from = sign?.from ?? first.from;
      return placed({ kind: 'negate', operand: first.node, from, to: first.to });
    }
    if (second === null) return null;
    const ends = { left: first.node, right: second.node, from: first.from, to: second.to };
    if (BINARY.has(operator))
      return placed({ kind: 'binary', operator: operator as BinaryOperator, ...ends });
    if (COMPARE.has(operator))
      return placed({ kind: 'compare', operator: operator as CompareOperator, ...ends });
    return null;
  }

  private call(source: FunctionNode): Placed | null {
    const index = Number((source.fn as unknown as { name: string }).name.slice(1));
    const name = this.tokens[index];
    const close = this.tokens[this.partner.get(index + 1) ?? -1];
    if (name === undefined || close === undefined || !isFunctionName(name.text)) return null;
    const values: FormulaNode[] = [];
    for (const argument of source.args) {
      const value = this.convert(argument);
      if (value === null) return null;
      values.push(value.node);
    }
    return placed({ kind: 'call', name: name.text, arguments: values, from: name.from, to: close.to });
  }

  private conditional(source: ConditionalNode): Placed | null {
    const condition = this.convert(source.condition);
    const then = this.convert(source.trueExpr);
    const otherwise = this.convert(source.falseExpr);
    if (condition === null || then === null || otherwise === null) return null;
    return placed({
      kind: 'conditional',
      condition: condition.node,
      then: then.node,
      otherwise: otherwise.node,
      from: condition.from,
      to: otherwise.to,
    });
  }
}

function placed(node: FormulaNode): Placed {
  return { node, from: node.from, to: node.to };
}

function pairParentheses(tokens: readonly Token[]): ReadonlyMap<number, number> {
  const partner = new Map<number, number>();
  const open: number[] = [];
  tokens.forEach((token, k) => {
    if (token.kind === 'open') open.push(k);
    else if (token.kind === 'close') partner.set(open.pop() ?? -1, k);
  });
  return partner;
}
