import { time, times, told, type Row } from '../measure';
import { compileBenchModel, EIGHT_CLASSES, THREE_CLASSES, type BenchModel } from '../models';

const CALLS = 20_000;

/** Formulas in WebAssembly against the same as closures: right-hand side and Jacobian. */
export function backendRows(): Row[] {
  return [THREE_CLASSES, EIGHT_CLASSES].flatMap((model) => [
    told(
      `right-hand side, ${model.classes} classes: closures over WebAssembly`,
      ratio(model, (system, u, out) => system.rhs(0, u, out)),
    ),
    told(
      `Jacobian, ${model.classes} classes: closures over WebAssembly`,
      ratio(model, (system, u, out) => system.jacobian(0, u, out)),
    ),
  ]);
}

type System = ReturnType<typeof compileBenchModel>;

function ratio(
  model: BenchModel,
  call: (system: System, u: Float64Array, out: Float64Array) => void,
): string {
  const u = Float64Array.from(model.start);
  const out = new Float64Array(model.classes ** 2);
  const of = (backend: 'wasm' | 'closure'): number => {
    const system = compileBenchModel(model, backend);
    return time(() => {
      for (let k = 0; k < CALLS; k += 1) call(system, u, out);
    }).median;
  };
  const wasm = of('wasm');
  const nanoseconds = Math.round((1e6 * wasm) / CALLS);
  return `${times(of('closure') / wasm)} (${nanoseconds} ns a call)`;
}
