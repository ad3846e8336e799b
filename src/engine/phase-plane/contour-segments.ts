/** Where a contour leaves a cell: the edge's number on the grid, and the place on it. */
interface EdgeCrossing {
  readonly edge: number;
  readonly x: number;
  readonly y: number;
}

/** A regular grid of values: values[row * (columns + 1) + column] at the corners of the cells. */
export interface ContourGrid {
  readonly columns: number;
  readonly rows: number;
  readonly values: Float64Array;
  xAt(column: number): number;
  yAt(row: number): number;
  /** Value anywhere, to sharpen a crossing; NaN where there is none. */
  valueAt(x: number, y: number): number;
}

/**
 * Each crossing is sharpened beyond linear interpolation: halvings first, which no pole at the end of an
 * edge can mislead, then false position down to a share of the edge.
 */
const SHARPENING = { halvings: 5, steps: 10, tolerance: 1e-5 } as const;

/**
 * Zero contours on a grid by marching squares; saddle cells are decided by the value in the middle.
 * Cells with a corner that is not finite are left out. Source: Lorensen & Cline (1987) in two
 * dimensions (from memory).
 *
 * @returns x0,y0,x1,y1 per segment; segments of one contour follow each other end to start.
 */
export function contourSegments(grid: ContourGrid): Float64Array {
  const crossings = new Map<number, EdgeCrossing>();
  const pairs: [EdgeCrossing, EdgeCrossing][] = [];
  for (let row = 0; row < grid.rows; row += 1)
    for (let column = 0; column < grid.columns; column += 1) crossCell(grid, column, row, crossings, pairs);
  return joinSegments(pairs);
}

/** Horizontal edges have even numbers, vertical ones odd, by the corner they start at. */
function crossCell(
  grid: ContourGrid,
  column: number,
  row: number,
  crossings: Map<number, EdgeCrossing>,
  pairs: [EdgeCrossing, EdgeCrossing][],
): void {
  const { columns, values } = grid;
  const width = columns + 1;
  const corner = row * width + column;
  const corners = [corner, corner + 1, corner + 1 + width, corner + width];
  const at = corners.map((index) => values[index]);
  if (!at.every(Number.isFinite)) return;
  const positive = at.map((value) => value > 0);
  const kind = positive.reduce((bits, up, k) => bits + (up ? 1 << k : 0), 0);
  if (kind === 0 || kind === 15) return;
  const edges = [2 * corner, 2 * (corner + 1) + 1, 2 * (corner + width), 2 * corner + 1];
  const x = [grid.xAt(column), grid.xAt(column + 1)];
  const y = [grid.yAt(row), grid.yAt(row + 1)];
  const places = [
    [x[0], y[0]],
    [x[1], y[0]],
    [x[1], y[1]],
    [x[0], y[1]],
  ];
  const cross = (side: number): EdgeCrossing => {
    const known = crossings.get(edges[side]);
    if (known) return known;
    const from = side;
    const to = (side + 1) % 4;
    const fraction = sharpenCrossing(grid, places[from], places[to], at[from], at[to]);
    const crossing = {
      edge: edges[side],
      x: places[from][0] + fraction * (places[to][0] - places[from][0]),
      y: places[from][1] + fraction * (places[to][1] - places[from][1]),
    };
    crossings.set(edges[side], crossing);
    return crossing;
  };
  const sides = [0, 1, 2, 3].filter((side) => positive[side] !== positive[(side + 1) % 4]);
  if (sides.length === 2) {
    pairs.push([cross(sides[0]), cross(sides[1])]);
    return;
  }
  const middle = grid.valueAt((x[0] + x[1]) / 2, (y[0] + y[1]) / 2) > 0;
  // Corners 0 and 2 share a sign: the middle says whether they are joined.
  const joined = middle === positive[0];
  pairs.push(joined ? [cross(0), cross(1)] : [cross(3), cross(0)]);
  pairs.push(joined ? [cross(2), cross(3)] : [cross(1), cross(2)]);
}

/** Fraction of the edge at which the value vanishes, by bisection and false position (Illinois rule). */
function sharpenCrossing(
  grid: ContourGrid,
  from: readonly number[],
  to: readonly number[],
  valueFrom: number,
  valueTo: number,
): number {
  let low = 0;
  let high = 1;
  let atLow = valueFrom;
  let atHigh = valueTo;
  let before = Number.NaN;
  for (let k = 0; ; k += 1) {
    const halve = k < SHARPENING.halvings;
    const fraction = halve ? (low + high) / 2 : low - (atLow * (high - low)) / (atHigh - atLow);
    if (k === SHARPENING.steps || Math.abs(fraction - before) < SHARPENING.tolerance) return fraction;
    before = fraction;
    const value = grid.valueAt(
      from[0] + fraction * (to[0] - from[0]),
      from[1] + fraction * (to[1] - from[1]),
    );
    if (!Number.isFinite(value) || value === 0) return fraction;
    if (value > 0 === valueFrom > 0) {
      low = fraction;
      atLow = value;
      if (!halve) atHigh /= 2;
    } else {
      high = fraction;
      atHigh = value;
      if (!halve) atLow /= 2;
    }
  }
}

/** Orders segments into chains, open ones from an end, then closed ones. */
function joinSegments(pairs: readonly (readonly [EdgeCrossing, EdgeCrossing])[]): Float64Array {
  const touching = new Map<number, number[]>();
  pairs.forEach(([a, b], k) => {
    for (const { edge } of [a, b]) touching.set(edge, [...(touching.get(edge) ?? []), k]);
  });
  const out = new Float64Array(4 * pairs.length);
  const used = new Uint8Array(pairs.length);
  let filled = 0;
  const follow = (first: number, start: EdgeCrossing): void => {
    let k: number | undefined = first;
    let from = start;
    while (k !== undefined) {
      const [a, b]: readonly [EdgeCrossing, EdgeCrossing] = pairs[k];
      const to: EdgeCrossing = a.edge === from.edge ? b : a;
      used[k] = 1;
      out.set([from.x, from.y, to.x, to.y], filled);
      filled += 4;
      from = to;
      k = touching.get(to.edge)?.find((next) => used[next] === 0);
    }
  };
  pairs.forEach(([a, b], k) => {
    const end = [a, b].find(({ edge }) => touching.get(edge)?.length === 1);
    if (used[k] === 0 && end) follow(k, end);
  });
  pairs.forEach(([a], k) => {
    if (used[k] === 0) follow(k, a);
  });
  return out;
}
