import type { Program } from '../expression/index';
import type { NativeSystem } from './contract';
import { instantiateCore } from './instantiate-core';

/**
 * The compiled core over a model's emitted formulas: group 0 of the program is the right-hand side, group 1 its
 * Jacobian. Null where the program has no emitted code, no Jacobian, or the host refuses.
 */
export function bindToCore({ emitted }: Program): NativeSystem | null {
  if (!emitted) return null;
  const [rhs, jacobian] = emitted.groups;
  if (!rhs || !jacobian) return null;
  const { memory, prepare, free, parameters } = emitted;
  const core = instantiateCore(memory, { prepare, rhs, jacobian });
  if (!core) return null;
  const view = new Float64Array(memory.buffer);
  return { core, view, free, room: view.length - free, parameters };
}
