import { OPERATION } from './operations';
import type { NodeId } from './graph';
import type { Plan, Program } from './program';

type Step = (v: Float64Array) => void;

/**
 * Evaluates a plan by one closure an operation over a table of values: the backend where WebAssembly
 * is missing, and the oracle that the other one is checked against. Order and operations are the
 * same in both, so that values agree to the last bit.
 */
export function compileClosure(plan: Plan): Program {
  const slots = assignSlots(plan);
  const { graph } = plan;
  const slotOf = (node: NodeId): number => slots.of.get(node) ?? -1;
  const stepOf = (node: NodeId): Step =>
    makeStep(
      graph.operation(node),
      slotOf(node),
      slotOf(graph.operand(node, 0)),
      slotOf(graph.operand(node, 1)),
      slotOf(graph.operand(node, 2)),
    );
  const preparing = plan.prepared.map(stepOf);
  const live = plan.live.map((nodes) => nodes.map(stepOf));
  const outputs = plan.groups.map((group) => Int32Array.from(group, slotOf));
  const v = slots.values;
  return {
    backend: 'closure',
    prepare(parameters) {
      for (let k = 0; k < plan.parameterCount; k += 1) {
        v[slots.firstParameter + k] = parameters[k] as number;
      }
      for (const step of preparing) step(v);
    },
    evaluate(group, t, u, out) {
      for (let i = 0; i < plan.stateCount; i += 1) v[i] = u[i] as number;
      v[plan.stateCount] = t;
      for (const step of live[group] as readonly Step[]) step(v);
      const places = outputs[group] as Int32Array;
      for (let i = 0; i < places.length; i += 1) out[i] = v[places[i] as number] as number;
    },
  };
}

/** Layout of the table: states, time, parameters, then every other node that is needed. */
function assignSlots(plan: Plan) {
  const { graph, stateCount, parameterCount } = plan;
  const of = new Map<NodeId, number>();
  const constants: [number, number][] = [];
  const firstParameter = stateCount + 1;
  let next = firstParameter + parameterCount;
  const place = (node: NodeId): void => {
    if (node < 0 || of.has(node)) return;
    const operation = graph.operation(node);
    if (operation === OPERATION.state) of.set(node, graph.value(node));
    else if (operation === OPERATION.time) of.set(node, stateCount);
    else if (operation === OPERATION.parameter) of.set(node, firstParameter + graph.value(node));
    else {
      if (operation === OPERATION.constant) constants.push([next, graph.value(node)]);
      of.set(node, next);
      next += 1;
    }
  };
  for (const nodes of [plan.prepared, ...plan.live]) {
    for (const node of nodes) {
      for (const which of [0, 1, 2] as const) place(graph.operand(node, which));
      place(node);
    }
  }
  for (const group of plan.groups) for (const output of group) place(output);
  const values = new Float64Array(next);
  for (const [slot, value] of constants) values[slot] = value;
  return { of, values, firstParameter };
}

function makeStep(operation: number, r: number, a: number, b: number, c: number): Step {
  const at = (v: Float64Array, k: number): number => v[k] as number;
  switch (operation) {
    case OPERATION.add:
      return (v) => void (v[r] = at(v, a) + at(v, b));
    case OPERATION.subtract:
      return (v) => void (v[r] = at(v, a) - at(v, b));
    case OPERATION.multiply:
      return (v) => void (v[r] = at(v, a) * at(v, b));
    case OPERATION.divide:
      return (v) => void (v[r] = at(v, a) / at(v, b));
    case OPERATION.negate:
      return (v) => void (v[r] = -at(v, a));
    case OPERATION.power:
      return (v) => void (v[r] = Math.pow(at(v, a), at(v, b)));
    case OPERATION.exp:
      return (v) => void (v[r] = Math.exp(at(v, a)));
    case OPERATION.log:
      return (v) => void (v[r] = Math.log(at(v, a)));
    case OPERATION.sqrt:
      return (v) => void (v[r] = Math.sqrt(at(v, a)));
    case OPERATION.abs:
      return (v) => void (v[r] = Math.abs(at(v, a)));
    case OPERATION.sin:
      return (v) => void (v[r] = Math.sin(at(v, a)));
    case OPERATION.cos:
      return (v) => void (v[r] = Math.cos(at(v, a)));
    case OPERATION.tanh:
      return (v) => void (v[r] = Math.tanh(at(v, a)));
    case OPERATION.minimum:
      return (v) => void (v[r] = Math.min(at(v, a), at(v, b)));
    case OPERATION.maximum:
      return (v) => void (v[r] = Math.max(at(v, a), at(v, b)));
    case OPERATION.less:
      return (v) => void (v[r] = at(v, a) < at(v, b) ? 1 : 0);
    case OPERATION.lessEqual:
      return (v) => void (v[r] = at(v, a) <= at(v, b) ? 1 : 0);
    case OPERATION.equal:
      return (v) => void (v[r] = at(v, a) === at(v, b) ? 1 : 0);
    case OPERATION.notEqual:
      return (v) => void (v[r] = at(v, a) !== at(v, b) ? 1 : 0);
    case OPERATION.select:
      return (v) => void (v[r] = at(v, a) !== 0 ? at(v, b) : at(v, c));
    default:
      throw new Error(`Operation ${operation} is a leaf and computes nothing.`);
  }
}
