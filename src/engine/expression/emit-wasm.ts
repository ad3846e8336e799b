import type { NodeId } from './graph';
import { OPERANDS, OPERATION } from './operations';
import type { Plan } from './program';
import { assembleModule, ByteList, SIGNATURE, WASM, type ModuleFunction } from './wasm-bytes';

/** Functions of Math that the emitted code imports, so that both backends give the same bits. */
export const IMPORTED_FUNCTIONS = ['exp', 'log', 'sin', 'cos', 'tanh', 'pow'] as const;
const IMPORTED: Readonly<Record<number, number>> = {
  [OPERATION.exp]: 0,
  [OPERATION.log]: 1,
  [OPERATION.sin]: 2,
  [OPERATION.cos]: 3,
  [OPERATION.tanh]: 4,
  [OPERATION.power]: 5,
};

/** Operations that are one instruction. */
const INSTRUCTION: Readonly<Record<number, number>> = {
  [OPERATION.add]: WASM.add,
  [OPERATION.subtract]: WASM.subtract,
  [OPERATION.multiply]: WASM.multiply,
  [OPERATION.divide]: WASM.divide,
  [OPERATION.negate]: WASM.negate,
  [OPERATION.sqrt]: WASM.sqrt,
  [OPERATION.abs]: WASM.abs,
  [OPERATION.minimum]: WASM.minimum,
  [OPERATION.maximum]: WASM.maximum,
};
const COMPARISON: Readonly<Record<number, number>> = {
  [OPERATION.less]: WASM.less,
  [OPERATION.lessEqual]: WASM.lessEqual,
  [OPERATION.equal]: WASM.equal,
  [OPERATION.notEqual]: WASM.notEqual,
};

/** Height of an expression above which an intermediate result is kept, to bound our own recursion. */
const LARGEST_HEIGHT = 60;
/** Locals of a function that engines accept (50,000 in those we know), with a margin. */
const MOST_LOCALS = 40_000;

/** A module's bytes with the layout of its memory, in doubles from the start of the memory. */
export interface EmittedModule {
  readonly bytes: Uint8Array<ArrayBuffer>;
  readonly parameters: number;
  readonly stored: number;
  readonly states: number;
  readonly outputs: number;
  readonly doubles: number;
}

/**
 * Straight-line WebAssembly of a plan: `prepare()` reads the parameters and stores what depends on
 * them alone; `g0`, `g1`, ... (t: f64, u: i32, out: i32) evaluate a group from the state at byte
 * address u into byte address out, which may be anywhere in the imported memory, so that a compiled
 * stepper can call them directly. Null where a function would be larger than engines accept.
 */
export function emitWasm(plan: Plan): EmittedModule | null {
  const parameters = 0;
  const stored = parameters + plan.parameterCount;
  const states = stored + plan.stored.length;
  const outputs = states + plan.stateCount;
  const widest = plan.groups.reduce((most, group) => Math.max(most, group.length), 0);
  const place = new Map(plan.stored.map((node, k) => [node, stored + k]));
  const preparing = new FunctionEmitter(plan, plan.prepared, plan.stored, new Map(), 0);
  const emitters = plan.groups.map(
    (group, k) => new FunctionEmitter(plan, plan.live[k] ?? [], group, place, 3),
  );
  const functions: ModuleFunction[] = [
    { name: 'prepare', signature: SIGNATURE.prepare, ...preparing.emit(null, stored) },
    ...emitters.map((emitter, k) => ({
      name: `g${k}`,
      signature: SIGNATURE.evaluate,
      ...emitter.emit(2, 0),
    })),
  ];
  if (functions.some(({ locals }) => locals > MOST_LOCALS)) return null;
  const imports = IMPORTED_FUNCTIONS.map((name) => ({
    name,
    signature: name === 'pow' ? SIGNATURE.binary : SIGNATURE.unary,
  }));
  const bytes = assembleModule(imports, functions);
  return { bytes, parameters, stored, states, outputs, doubles: outputs + widest };
}

/** Emits one function: intermediate results that are used again into locals, then the outputs. */
class FunctionEmitter {
  private readonly body = new ByteList();
  private readonly uses = new Map<NodeId, number>();
  private readonly local = new Map<NodeId, number>();

