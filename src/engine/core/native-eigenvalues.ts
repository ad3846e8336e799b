import type { CoreExports } from './contract';
import { instantiateCore } from './instantiate-core';

/** Part of the host's WebAssembly object. */
interface MemoryHost {
  readonly Memory: new (descriptor: { initial: number }) => {
    readonly buffer: ArrayBuffer;
    grow(pages: number): number;
  };
}

const PAGE_DOUBLES = 8192;
const nothing = (): void => undefined;

interface Kernel {
  readonly core: CoreExports;
  readonly memory: InstanceType<MemoryHost['Memory']>;
  view: Float64Array;
}

let kernel: Kernel | null | undefined;

function kernelFor(doubles: number): Kernel | null {
  if (kernel === undefined) {
    const host = (globalThis as { WebAssembly?: MemoryHost }).WebAssembly;
    const memory = host ? new host.Memory({ initial: 1 }) : null;
    const core = memory && instantiateCore(memory, { prepare: nothing, rhs: nothing, jacobian: nothing });
    kernel = memory && core ? { core, memory, view: new Float64Array(memory.buffer) } : null;
  }
  if (kernel && kernel.view.length < doubles) {
    try {
      kernel.memory.grow(Math.ceil((doubles - kernel.view.length) / PAGE_DOUBLES));
    } catch {
      return null;
    }
    kernel.view = new Float64Array(kernel.memory.buffer);
  }
  return kernel;
}

/**
 * Eigenvalues of a finite real matrix by the compiled core, in no particular order; null where it cannot be had,
 * else whether the iteration converged.
 *
 * @param a n*n, row-major; not written to. @param re, im length n, written
 */
export function nativeEigenvalues(
  a: Float64Array,
  n: number,
  re: Float64Array,
  im: Float64Array,
): boolean | null {
  const found = kernelFor(n * n + 4 * n);
  if (found === null) return null;
  const { core, view } = found;
  view.set(a.subarray(0, n * n), 0);
  const [r, i, work] = [n * n, n * n + n, n * n + 2 * n];
  const count = core.eigenvalues(n, 0, r * 8, i * 8, work * 8);
  re.set(view.subarray(r, r + n));
  im.set(view.subarray(i, i + n));
  return count === n;
}
