/** Names beside the marks of special points, only where they cover neither a mark nor another name. */
import type { TextMark } from './marks';
import type { Palette } from './palette';
import type { PlotLayout } from './plot-layout';
import type { PlotPoint } from './plot-spec';

interface Box {
  readonly x0: number;
  readonly y0: number;
  readonly x1: number;
  readonly y1: number;
}

const SIZE = 12;
const LETTER_WIDTH = 6.3;
const overlap = (a: Box, b: Box) => a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1;

export function nameMarks(
  points: readonly PlotPoint[],
  layout: PlotLayout,
  palette: Palette,
): readonly TextMark[] {
  const taken: Box[] = points.map((point) => {
    const x = layout.x(point.x);
    const y = layout.y(point.y);
    return { x0: x - point.size, y0: y - point.size, x1: x + point.size, y1: y + point.size };
  });
  const marks: TextMark[] = [];
  const right = layout.left + layout.innerWidth;
  for (const point of points.filter((one) => one.named)) {
    const px = layout.x(point.x);
    const py = layout.y(point.y);
    const width = point.label.length * LETTER_WIDTH;
    for (const [sideX, sideY] of [
      [1, -1],
      [-1, -1],
      [1, 1],
      [-1, 1],
    ] as const) {
      const x = px + sideX * (point.size + 2);
      const y = py + sideY * (point.size + 9);
      const x0 = sideX > 0 ? x : x - width;
      const box = { x0, x1: x0 + width, y0: y - SIZE / 2, y1: y + SIZE / 2 };
      const inside = box.x0 >= layout.left && box.x1 <= right + 14 && box.y0 >= 0;
      if (!inside || box.y1 > layout.top + layout.innerHeight || taken.some((other) => overlap(box, other)))
        continue;
      taken.push(box);
      marks.push({
        kind: 'text',
        x,
        y,
        text: point.label,
        size: SIZE,
        colour: point.twin ? palette.muted : palette.ink,
        anchor: sideX > 0 ? 'start' : 'end',
        baseline: 'middle',
        family: 'text',
        weight: 500,
        halo: palette.raised,
      });
      break;
    }
  }
  return marks;
}