  constructor(
    private readonly plan: Plan,
    private readonly nodes: readonly NodeId[],
    private readonly outputs: readonly NodeId[],
    /** Place in memory, in doubles, of nodes that are read from there. */
    private readonly place: ReadonlyMap<NodeId, number>,
    private readonly firstLocal: number,
  ) {
    const count = (node: NodeId): void => void this.uses.set(node, (this.uses.get(node) ?? 0) + 1);
    for (const node of nodes) {
      const operands = OPERANDS[plan.graph.operation(node)] as number;
      for (let k = 0; k < operands; k += 1) count(plan.graph.operand(node, k as 0 | 1 | 2));
    }
    outputs.forEach(count);
  }

  /** @param address Local that holds the address of the outputs, or null for address 0. */
  emit(address: number | null, firstOutput: number): { locals: number; body: ByteList } {
    this.keepStates();
    this.keepShared();
    this.outputs.forEach((output, k) => {
      if (address === null) this.integer(0);
      else this.get(address);
      this.expression(output);
      this.body.push(WASM.store);
      this.body.unsigned(3);
      this.body.unsigned((firstOutput + k) * 8);
    });
    return { locals: this.local.size, body: this.body };
  }

  private keepStates(): void {
    const { graph } = this.plan;
    for (const [node, uses] of this.uses) {
      if (uses > 1 && graph.operation(node) === OPERATION.state) this.keep(node);
    }
  }

  private keepShared(): void {
    const { graph } = this.plan;
    const height = new Map<NodeId, number>();
    for (const node of this.nodes) {
      let above = 0;
      for (const which of [0, 1, 2] as const) {
        above = Math.max(above, height.get(graph.operand(node, which)) ?? 0);
      }
      if ((this.uses.get(node) ?? 0) > 1 || above >= LARGEST_HEIGHT) this.keep(node);
      else height.set(node, above + 1);
    }
  }

  private keep(node: NodeId): void {
    this.expression(node);
    const index = this.firstLocal + this.local.size;
    this.body.push(WASM.localSet);
    this.body.unsigned(index);
    this.local.set(node, index);
  }

  private expression(node: NodeId): void {
    const { graph } = this.plan;
    const kept = this.local.get(node);
    if (kept !== undefined) return this.get(kept);
    const place = this.place.get(node);
    if (place !== undefined) return this.load(null, place);
    const operation = graph.operation(node);
    if (operation === OPERATION.constant) {
      this.body.push(WASM.constant);
      return this.body.double(graph.value(node));
    }
    if (operation === OPERATION.parameter) return this.load(null, graph.value(node));
    if (operation === OPERATION.state) return this.load(1, graph.value(node));
    if (operation === OPERATION.time) return this.get(0);
    if (operation === OPERATION.select) return this.conditional(node);
    this.operands(node);
    const instruction = INSTRUCTION[operation];
    const comparison = COMPARISON[operation];
    if (instruction !== undefined) this.body.push(instruction);
    else if (comparison !== undefined) {
      this.body.push(comparison);
      this.body.push(WASM.toDouble);
    } else {
      this.body.push(WASM.call);
      this.body.unsigned(IMPORTED[operation] as number);
    }
  }

  private operands(node: NodeId): void {
    const { graph } = this.plan;
    const operands = OPERANDS[graph.operation(node)] as number;
    for (let k = 0; k < operands; k += 1) this.expression(graph.operand(node, k as 0 | 1 | 2));
  }

  private conditional(node: NodeId): void {
    const { graph } = this.plan;
    const condition = graph.operand(node, 0);
    this.expression(graph.operand(node, 1));
    this.expression(graph.operand(node, 2));
    const comparison = COMPARISON[graph.operation(condition)];
    if (comparison !== undefined && !this.local.has(condition) && !this.place.has(condition)) {
      this.operands(condition);
      this.body.push(comparison);
    } else {
      this.expression(condition);
      this.body.push(WASM.constant);
      this.body.double(0);
      this.body.push(WASM.notEqual);
    }
    this.body.push(WASM.select);
  }

  /** A double from memory: at an address held by a local, or counted from address 0. */
  private load(address: number | null, place: number): void {
    if (address === null) this.integer(0);
    else this.get(address);
    this.body.push(WASM.load);
    this.body.unsigned(3);
    this.body.unsigned(place * 8);
  }

  private get(local: number): void {
    this.body.push(WASM.localGet);
    this.body.unsigned(local);
  }

  /** A small integer, 0 to 63. */
  private integer(value: number): void {
    this.body.push(WASM.integerConstant);
    this.body.push(value);
  }
}
