import type { NodeId } from './graph';
import { OPERATION } from './operations';
import type { Plan } from './program';

/** Value and first three derivatives of a quantity along a line, d^k/ds^k at s = 0. */
type Jet = Float64Array;
const ORDERS = 4;

export interface TaylorProgram {
  prepare(parameters: Float64Array): void;
  /**
   * out[(k-1)*m + i] = d^k/ds^k output_i(t, u + s v) at s = 0 for k = 1, 2, 3 and m outputs of group 0.
   * Where a branch switches, the derivatives are those of the branch active at s = 0.
   */
  evaluate(t: number, u: Float64Array, v: Float64Array, out: Float64Array): void;
  /** out[i] = d output_i / d parameter k at (t, u). */
  byParameter(t: number, u: Float64Array, k: number, out: Float64Array): void;
}

/**
 * Derivatives along a direction by truncated Taylor arithmetic on the graph of a plan's first group:
 * Leibniz for products, the chain rule of Faa di Bruno to order three for functions
 * (Griewank & Walther, Evaluating Derivatives, ch. 13, from memory). Exact up to rounding.
 * Cost: about twenty multiplications a node; meant for normal forms, not for inner loops.
 */
export function compileTaylor(plan: Plan): TaylorProgram {
  const { graph, groups, prepared } = plan;
  const outputs = groups[0] ?? [];
  const nodes = plan.live[0] ?? [];
  const jets = new Map<NodeId, Jet>();
  const place = (node: NodeId): void => {
    if (node < 0 || jets.has(node)) return;
    const jet = new Float64Array(ORDERS);
    if (graph.isConstant(node)) jet[0] = graph.value(node);
    jets.set(node, jet);
  };
  for (const node of [...prepared, ...nodes]) {
    for (const which of [0, 1, 2] as const) place(graph.operand(node, which));
    place(node);
  }
  outputs.forEach(place);
  const jetOf = (node: NodeId): Jet => jets.get(node) ?? new Float64Array(ORDERS);
  const run = (order: readonly NodeId[]): void => {
    for (const node of order) {
      const [a, b, c] = [graph.operand(node, 0), graph.operand(node, 1), graph.operand(node, 2)];
      advance(graph.operation(node), jetOf(node), jetOf(a), jetOf(b), jetOf(c));
    }
  };
  const leaves = [...jets].filter(([node]) => graph.operation(node) === OPERATION.parameter);
  const moving = [...jets].filter(([node]) => graph.operation(node) === OPERATION.state);
  const clock = jets.get(graph.time());
  const setPoint = (t: number, u: Float64Array, v: Float64Array | null): void => {
    if (clock !== undefined) clock[0] = t;
    for (const [node, jet] of moving) {
      jet[0] = u[graph.value(node)] as number;
      jet[1] = v === null ? 0 : (v[graph.value(node)] as number);
    }
  };
  const setSlope = (k: number, slope: number): void => {
    for (const [node, jet] of leaves) if (graph.value(node) === k) jet[1] = slope;
    run(prepared);
  };
  return {
    prepare(parameters) {
      for (const [node, jet] of leaves) jet[0] = parameters[graph.value(node)] as number;
      run(prepared);
    },
    byParameter(t, u, k, out) {
      setPoint(t, u, null);
      setSlope(k, 1);
      run(nodes);
      outputs.forEach((node, i) => {
        out[i] = jetOf(node)[1] as number;
      });
      setSlope(k, 0);
    },
    evaluate(t, u, v, out) {
      setPoint(t, u, v);
      run(nodes);
      outputs.forEach((node, i) => {
        const jet = jetOf(node);
        for (let k = 1; k < ORDERS; k += 1) out[(k - 1) * outputs.length + i] = jet[k] as number;
      });
    },
  };
}

