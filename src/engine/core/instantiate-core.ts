import type { CoreExports, ModelExports, SharedMemory } from './contract';
import { CORE_BYTES } from './core-bytes';

/** The part of the host's WebAssembly object that is used; the engine's types know no host. */
interface WasmHost {
  readonly Module: new (bytes: Uint8Array<ArrayBuffer>) => object;
  readonly Instance: new (module: object, imports: object) => { readonly exports: unknown };
}

const ALPHABET = 'ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789+/';

/** Compiled once; null where the host has no WebAssembly or refuses it. */
let compiled: object | null | undefined;

function coreModule(host: WasmHost | undefined): object | null {
  if (compiled !== undefined) return compiled;
  try {
    compiled = host ? new host.Module(fromBase64(CORE_BYTES)) : null;
  } catch {
    compiled = null;
  }
  return compiled;
}

/** The kernels over a memory and a model's formulas; null where the host cannot have them. */
export function instantiateCore(memory: SharedMemory, model: ModelExports): CoreExports | null {
  const host = (globalThis as { WebAssembly?: WasmHost }).WebAssembly;
  const module = coreModule(host);
  if (host === undefined || module === null) return null;
  try {
    const { exp, log, pow } = Math;
    const instance = new host.Instance(module, { env: { memory }, model, math: { exp, log, pow } });
    return instance.exports as CoreExports;
  } catch {
    return null;
  }
}

/** Decodes base64 without help of the host, which differs between page, worker and command line. */
function fromBase64(text: string): Uint8Array<ArrayBuffer> {
  const padding = text.endsWith('==') ? 2 : text.endsWith('=') ? 1 : 0;
  const bytes = new Uint8Array((text.length / 4) * 3 - padding);
  let at = 0;
  for (let k = 0; k < text.length; k += 4) {
    let bits = 0;
    for (let j = 0; j < 4; j += 1) bits = (bits << 6) | Math.max(ALPHABET.indexOf(text[k + j] ?? '='), 0);
    for (const shift of [16, 8, 0]) if (at < bytes.length) bytes[at++] = (bits >> shift) & 255;
  }
  return bytes;
}
