import type { NativeSystem } from '../core/contract';
import { CELL_WINDOW } from '../core/workspace';
import type { CompiledSystem } from '../system/contract';
import type { MarginCells } from './margin-cells';

/** Cells solved in the compiled core, constant for constant as `marginCells`; see there. */
export function nativeMarginCells(
  system: CompiledSystem,
  native: NativeSystem,
  p: Float64Array,
  [columnX, columnY]: readonly [number, number],
): MarginCells {
  const n = system.dimension;
  const { core, view, free, parameters } = native;
  const [xAt, yAt] = [free, free + CELL_WINDOW];
  const marginsAt = free + 2 * CELL_WINDOW;
  const statesAt = free + 3 * CELL_WINDOW;
  const workAt = statesAt + CELL_WINDOW * n;
  return {
    solve(count, x, y, states, margins) {
      // All other parameters; the kernel sets the two of each cell.
      system.setParameters(p);
      for (let from = 0; from < count; from += CELL_WINDOW) {
        const some = Math.min(CELL_WINDOW, count - from);
        view.set(x.subarray(from, from + some), xAt);
        view.set(y.subarray(from, from + some), yAt);
        view.set(states.subarray(from * n, (from + some) * n), statesAt);
        core.marginCells(
          n,
          some,
          xAt * 8,
          yAt * 8,
          (parameters + columnX) * 8,
          (parameters + columnY) * 8,
          statesAt * 8,
          marginsAt * 8,
          workAt * 8,
        );
        states.set(view.subarray(statesAt, statesAt + some * n), from * n);
        margins.set(view.subarray(marginsAt, marginsAt + some), from);
      }
      if (count === 0) return;
      p[columnX] = x[count - 1];
      p[columnY] = y[count - 1];
      system.setParameters(p);
    },
  };
}
