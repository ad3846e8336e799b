import { contourSegments, type ContourGrid } from './contour-segments';
import type { PlaneRequest, PlaneResult } from './contract';
import type { PlaneSlice } from './plane-slice';

/**
 * Zero-growth lines of both axes of a plane: where dX/dt = 0 and where dY/dt = 0, with the other
 * states held. Of an axis that cannot go below zero it is growth per head, so that the empty edge
 * itself is no line. Cost: (cells + 1)^2 evaluations and a few a crossing.
 */
export function zeroGrowthLines(slice: PlaneSlice, request: PlaneRequest): PlaneResult['lines'] {
  const cells = Math.max(1, Math.floor(request.cells));
  const width = cells + 1;
  const along = new Float64Array(width * width);
  const across = new Float64Array(width * width);
  const out = new Float64Array(2);
  const [x0, x1] = request.xRange;
  const [y0, y1] = request.yRange;
  const xAt = (column: number): number => x0 + ((x1 - x0) * column) / cells;
  const yAt = (row: number): number => y0 + ((y1 - y0) * row) / cells;
  for (let row = 0; row < width; row += 1)
    for (let column = 0; column < width; column += 1) {
      slice.growthPerHead(xAt(column), yAt(row), out);
      along[row * width + column] = out[0];
      across[row * width + column] = out[1];
    }
  const grid = (values: Float64Array, which: 0 | 1): ContourGrid => ({
    columns: cells,
    rows: cells,
    values,
    xAt,
    yAt,
    valueAt(x, y) {
      slice.growthPerHead(x, y, out);
      return out[which];
    },
  });
  return [
    { state: slice.x, segments: contourSegments(grid(along, 0)) },
    { state: slice.y, segments: contourSegments(grid(across, 1)) },
  ];
}
