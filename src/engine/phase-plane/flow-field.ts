import type { PlaneRequest } from './contract';
import type { PlaneSlice } from './plane-slice';

/**
 * Direction of the flow at the middles of a grid of arrows * arrows cells of the plane.
 *
 * @returns x, y, dx, dy of each arrow in the units of the axes, of length 1 when measured in the ranges.
 *   Arrows where the flow rests or is not finite are left out.
 */
export function flowField(slice: PlaneSlice, request: PlaneRequest): Float64Array {
  const side = Math.max(0, Math.floor(request.arrows));
  const arrows = new Float64Array(4 * side * side);
  const out = new Float64Array(2);
  const [x0, x1] = request.xRange;
  const [y0, y1] = request.yRange;
  let filled = 0;
  for (let row = 0; row < side; row += 1)
    for (let column = 0; column < side; column += 1) {
      const x = x0 + ((x1 - x0) * (column + 0.5)) / side;
      const y = y0 + ((y1 - y0) * (row + 0.5)) / side;
      slice.growth(x, y, out);
      const length = Math.hypot(out[0] / (x1 - x0), out[1] / (y1 - y0));
      if (!(length > 0) || length === Infinity) continue;
      arrows[filled] = x;
      arrows[filled + 1] = y;
      arrows[filled + 2] = out[0] / length;
      arrows[filled + 3] = out[1] / length;
      filled += 4;
    }
  return arrows.slice(0, filled);
}
