import { cellCentre } from '@/graphics/cell-marks';
import type { PlotCells } from '@/graphics/plot-spec';

/**
 * Where the values of a map pass zero, as unconnected strokes x0, y0, x1, y1: in each square of four cell centres
 * the zeros on its sides, by straight lines between the values, are joined. Squares with a cell without a
 * number are left out.
 */
export function zeroContour({ x, y, value }: PlotCells): {
  readonly x: Float64Array;
  readonly y: Float64Array;
} {
  const [xs, ys]: [number[], number[]] = [[], []];
  for (let iy = 0; iy + 1 < y.count; iy += 1)
    for (let ix = 0; ix + 1 < x.count; ix += 1) {
      const zeros = zerosOfSquare(ix, iy, x.count, value);
      // Two zeros make one stroke; four, a saddle, make two.
      for (let k = 0; k + 1 < zeros.length; k += 2)
        for (const [across, up] of [zeros[k], zeros[k + 1]]) {
          xs.push(cellCentre(x, across));
          ys.push(cellCentre(y, up));
        }
    }
  return { x: Float64Array.from(xs), y: Float64Array.from(ys) };
}

type Place = readonly [across: number, up: number];

function zerosOfSquare(ix: number, iy: number, width: number, value: PlotCells['value']): readonly Place[] {
  const corners: readonly Place[] = [
    [ix, iy],
    [ix + 1, iy],
    [ix + 1, iy + 1],
    [ix, iy + 1],
  ];
  const values = corners.map(([across, up]) => value(up * width + across));
  if (values.some(Number.isNaN)) return [];
  return corners.flatMap(([ax, ay], k): Place[] => {
    const [bx = 0, by = 0] = corners[(k + 1) % 4] ?? [];
    const [a = 0, b = 0] = [values[k], values[(k + 1) % 4]];
    if (a > 0 === b > 0) return [];
    const share = a / (a - b);
    return [[ax + share * (bx - ax), ay + share * (by - ay)]];
  });
}
