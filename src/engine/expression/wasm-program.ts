import { emitWasm, IMPORTED_FUNCTIONS } from './emit-wasm';
import type { Plan, Program } from './program';

/** The part of the host's WebAssembly object that is used; the engine's types know no host. */
interface WasmHost {
  readonly Memory: new (descriptor: { initial: number }) => { readonly buffer: ArrayBuffer };
  readonly Module: new (bytes: Uint8Array<ArrayBuffer>) => object;
  readonly Instance: new (module: object, imports: object) => { readonly exports: Record<string, unknown> };
}

type Evaluate = (t: number, u: number, out: number) => void;

const PAGE_DOUBLES = 8192;

/**
 * Compiles a plan to WebAssembly and runs it, or gives null where the host has no WebAssembly, refuses
 * it, or the plan is too large for it; the closures of `compileClosure` then serve instead.
 *
 * @param workspace doubles of memory left free behind its own
 */
export function compileWasm(plan: Plan, workspace = 0): Program | null {
  const host = (globalThis as { WebAssembly?: WasmHost }).WebAssembly;
  if (host === undefined) return null;
  const emitted = emitWasm(plan);
  if (emitted === null) return null;
  const math = Object.fromEntries(IMPORTED_FUNCTIONS.map((name) => [name, Math[name]]));
  let instance: { readonly exports: Record<string, unknown> };
  let view: Float64Array;
  let memory: { readonly buffer: ArrayBuffer };
  try {
    const doubles = emitted.doubles + workspace;
    memory = new host.Memory({ initial: Math.max(1, Math.ceil(doubles / PAGE_DOUBLES)) });
    instance = new host.Instance(new host.Module(emitted.bytes), { env: { memory }, math });
    view = new Float64Array(memory.buffer);
  } catch {
    return null;
  }
  const { parameterCount, stateCount } = plan;
  const prepare = instance.exports['prepare'] as () => void;
  const groups = plan.groups.map((_, k) => instance.exports[`g${k}`] as Evaluate);
  const widths = plan.groups.map((group) => group.length);
  const { states, outputs } = emitted;
  const [statesAddress, outputsAddress] = [states * 8, outputs * 8];
  return {
    backend: 'wasm',
    emitted: { memory, prepare, groups, parameters: emitted.parameters, free: emitted.doubles },
    prepare(parameters) {
      for (let k = 0; k < parameterCount; k += 1) view[k] = parameters[k] as number;
      prepare();
    },
    evaluate(group, t, u, out) {
      for (let i = 0; i < stateCount; i += 1) view[states + i] = u[i] as number;
      (groups[group] as Evaluate)(t, statesAddress, outputsAddress);
      const width = widths[group] as number;
      for (let i = 0; i < width; i += 1) out[i] = view[outputs + i] as number;
    },
  };
}
