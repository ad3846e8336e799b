import { LIMITS } from '../schema/limits';
import { OPERATION, OPERANDS } from './operations';

/** Index of a node in its graph. Operands always have smaller indices than their node. */
export type NodeId = number;

const DEPENDS_STATE = 1;
const DEPENDS_PARAMETER = 2;
const DEPENDS_TIME = 4;
const FIRST_CAPACITY = 1024;

/**
 * Storage of an expression graph: each node an operation with up to three operands, equal nodes kept
 * once (hash-consing in an open-addressed table). Node 0 is not-a-number and stands in for every
 * node that no longer fits, see `full`.
 */
export class NodeStore {
  protected operations = new Uint8Array(FIRST_CAPACITY);
  private operands = new Int32Array(FIRST_CAPACITY * 3);
  private values = new Float64Array(FIRST_CAPACITY);
  private dependence = new Uint8Array(FIRST_CAPACITY);
  private table = new Int32Array(FIRST_CAPACITY * 2).fill(-1);
  private readonly constants = new Map<number, NodeId>();
  private count = 0;
  private overflowed = false;

  /** @param capacity Number of nodes at which the graph is full. */
  constructor(readonly capacity: number = LIMITS.graphNodes) {
    this.constant(Number.NaN);
  }

  get size(): number {
    return this.count;
  }

  /** True once a node did not fit; nodes made since are not to be used. */
  get full(): boolean {
    return this.overflowed;
  }

  /** Forgets that a node did not fit, for a caller that dropped what it was making. */
  forgiveOverflow(): void {
    this.overflowed = false;
  }

  operation(node: NodeId): number {
    return this.operations[node] as number;
  }

  /** Operand `which` (0, 1 or 2) of a node; -1 where it has none. */
  operand(node: NodeId, which: 0 | 1 | 2): NodeId {
    return this.operands[node * 3 + which] as number;
  }

  /** Value of a constant node; index of a state or parameter node. */
  value(node: NodeId): number {
    return this.values[node] as number;
  }

  isConstant(node: NodeId): boolean {
    return this.operations[node] === OPERATION.constant;
  }

  dependsOnState(node: NodeId): boolean {
    return ((this.dependence[node] as number) & DEPENDS_STATE) !== 0;
  }

  dependsOnParameter(node: NodeId): boolean {
    return ((this.dependence[node] as number) & DEPENDS_PARAMETER) !== 0;
  }

  dependsOnTime(node: NodeId): boolean {
    return ((this.dependence[node] as number) & DEPENDS_TIME) !== 0;
  }

  /** A number; minus zero is stored as zero. */
  constant(value: number): NodeId {
    const known = this.constants.get(value);
    if (known !== undefined) return known;
    const node = this.append(OPERATION.constant, -1, -1, -1, value === 0 ? 0 : value);
    if (node !== 0 || this.count === 1) this.constants.set(value, node);
    return node;
  }

  /** The node with this operation and these operands, made if it is new; no simplification. */
  protected intern(operation: number, a: NodeId, b = -1, c = -1, index = 0): NodeId {
    const mask = this.table.length - 1;
    let slot = hash(operation, a, b, c, index) & mask;
    for (;;) {
      const node = this.table[slot] as number;
      if (node === -1) break;
      if (this.isSame(node, operation, a, b, c, index)) return node;
      slot = (slot + 1) & mask;
    }
    const node = this.append(operation, a, b, c, index);
    if (node === 0) return node;
    this.table[slot] = node;
    if (this.count * 2 > this.table.length) this.rehash();
    return node;
  }

  private isSame(node: NodeId, operation: number, a: NodeId, b: NodeId, c: NodeId, index: number): boolean {
    const at = node * 3;
    return (
      this.operations[node] === operation &&
      this.operands[at] === a &&
      this.operands[at + 1] === b &&
      this.operands[at + 2] === c &&
      this.values[node] === index
    );
  }

  private append(operation: number, a: NodeId, b: NodeId, c: NodeId, value: number): NodeId {
    if (this.count >= this.capacity) {
      this.overflowed = true;
      return 0;
    }
    if (this.count === this.operations.length) this.grow();
    const node = this.count;
    this.count += 1;
    this.operations[node] = operation;
    this.operands.set([a, b, c], node * 3);
    this.values[node] = value;
    let dependence = 0;
    if (operation === OPERATION.state) dependence = DEPENDS_STATE;
    else if (operation === OPERATION.parameter) dependence = DEPENDS_PARAMETER;
    else if (operation === OPERATION.time) dependence = DEPENDS_TIME;
    for (let k = 0; k < (OPERANDS[operation] as number); k += 1) {
      dependence |= this.dependence[this.operands[node * 3 + k] as number] as number;
    }
    this.dependence[node] = dependence;
    return node;
  }

  private grow(): void {
    const size = this.operations.length * 2;
    const [operations, operands] = [new Uint8Array(size), new Int32Array(size * 3)];
    const [values, dependence] = [new Float64Array(size), new Uint8Array(size)];
    operations.set(this.operations);
    operands.set(this.operands);
    values.set(this.values);
    dependence.set(this.dependence);
    Object.assign(this, { operations, operands, values, dependence });
  }

  private rehash(): void {
    this.table = new Int32Array(this.table.length * 2).fill(-1);
    const mask = this.table.length - 1;
    for (let node = 0; node < this.count; node += 1) {
      const operation = this.operations[node] as number;
      if (operation === OPERATION.constant) continue;
      const [a, b, c] = [this.operand(node, 0), this.operand(node, 1), this.operand(node, 2)];
      let slot = hash(operation, a, b, c, this.values[node] as number) & mask;
      while (this.table[slot] !== -1) slot = (slot + 1) & mask;
      this.table[slot] = node;
    }
  }
}

/** Multiplicative mixing of the five words (odd constants of Knuth and of MurmurHash3's finaliser). */
function hash(operation: number, a: number, b: number, c: number, index: number): number {
  let h = Math.imul(operation + 1, 0x9e3779b1) ^ index;
  h = Math.imul(h ^ a, 0x85ebca6b);
  h = Math.imul(h ^ (h >>> 13) ^ b, 0xc2b2ae35);
  h = Math.imul(h ^ (h >>> 16) ^ c, 0x27d4eb2f);
  return (h ^ (h >>> 15)) >>> 0;
}
