import { NodeStore, type NodeId } from './node-store';
import { applyOperation, COMMUTATIVE, OPERANDS, OPERATION } from './operations';

export type { NodeId } from './node-store';

/** Largest whole exponent that is written out as products. */
export const LARGEST_UNROLLED_POWER = 16;

/**
 * Expressions over states, parameters and time with all equal subexpressions shared.
 *
 * Nodes are simplified as they are made: constants are folded, and 0 + x, x - 0, x - x, 1*x, x/1,
 * -(-x), x + (-y), x^1, x^0, equal branches and decided conditionals are reduced; x^k with a whole
 * |k| <= 16 becomes products and x^0.5 a square root. Each of these keeps the value (powers to within
 * rounding) wherever the operands are finite. So does 0*x = 0, which is what keeps Jacobians sparse:
 * it differs only where x itself is infinite or undefined, e.g. 0*log(n) at n = 0 counts as 0.
 * Quotients 0/x and x/x are left alone, since they are undefined at the finite point x = 0.
 */
export class ExpressionGraph extends NodeStore {
  state(index: number): NodeId {
    return this.intern(OPERATION.state, -1, -1, -1, index);
  }

  parameter(index: number): NodeId {
    return this.intern(OPERATION.parameter, -1, -1, -1, index);
  }

  time(): NodeId {
    return this.intern(OPERATION.time, -1);
  }

  add(a: NodeId, b: NodeId): NodeId {
    if (this.isNumber(a, 0)) return b;
    if (this.isNumber(b, 0)) return a;
    if (this.is(b, OPERATION.negate)) return this.subtract(a, this.operand(b, 0));
    if (this.is(a, OPERATION.negate)) return this.subtract(b, this.operand(a, 0));
    return this.make(OPERATION.add, a, b);
  }

  subtract(a: NodeId, b: NodeId): NodeId {
    if (this.isNumber(b, 0)) return a;
    if (this.isNumber(a, 0)) return this.negate(b);
    if (a === b) return this.constant(0);
    if (this.is(b, OPERATION.negate)) return this.add(a, this.operand(b, 0));
    return this.make(OPERATION.subtract, a, b);
  }

  negate(a: NodeId): NodeId {
    if (this.is(a, OPERATION.negate)) return this.operand(a, 0);
    if (this.is(a, OPERATION.subtract))
      return this.make(OPERATION.subtract, this.operand(a, 1), this.operand(a, 0));
    return this.make(OPERATION.negate, a);
  }

  multiply(a: NodeId, b: NodeId): NodeId {
    if (this.isNumber(a, 0) || this.isNumber(b, 0)) return this.constant(0);
    if (this.isNumber(a, 1)) return b;
    if (this.isNumber(b, 1)) return a;
    if (this.isNumber(a, -1)) return this.negate(b);
    if (this.isNumber(b, -1)) return this.negate(a);
    if (this.is(a, OPERATION.negate)) return this.negate(this.multiply(this.operand(a, 0), b));
    if (this.is(b, OPERATION.negate)) return this.negate(this.multiply(a, this.operand(b, 0)));
    return this.make(OPERATION.multiply, a, b);
  }

  divide(a: NodeId, b: NodeId): NodeId {
    if (this.isNumber(b, 1)) return a;
    if (this.isNumber(b, -1)) return this.negate(a);
    if (this.is(a, OPERATION.negate)) return this.negate(this.divide(this.operand(a, 0), b));
    if (this.is(b, OPERATION.negate)) return this.negate(this.divide(a, this.operand(b, 0)));
    return this.make(OPERATION.divide, a, b);
  }

  power(a: NodeId, b: NodeId): NodeId {
    if (this.isConstant(a) && this.isConstant(b)) return this.make(OPERATION.power, a, b);
    if (this.isConstant(b)) {
      const exponent = this.value(b);
      if (exponent === 0.5) return this.sqrt(a);
      if (Number.isInteger(exponent) && Math.abs(exponent) <= LARGEST_UNROLLED_POWER) {
        const positive = this.wholePower(a, Math.abs(exponent));
        return exponent < 0 ? this.divide(this.constant(1), positive) : positive;
      }
    }
    if (this.isNumber(a, 1)) return a;
    return this.make(OPERATION.power, a, b);
  }

  exp(a: NodeId): NodeId {
    return this.make(OPERATION.exp, a);
  }

