/** Names beside the marks of special points: off marks and other names always, off lines where there is room. */
import type { TextMark } from './marks';
import type { Palette } from './palette';

export interface Box {
  readonly x0: number;
  readonly y0: number;
  readonly x1: number;
  readonly y1: number;
}

/** A mark in pixels, and its name where it is to have one. */
export interface NamedMark {
  readonly x: number;
  readonly y: number;
  readonly size: number;
  readonly label: string;
  readonly named: boolean;
  readonly twin: boolean;
}

/** Pixels x0, y0, x1, y1, … of a line; a step of 4 takes unconnected strokes. */
export interface NameObstacle {
  readonly points: Float64Array;
  readonly step: 2 | 4;
}

const SIZE = 12;
const LETTER_WIDTH = 6.3;
/** Way that a name may stand off its mark, beyond the nearest place. */
const FARTHER = [0, 12, 24, 36, 48] as const;
/** What it costs a name to stand off by one step, in crossed lines. */
const OFF = 0.35;
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
  readonly off: number;
}

/** Places about a mark, nearest first; one above or below is pushed into the window from its sides. */
function places(mark: NamedMark, window: Box): readonly Place[] {
  const width = mark.label.length * LETTER_WIDTH;
  return FARTHER.flatMap((farther, off) =>
    SIDES.map(([sideX, sideY]): Place => {
      const reach = mark.size + 2 + (sideY === 0 ? farther : farther / 3);
      const middle = Math.min(window.x1 - width / 2, Math.max(window.x0 + width / 2, mark.x));
      const x = sideX === 0 ? middle : mark.x + sideX * reach;
      const y = mark.y + sideY * (mark.size + 9 + farther);
      const x0 = sideX > 0 ? x : sideX < 0 ? x - width : x - width / 2;
      const anchor = sideX > 0 ? 'start' : sideX < 0 ? 'end' : 'middle';
      return { x, y, anchor, off, box: { x0, x1: x0 + width, y0: y - SIZE / 2, y1: y + SIZE / 2 } };
    }),
  );
}

/** @param window within which names must lie, in pixels */
export function nameMarks(
  marks: readonly NamedMark[],
  window: Box,
  palette: Palette,
  obstacles: readonly NameObstacle[] = [],
): readonly TextMark[] {
  const taken: Box[] = marks.map(({ x, y, size }) => ({
    x0: x - size,
    y0: y - size,
    x1: x + size,
    y1: y + size,
  }));
  const fits = ({ box }: Place) =>
    box.x0 >= window.x0 && box.x1 <= window.x1 && box.y0 >= window.y0 && box.y1 <= window.y1;
  const names: TextMark[] = [];
  // The model's own names come first, so that the twin's stand aside.
  const ordered = marks.filter((one) => one.named).sort((a, b) => Number(a.twin) - Number(b.twin));
  for (const mark of ordered) {
    let best: Place | null = null;
    let least = Infinity;
    for (const place of places(mark, window)) {
      if (place.off * OFF >= least) break;
      if (!fits(place) || taken.some((other) => overlap(place.box, other))) continue;
      const cost = place.off * OFF + crossings(place.box, obstacles);
      if (cost < least) [best, least] = [place, cost];
    }
    if (!best) continue;
    taken.push(best.box);
    names.push({
      kind: 'text',
      x: best.x,
      y: best.y,
      text: mark.label,
      size: SIZE,
      colour: mark.twin ? palette.muted : palette.ink,
      anchor: best.anchor,
      baseline: 'middle',
      family: 'text',
      weight: 500,
      halo: palette.raised,
    });
  }
  return names;
}