function advance(operation: number, r: Jet, a: Jet, b: Jet, c: Jet): void {
  const x = a[0] as number;
  switch (operation) {
    case OPERATION.add:
      return combine(r, a, b, 1);
    case OPERATION.subtract:
      return combine(r, a, b, -1);
    case OPERATION.negate:
      for (let k = 0; k < ORDERS; k += 1) r[k] = -(a[k] as number);
      return;
    case OPERATION.multiply:
      return multiply(r, a, b);
    case OPERATION.divide:
      return divide(r, a, b);
    case OPERATION.power:
      return power(r, a, b);
    case OPERATION.minimum:
      return copy(r, x <= (b[0] as number) ? a : b);
    case OPERATION.maximum:
      return copy(r, x >= (b[0] as number) ? a : b);
    case OPERATION.select:
      return copy(r, x !== 0 ? b : c);
    case OPERATION.abs:
      return compose(r, a, [Math.abs(x), x < 0 ? -1 : 1, 0, 0]);
    case OPERATION.exp: {
      const value = Math.exp(x);
      return compose(r, a, [value, value, value, value]);
    }
    case OPERATION.log:
      return compose(r, a, [Math.log(x), 1 / x, -1 / (x * x), 2 / (x * x * x)]);
    case OPERATION.sqrt: {
      const root = Math.sqrt(x);
      return compose(r, a, [root, 0.5 / root, -0.25 / (x * root), 0.375 / (x * x * root)]);
    }
    case OPERATION.sin:
      return compose(r, a, [Math.sin(x), Math.cos(x), -Math.sin(x), -Math.cos(x)]);
    case OPERATION.cos:
      return compose(r, a, [Math.cos(x), -Math.sin(x), -Math.cos(x), Math.sin(x)]);
    case OPERATION.tanh: {
      const value = Math.tanh(x);
      const slope = 1 - value * value;
      return compose(r, a, [value, slope, -2 * value * slope, slope * (6 * value * value - 2)]);
    }
    default:
      return compose(r, a, [compare(operation, x, b[0] as number), 0, 0, 0]);
  }
}

function compare(operation: number, x: number, y: number): number {
  if (operation === OPERATION.less) return x < y ? 1 : 0;
  if (operation === OPERATION.lessEqual) return x <= y ? 1 : 0;
  if (operation === OPERATION.equal) return x === y ? 1 : 0;
  return x !== y ? 1 : 0;
}

function combine(r: Jet, a: Jet, b: Jet, sign: number): void {
  for (let k = 0; k < ORDERS; k += 1) r[k] = (a[k] as number) + sign * (b[k] as number);
}

function copy(r: Jet, a: Jet): void {
  for (let k = 0; k < ORDERS; k += 1) r[k] = a[k] as number;
}

function multiply(r: Jet, a: Jet, b: Jet): void {
  const [a0, a1, a2, a3] = read(a);
  const [b0, b1, b2, b3] = read(b);
  r[0] = a0 * b0;
  r[1] = a1 * b0 + a0 * b1;
  r[2] = a2 * b0 + 2 * a1 * b1 + a0 * b2;
  r[3] = a3 * b0 + 3 * a2 * b1 + 3 * a1 * b2 + a0 * b3;
}

function divide(r: Jet, a: Jet, b: Jet): void {
  const [a0, a1, a2, a3] = read(a);
  const [b0, b1, b2, b3] = read(b);
  const q0 = a0 / b0;
  const q1 = (a1 - q0 * b1) / b0;
  const q2 = (a2 - 2 * q1 * b1 - q0 * b2) / b0;
  r[0] = q0;
  r[1] = q1;
  r[2] = q2;
  r[3] = (a3 - 3 * q2 * b1 - 3 * q1 * b2 - q0 * b3) / b0;
}

/** f(a(s)) from f and its derivatives at a(0). A vanishing factor outweighs an infinite derivative. */
function compose(r: Jet, a: Jet, [f0, f1, f2, f3]: readonly [number, number, number, number]): void {
  const [, a1, a2, a3] = read(a);
  r[0] = f0;
  r[1] = times(f1, a1);
  r[2] = times(f2, a1 * a1) + times(f1, a2);
  r[3] = times(f3, a1 * a1 * a1) + times(3 * f2, a1 * a2) + times(f1, a3);
}

function times(derivative: number, factor: number): number {
  return factor === 0 ? 0 : derivative * factor;
}

/** a^b: by the derivatives of the power where b stands still, else as exp(b log a). */
function power(r: Jet, a: Jet, b: Jet): void {
  const [a0] = read(a);
  const [b0, b1, b2, b3] = read(b);
  if (b1 === 0 && b2 === 0 && b3 === 0) {
    const falling = (k: number, factor: number): number => (factor === 0 ? 0 : factor * Math.pow(a0, b0 - k));
    const [second, third] = [b0 * (b0 - 1), b0 * (b0 - 1) * (b0 - 2)];
    return compose(r, a, [Math.pow(a0, b0), falling(1, b0), falling(2, second), falling(3, third)]);
  }
  const exponent = new Float64Array(ORDERS);
  compose(exponent, a, [Math.log(a0), 1 / a0, -1 / (a0 * a0), 2 / (a0 * a0 * a0)]);
  multiply(exponent, exponent, b);
  const value = Math.pow(a0, b0);
  compose(r, exponent, [value, value, value, value]);
}

function read(jet: Jet): readonly [number, number, number, number] {
  return [jet[0] as number, jet[1] as number, jet[2] as number, jet[3] as number];
}
