import { symbolToTex } from './symbol-tex';
import type { CallNode, CompareOperator, FormulaNode } from './tree';

export interface TexOptions {
  /** TeX of a symbol, or null for the usual one. What it gives is the caller's to keep safe. */
  readonly symbol?: (name: string) => string | null;
}

/** How tightly a form binds; an operand that binds less than its place asks for gets parentheses. */
const BINDING = {
  conditional: 0,
  sum: 1,
  negation: 2,
  product: 3,
  fraction: 4,
  call: 4,
  power: 5,
  atom: 6,
} as const;

interface Piece {
  readonly tex: string;
  readonly binding: number;
}

/**
 * TeX of a formula, with as few parentheses as keep its meaning: quotients as fractions, products side by
 * side, conditionals as cases, a comparison used as a number in square brackets (Iverson's
 * notation). Made of our own macros, numbers and `symbolToTex` alone: no text of the user's passes through.
 */
export function toTex(tree: FormulaNode, options: TexOptions = {}): string {
  return new Writer(options).write(tree).tex;
}

class Writer {
  constructor(private readonly options: TexOptions) {}

  write(node: FormulaNode): Piece {
    switch (node.kind) {
      case 'number':
        return numberPiece(node.value);
      case 'symbol':
        return { tex: this.options.symbol?.(node.name) ?? symbolToTex(node.name), binding: BINDING.atom };
      case 'negate':
        return { tex: `-${this.at(node.operand, BINDING.product)}`, binding: BINDING.negation };
      case 'binary':
        return this.binary(node.operator, node.left, node.right);
      case 'compare':
        return {
          tex: `\\left[${this.comparison(node.operator, node.left, node.right)}\\right]`,
          binding: BINDING.atom,
        };
      case 'call':
        return this.call(node);
      case 'conditional':
        return { tex: this.cases(node), binding: BINDING.conditional };
    }
  }

  /** TeX of an operand, in parentheses where it binds less tightly than asked. */
  private at(node: FormulaNode, binding: number): string {
    const piece = this.write(node);
    return piece.binding >= binding ? piece.tex : parenthesise(piece.tex);
  }

  private binary(operator: string, left: FormulaNode, right: FormulaNode): Piece {
    switch (operator) {
      case '+':
        // A sum on the right needs no parentheses unless it begins with a minus sign.
        return { tex: `${this.at(left, BINDING.sum)} + ${this.afterPlus(right)}`, binding: BINDING.sum };
      case '-':
        return {
          tex: `${this.at(left, BINDING.sum)} - ${this.at(right, BINDING.product)}`,
          binding: BINDING.sum,
        };
      case '*':
        return this.product(left, right);
      case '/':
        return {
          tex: `\\frac{${this.write(left).tex}}{${this.write(right).tex}}`,
          binding: BINDING.fraction,
        };
      default:
        return { tex: `${this.base(left)}^{${this.write(right).tex}}`, binding: BINDING.power };
    }
  }

  private afterPlus(right: FormulaNode): string {
    const piece = this.write(right);
    return piece.binding >= BINDING.sum && !piece.tex.startsWith('-') ? piece.tex : parenthesise(piece.tex);
  }

  private product(left: FormulaNode, right: FormulaNode): Piece {
    const first = this.at(left, BINDING.negation);
    const second = this.at(right, BINDING.product);
    // Two numbers side by side would read as one.
    const join = /^[\d.]/.test(second) ? ' \\cdot ' : ' \\, ';
    const binding = first.startsWith('-') ? BINDING.negation : BINDING.product;
    return { tex: `${first}${join}${second}`, binding };
  }

  private base(node: FormulaNode): string {
    const tex = this.at(node, BINDING.atom);
    return node.kind === 'symbol' && tex.length > 1 ? `{${tex}}` : tex;
  }

  private call(node: CallNode): Piece {
    const values = node.arguments.map((argument) => this.write(argument).tex);
    const list = values.join(',\\, ');
    switch (node.name) {
      case 'sqrt':
        return { tex: `\\sqrt{${list}}`, binding: BINDING.atom };
      case 'abs':
        return { tex: `\\left|${list}\\right|`, binding: BINDING.atom };
      case 'log':
        return { tex: `\\ln${parenthesise(list)}`, binding: BINDING.call };
      default:
        return { tex: `\\${node.name}${parenthesise(list)}`, binding: BINDING.call };
    }
  }

  private comparison(operator: CompareOperator, left: FormulaNode, right: FormulaNode): string {
    return `${this.at(left, BINDING.sum)} ${RELATION[operator]} ${this.at(right, BINDING.sum)}`;
  }

  private cases(node: Extract<FormulaNode, { kind: 'conditional' }>): string {
    const { condition } = node;
    const when =
      condition.kind === 'compare'
        ? this.comparison(condition.operator, condition.left, condition.right)
        : `${this.at(condition, BINDING.sum)} \\neq 0`;
    const [then, otherwise] = [this.write(node.then).tex, this.write(node.otherwise).tex];
    return `\\begin{cases} ${then} & \\text{if } ${when} \\\\ ${otherwise} & \\text{otherwise} \\end{cases}`;
  }
}

const RELATION: Readonly<Record<CompareOperator, string>> = {
  '<': '<',
  '<=': '\\le',
  '>': '>',
  '>=': '\\ge',
  '==': '=',
  '!=': '\\neq',
};

function parenthesise(tex: string): string {
  return `\\left(${tex}\\right)`;
}

/** A number as read; powers of ten written out. */
function numberPiece(value: number): Piece {
  const [mantissa = '0', exponent] = String(value).split('e');
  if (exponent === undefined) return { tex: mantissa, binding: BINDING.atom };
  const power = `10^{${Number(exponent)}}`;
  if (mantissa === '1') return { tex: power, binding: BINDING.power };
  return { tex: `${mantissa} \\cdot ${power}`, binding: BINDING.product };
}
