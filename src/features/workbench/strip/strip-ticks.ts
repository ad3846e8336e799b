import type { MarkedPoint } from '../state/store';

export interface StripTick {
  readonly point: MarkedPoint;
  readonly twin: boolean;
  /** Position along the strip, from 0 to 1. */
  readonly at: number;
  /** Row its name stands in; null where there is no room for it. */
  readonly row: number | null;
  /** Which part of its name stands at the tick: names near an end of the strip stay within it. */
  readonly side: 'start' | 'middle' | 'end';
}

const LETTER = 6.6;
const ROWS = 2;
const GAP = 8;
/** Share of the strip within which two points of one kind, on two branches, are one tick. */
const SAME_PLACE = 1e-4;

/** Places the names of ticks in two rows without overlap; points of the split model come first. */
export function placeTicks(
  points: readonly { readonly point: MarkedPoint; readonly twin: boolean }[],
  from: number,
  to: number,
  width: number,
): readonly StripTick[] {
  const ends = Array.from({ length: ROWS }, () => [] as { x0: number; x1: number }[]);
  const within = points.filter(
    ({ point }) => point.feasible && point.parameter >= from && point.parameter <= to,
  );
  const ordered = [...within].sort(
    (a, b) => Number(a.twin) - Number(b.twin) || a.point.parameter - b.point.parameter,
  );
  const distinct = ordered.filter(
    (one, k) =>
      !ordered
        .slice(0, k)
        .some(
          (other) =>
            other.twin === one.twin &&
            other.point.kind === one.point.kind &&
            Math.abs(other.point.parameter - one.point.parameter) < (to - from) * SAME_PLACE,
        ),
  );
  return distinct.map(({ point, twin }) => {
    const at = to > from ? (point.parameter - from) / (to - from) : 0;
    const half = ((point.kind.length + (twin ? 6 : 0)) * LETTER) / 2;
    const side = at * width < half ? 'start' : (1 - at) * width < half ? 'end' : 'middle';
    const centre = at * width + (side === 'start' ? half : side === 'end' ? -half : 0);
    const box = { x0: centre - half - GAP / 2, x1: centre + half + GAP / 2 };
    const row = ends.findIndex((taken) => taken.every((other) => box.x1 < other.x0 || box.x0 > other.x1));
    if (row >= 0) ends[row]?.push(box);
    return { point, twin, at, row: row >= 0 ? row : null, side };
  });
}
