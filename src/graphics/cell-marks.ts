/** Cells of a map as rectangles: neighbours of one colour in a row are drawn as one. */
import type { RectMark } from './marks';
import type { PlotLayout } from './plot-layout';
import type { PlotCells } from './plot-spec';

/** Value at the middle of the k-th cell of an axis. */
export function cellCentre(axis: PlotCells['x'], k: number): number {
  return axis.from + ((axis.to - axis.from) * (k + 0.5)) / axis.count;
}

export function cellMarks({ x, y, colour }: PlotCells, layout: PlotLayout): RectMark[] {
  const marks: RectMark[] = [];
  const edge = (axis: PlotCells['x'], k: number): number =>
    axis.from + ((axis.to - axis.from) * k) / axis.count;
  for (let iy = 0; iy < y.count; iy += 1) {
    const [one, other] = [layout.y(edge(y, iy)), layout.y(edge(y, iy + 1))];
    const top = Math.min(one, other);
    const height = Math.abs(other - one);
    for (let ix = 0; ix < x.count;) {
      const fill = colour(iy * x.count + ix);
      let end = ix + 1;
      while (end < x.count && colour(iy * x.count + end) === fill) end += 1;
      if (fill !== null) {
        const [from, to] = [layout.x(edge(x, ix)), layout.x(edge(x, end))];
        // Half a pixel more hides the seams between cells.
        marks.push({
          kind: 'rect',
          x: Math.min(from, to),
          y: top,
          width: Math.abs(to - from) + 0.5,
          height: height + 0.5,
          fill,
        });
      }
      ix = end;
    }
  }
  return marks;
}
