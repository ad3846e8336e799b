/**
 * Operations of the expression graph, with their value on numbers. Both backends and constant folding
 * use these meanings, so that they agree to the last bit: elementary functions are those of Math,
 * the rest is IEEE arithmetic.
 */
export const OPERATION = {
  constant: 0,
  state: 1,
  parameter: 2,
  time: 3,
  add: 4,
  subtract: 5,
  multiply: 6,
  divide: 7,
  negate: 8,
  power: 9,
  exp: 10,
  log: 11,
  sqrt: 12,
  abs: 13,
  sin: 14,
  cos: 15,
  tanh: 16,
  minimum: 17,
  maximum: 18,
  less: 19,
  lessEqual: 20,
  equal: 21,
  notEqual: 22,
  /** a is not 0 ? b : c; both are evaluated. */
  select: 23,
} as const;
export type Operation = (typeof OPERATION)[keyof typeof OPERATION];

/** Number of operands by operation. */
export const OPERANDS: readonly number[] = [
  0, 0, 0, 0, 2, 2, 2, 2, 1, 2, 1, 1, 1, 1, 1, 1, 1, 2, 2, 2, 2, 2, 2, 3,
];

/** Operations whose operands may be swapped. */
export const COMMUTATIVE: ReadonlySet<number> = new Set([
  OPERATION.add,
  OPERATION.multiply,
  OPERATION.minimum,
  OPERATION.maximum,
  OPERATION.equal,
  OPERATION.notEqual,
]);

/** Operations that may have no derivative somewhere. */
export const KINKED: ReadonlySet<number> = new Set([
  OPERATION.abs,
  OPERATION.minimum,
  OPERATION.maximum,
  OPERATION.less,
  OPERATION.lessEqual,
  OPERATION.equal,
  OPERATION.notEqual,
  OPERATION.select,
]);

/** Value of an operation on numbers; leaves have none and give NaN. */
export function applyOperation(operation: number, a: number, b: number, c: number): number {
  switch (operation) {
    case OPERATION.add:
      return a + b;
    case OPERATION.subtract:
      return a - b;
    case OPERATION.multiply:
      return a * b;
    case OPERATION.divide:
      return a / b;
    case OPERATION.negate:
      return -a;
    case OPERATION.power:
      return Math.pow(a, b);
    case OPERATION.exp:
      return Math.exp(a);
    case OPERATION.log:
      return Math.log(a);
    case OPERATION.sqrt:
      return Math.sqrt(a);
    case OPERATION.abs:
      return Math.abs(a);
    case OPERATION.sin:
      return Math.sin(a);
    case OPERATION.cos:
      return Math.cos(a);
    case OPERATION.tanh:
      return Math.tanh(a);
    case OPERATION.minimum:
      return Math.min(a, b);
    case OPERATION.maximum:
      return Math.max(a, b);
    case OPERATION.less:
      return a < b ? 1 : 0;
    case OPERATION.lessEqual:
      return a <= b ? 1 : 0;
    case OPERATION.equal:
      return a === b ? 1 : 0;
    case OPERATION.notEqual:
      return a !== b ? 1 : 0;
    case OPERATION.select:
      return a !== 0 ? b : c;
    default:
      return Number.NaN;
  }
}
