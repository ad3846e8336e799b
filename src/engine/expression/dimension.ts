import type { BinaryNode, CallNode, FormulaNode } from './tree';
import {
  BARE_NUMBER,
  describeDimension,
  DIMENSIONLESS,
  multiplyDimensions,
  sameExponents,
  sameScale,
  type Dimension,
} from './units';

/** A place in a formula where units do not fit, in words. */
export interface UnitProblem {
  readonly message: string;
  readonly range: { readonly from: number; readonly to: number };
}

export interface DimensionReport {
  /** Dimension of the whole formula; null where it cannot be known. */
  readonly dimension: Dimension | null;
  readonly problems: readonly UnitProblem[];
}

/**
 * Dimension of a formula from those of its symbols, and the places where units do not fit. A symbol
 * whose unit is unknown (null) fits everywhere. Bare numbers have no unit, except that 0 fits
 * everywhere; where a bare number multiplies, a difference between units of time is taken as converted.
 */
export function dimensionOf(
  tree: FormulaNode,
  unitOf: (symbol: string) => Dimension | null,
): DimensionReport {
  const check = new DimensionCheck(unitOf);
  const dimension = check.of(tree);
  return { dimension, problems: check.problems };
}

class DimensionCheck {
  readonly problems: UnitProblem[] = [];

  constructor(private readonly unitOf: (symbol: string) => Dimension | null) {}

  of(node: FormulaNode): Dimension | null {
    switch (node.kind) {
      case 'number':
        return node.value === 0 ? null : BARE_NUMBER;
      case 'symbol':
        return this.unitOf(node.name);
      case 'negate':
        return this.of(node.operand);
      case 'binary':
        return this.binary(node);
      case 'compare':
        this.common(node, 'compares', 'with', [node.left, node.right]);
        return DIMENSIONLESS;
      case 'call':
        return this.call(node);
      case 'conditional':
        this.of(node.condition);
        return this.common(node, 'chooses between', 'and', [node.then, node.otherwise]);
    }
  }

  private binary(node: BinaryNode): Dimension | null {
    if (node.operator === '+') return this.common(node, 'adds', 'to', [node.right, node.left]);
    if (node.operator === '-') return this.common(node, 'subtracts', 'from', [node.right, node.left]);
    if (node.operator === '^') return this.power(node);
    const [left, right] = [this.of(node.left), this.of(node.right)];
    if (left === null || right === null) return null;
    return multiplyDimensions(left, right, node.operator === '*' ? 1 : -1);
  }

  /** Dimension that all parts share; those that are unknown fit. */
  private common(
    node: FormulaNode,
    verb: string,
    preposition: string,
    parts: readonly FormulaNode[],
  ): Dimension | null {
    let shared: Dimension | null = null;
    for (const part of parts) {
      const dimension = this.of(part);
      if (dimension === null) continue;
      if (shared === null) shared = dimension;
      else if (!sameExponents(shared, dimension)) {
        this.report(node, `This ${verb} ${quantity(shared)} ${preposition} ${quantity(dimension)}.`);
        return null;
      } else if (!sameScale(shared, dimension)) {
        this.report(
          node,
          `This ${verb} ${quantity(shared)} ${preposition} ${quantity(dimension)}; convert one of them.`,
        );
      }
      if (shared.scale === null && dimension.scale !== null) shared = dimension;
    }
    return shared;
  }

  private power(node: BinaryNode): Dimension | null {
    const base = this.of(node.left);
    this.unitless(node.right, 'An exponent');
    if (base === null) return null;
    const exponent = literalValue(node.right);
    if (exponent !== null) return multiplyDimensions(DIMENSIONLESS, base, exponent);
    if (base.exponents.size === 0) return base;
    this.report(
      node,
      `A quantity in ${describeDimension(base)} is raised to a power that is not a plain number, so its unit is undefined; divide it by a reference first.`,
    );
    return null;
  }

  private call(node: CallNode): Dimension | null {
    const [first] = node.arguments;
    if (first === undefined) return null;
    switch (node.name) {
      case 'min':
      case 'max':
        return this.common(node, 'compares', 'with', node.arguments);
      case 'abs':
        return this.of(first);
      case 'sqrt': {
        const inner = this.of(first);
        return inner === null ? null : multiplyDimensions(DIMENSIONLESS, inner, 0.5);
      }
      default:
        this.unitless(first, `The argument of ${node.name}`);
        return DIMENSIONLESS;
    }
  }

  private unitless(node: FormulaNode, what: string): void {
    const dimension = this.of(node);
    if (dimension === null) return;
    if (dimension.exponents.size > 0) {
      this.report(node, `${what} should have no unit, and this has ${describeDimension(dimension)}.`);
    } else if (!sameScale(dimension, DIMENSIONLESS)) {
      this.report(
        node,
        `${what} mixes units of one kind (a factor of ${Number(dimension.scale?.toPrecision(6))}); convert one of them.`,
      );
    }
  }

  private report(node: FormulaNode, message: string): void {
    this.problems.push({ message, range: { from: node.from, to: node.to } });
  }
}

function quantity(dimension: Dimension): string {
  return dimension.exponents.size === 0 ? 'a number without unit' : describeDimension(dimension);
}

/** Value of a part made of numbers, signs, products and quotients alone, else null. */
function literalValue(node: FormulaNode): number | null {
  if (node.kind === 'number') return node.value;
  if (node.kind === 'negate') {
    const value = literalValue(node.operand);
    return value === null ? null : -value;
  }
  if (node.kind !== 'binary') return null;
  const [a, b] = [literalValue(node.left), literalValue(node.right)];
  if (a === null || b === null) return null;
  if (node.operator === '/') return a / b;
  if (node.operator === '*') return a * b;
  if (node.operator === '+') return a + b;
  return node.operator === '-' ? a - b : a ** b;
}