  log(a: NodeId): NodeId {
    return this.make(OPERATION.log, a);
  }

  sqrt(a: NodeId): NodeId {
    return this.make(OPERATION.sqrt, a);
  }

  abs(a: NodeId): NodeId {
    return this.make(OPERATION.abs, this.is(a, OPERATION.negate) ? this.operand(a, 0) : a);
  }

  sin(a: NodeId): NodeId {
    return this.make(OPERATION.sin, a);
  }

  cos(a: NodeId): NodeId {
    return this.make(OPERATION.cos, a);
  }

  tanh(a: NodeId): NodeId {
    return this.make(OPERATION.tanh, a);
  }

  min(a: NodeId, b: NodeId): NodeId {
    return a === b ? a : this.make(OPERATION.minimum, a, b);
  }

  max(a: NodeId, b: NodeId): NodeId {
    return a === b ? a : this.make(OPERATION.maximum, a, b);
  }

  /** 1 where a < b, else 0. */
  less(a: NodeId, b: NodeId): NodeId {
    return this.make(OPERATION.less, a, b);
  }

  lessEqual(a: NodeId, b: NodeId): NodeId {
    return this.make(OPERATION.lessEqual, a, b);
  }

  equal(a: NodeId, b: NodeId): NodeId {
    return this.make(OPERATION.equal, a, b);
  }

  notEqual(a: NodeId, b: NodeId): NodeId {
    return this.make(OPERATION.notEqual, a, b);
  }

  /** `then` where the condition is not 0, else `otherwise`. */
  select(condition: NodeId, then: NodeId, otherwise: NodeId): NodeId {
    if (then === otherwise) return then;
    if (this.isConstant(condition)) return this.value(condition) !== 0 ? then : otherwise;
    return this.make(OPERATION.select, condition, then, otherwise);
  }

  /** Sum of nodes; 0 for none. */
  sum(nodes: Iterable<NodeId>): NodeId {
    let total = this.constant(0);
    for (const node of nodes) total = this.add(total, node);
    return total;
  }

  /** The node of an operation by its code, simplified; leaves are given back as they are. */
  combine(operation: number, a: NodeId, b: NodeId, c: NodeId): NodeId {
    switch (operation) {
      case OPERATION.add:
        return this.add(a, b);
      case OPERATION.subtract:
        return this.subtract(a, b);
      case OPERATION.multiply:
        return this.multiply(a, b);
      case OPERATION.divide:
        return this.divide(a, b);
      case OPERATION.negate:
        return this.negate(a);
      case OPERATION.power:
        return this.power(a, b);
      case OPERATION.abs:
        return this.abs(a);
      case OPERATION.minimum:
        return this.min(a, b);
      case OPERATION.maximum:
        return this.max(a, b);
      case OPERATION.select:
        return this.select(a, b, c);
      default:
        return this.make(operation, a, b);
    }
  }

  isNumber(node: NodeId, value: number): boolean {
    return this.isConstant(node) && this.value(node) === value;
  }

  private is(node: NodeId, operation: number): boolean {
    return this.operation(node) === operation;
  }

  /** Folds constants, orders the operands of commutative operations, and interns. */
  private make(operation: number, a: NodeId, b: NodeId = -1, c: NodeId = -1): NodeId {
    const operands = OPERANDS[operation] as number;
    const folds =
      this.isConstant(a) && (operands < 2 || this.isConstant(b)) && (operands < 3 || this.isConstant(c));
    if (folds) {
      const [x, y, z] = [this.value(a), operands > 1 ? this.value(b) : 0, operands > 2 ? this.value(c) : 0];
      return this.constant(applyOperation(operation, x, y, z));
    }
    return b < a && COMMUTATIVE.has(operation)
      ? this.intern(operation, b, a, c)
      : this.intern(operation, a, b, c);
  }

  /** a^k for k >= 0 by repeated squaring (binary method: Knuth, TAOCP 2, sect. 4.6.3). */
  private wholePower(a: NodeId, exponent: number): NodeId {
    if (exponent === 0) return this.constant(1);
    if (exponent === 1) return a;
    const half = this.wholePower(a, Math.floor(exponent / 2));
    const square = this.multiply(half, half);
    return exponent % 2 === 0 ? square : this.multiply(square, a);
  }
}
