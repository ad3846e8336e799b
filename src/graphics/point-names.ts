/** Names beside the marks of special points: off marks and other names always, off lines where there is room. */
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

/** Pixels x0, y0, x1, y1, … of a line; a step of 4 takes unconnected strokes. */
export interface NameObstacle {
  readonly points: Float64Array;
  readonly step: 2 | 4;
}

const SIZE = 12;
const LETTER_WIDTH = 6.3;
/** Way that a name may stand off its mark, beyond the nearest place. */
const FARTHER = [0, 12, 24] as const;
/** What it costs a name to stand off by one step, in crossed lines. */
const OFF = 0.6;
const SIDES = [
  [1, -1],
  [-1, -1],
  [1, 1],
  [-1, 1],
  [0, -1],
  [0, 1],
  [1, 0],
  [-1, 0],
] as const;

const overlap = (a: Box, b: Box) => a.x0 < b.x1 && b.x0 < a.x1 && a.y0 < b.y1 && b.y0 < a.y1;

/** Whether a straight piece passes through a box: it is clipped to it from both sides. */
export function crosses(box: Box, x0: number, y0: number, x1: number, y1: number): boolean {
  if (Math.max(x0, x1) < box.x0 || Math.min(x0, x1) > box.x1) return false;
  if (Math.max(y0, y1) < box.y0 || Math.min(y0, y1) > box.y1) return false;
  let from = 0;
  let to = 1;
  const clip = (start: number, way: number, low: number, high: number): boolean => {
    if (way === 0) return start >= low && start <= high;
    const a = (low - start) / way;
    const b = (high - start) / way;
    from = Math.max(from, Math.min(a, b));
    to = Math.min(to, Math.max(a, b));
    return from <= to;
  };
  return clip(x0, x1 - x0, box.x0, box.x1) && clip(y0, y1 - y0, box.y0, box.y1);
}

/** How many lines pass through a box. */
function crossings(box: Box, obstacles: readonly NameObstacle[]): number {
  let count = 0;
  for (const { points, step } of obstacles)
    for (let k = 0; k + 3 < points.length; k += step)
      if (crosses(box, points[k] ?? NaN, points[k + 1] ?? NaN, points[k + 2] ?? NaN, points[k + 3] ?? NaN)) {
        count++;
        break;
      }
  return count;
}

interface Place {
  readonly x: number;
  readonly y: number;
  readonly anchor: TextMark['anchor'];
  readonly box: Box;
}

function places(point: PlotPoint, px: number, py: number): readonly (Place & { readonly off: number })[] {
  const width = point.label.length * LETTER_WIDTH;
  return FARTHER.flatMap((farther, off) =>
    SIDES.map(([sideX, sideY]) => {
      const x = px + sideX * (point.size + 2 + farther);
      const y = py + sideY * (point.size + 9 + (sideX === 0 ? farther : farther / 2));
      const x0 = sideX > 0 ? x : sideX < 0 ? x - width : x - width / 2;
      const anchor = sideX > 0 ? ('start' as const) : sideX < 0 ? ('end' as const) : ('middle' as const);
      return { x, y, anchor, off, box: { x0, x1: x0 + width, y0: y - SIZE / 2, y1: y + SIZE / 2 } };
    }),
  );
}

export function nameMarks(
  points: readonly PlotPoint[],
  layout: PlotLayout,
  palette: Palette,
  obstacles: readonly NameObstacle[] = [],
): readonly TextMark[] {
  const taken: Box[] = points.map((point) => {
    const x = layout.x(point.x);
    const y = layout.y(point.y);
    return { x0: x - point.size, y0: y - point.size, x1: x + point.size, y1: y + point.size };
  });
  const right = layout.left + layout.innerWidth + 14;
  const bottom = layout.top + layout.innerHeight;
  const fits = ({ box }: Place) =>
    box.x0 >= layout.left && box.x1 <= right && box.y0 >= 0 && box.y1 <= bottom;
  const marks: TextMark[] = [];
  for (const point of points.filter((one) => one.named)) {
    let best: Place | null = null;
    let least = Infinity;
    for (const place of places(point, layout.x(point.x), layout.y(point.y))) {
      if (place.off * OFF >= least || !fits(place) || taken.some((other) => overlap(place.box, other)))
        continue;
      const cost = place.off * OFF + crossings(place.box, obstacles);
      if (cost < least) [best, least] = [place, cost];
      if (least === 0) break;
    }
    if (!best) continue;
    taken.push(best.box);
    marks.push({
      kind: 'text',
      x: best.x,
      y: best.y,
      text: point.label,
      size: SIZE,
      colour: point.twin ? palette.muted : palette.ink,
      anchor: best.anchor,
      baseline: 'middle',
      family: 'text',
      weight: 500,
      halo: palette.raised,
    });
  }
  return marks;
}
