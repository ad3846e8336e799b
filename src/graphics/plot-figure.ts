/** Turns a plot into marks: grid, bands, lines, flow, points, axes. Handles are drawn by the page. */
import { axisLabel } from './axis';
import type { Figure, Mark, TextMark } from './marks';
import { cellMarks } from './cell-marks';
import { flowMarks } from './flow-arrows';
import { nameMarks, type NameObstacle } from './point-names';
import type { Palette } from './palette';
import type { PlotLayout } from './plot-layout';
import type { PlotBand, PlotLine, PlotPoint, PlotSpec } from './plot-spec';

/** Way between two markers on one line, in pixels across and a fifth of those up and down. */
const MARKER_SPACING = 110;
const UPRIGHT_WEIGHT = 0.2;
/** Pixels that a name may reach beyond the right edge. */
const RIGHT_ROOM = 14;

function linePoints(line: PlotLine, layout: PlotLayout): Float64Array {
  const points = new Float64Array(line.x.length * 2);
  for (let k = 0; k < line.x.length; k++) {
    points[2 * k] = layout.x(line.x[k] ?? NaN);
    points[2 * k + 1] = layout.y(line.y[k] ?? NaN);
  }
  return points;
}

function markersAlong(line: PlotLine, points: Float64Array, offset: number, ground: string): Mark[] {
  if (!line.marker) return [];
  const marks: Mark[] = [];
  let travelled = MARKER_SPACING - 24 - offset;
  for (let k = 2; k + 1 < points.length; k += 2) {
    const x = points[k] ?? NaN;
    const y = points[k + 1] ?? NaN;
    const across = Math.abs(x - (points[k - 2] ?? NaN));
    const length = across + UPRIGHT_WEIGHT * Math.abs(y - (points[k - 1] ?? NaN));
    if (!Number.isFinite(length)) continue;
    travelled += Math.min(length, MARKER_SPACING / 3);
    if (travelled < MARKER_SPACING) continue;
    travelled = 0;
    marks.push({ kind: 'glyph', glyph: line.marker, x, y, size: 4, colour: line.colour, ground });
  }
  return marks;
}

function lineMarks(line: PlotLine, index: number, layout: PlotLayout, palette: Palette): Mark[] {
  const points = linePoints(line, layout);
  const style = {
    stroke: line.colour,
    width: line.width,
    ...(line.dash ? { dash: line.dash } : {}),
    ...(line.opacity !== undefined ? { opacity: line.opacity } : {}),
  };
  if (line.segments) return [{ kind: 'strokes', segments: points, ...style }];
  return [
    { kind: 'path', points, ...style },
    ...markersAlong(line, points, (index % 5) * 17, palette.raised),
  ];
}

function bandMarks(band: PlotBand, layout: PlotLayout): Mark[] {
  const count = band.x.length;
  const edge = (values: Float64Array) => {
    const points = new Float64Array(count * 2);
    for (let k = 0; k < count; k++) {
      points[2 * k] = layout.x(band.x[k] ?? NaN);
      points[2 * k + 1] = layout.y(values[k] ?? NaN);
    }
    return points;
  };
  const low = edge(band.low);
  const high = edge(band.high);
  const outline = new Float64Array(count * 4);
  outline.set(high, 0);
  for (let k = 0; k < count; k++) {
    outline[2 * (count + k)] = low[2 * (count - 1 - k)] ?? NaN;
    const y = low[2 * (count - 1 - k) + 1] ?? NaN;
    // Zero has no logarithm: the ground of the band is then the ground of the plot.
    outline[2 * (count + k) + 1] = Number.isFinite(y) ? y : layout.top + layout.innerHeight;
  }
  const style = {
    stroke: band.colour,
    ...(band.edge ?? { width: 1, opacity: 0.8 }),
    ...(band.dash ? { dash: band.dash } : {}),
  };
  return [
    {
      kind: 'path',
      points: outline,
      stroke: null,
      width: 0,
      fill: band.colour,
      opacity: band.opacity,
      closed: true,
    },
    { kind: 'path', points: low, ...style },
    { kind: 'path', points: high, ...style },
  ];
}

function pointMark(point: PlotPoint, layout: PlotLayout, palette: Palette): Mark {
  const angle = point.along
    ? Math.atan2(
        layout.y(point.y + point.along.dy) - layout.y(point.y),
        layout.x(point.x + point.along.dx) - layout.x(point.x),
      )
    : 0;
  return {
    kind: 'glyph',
    glyph: point.glyph,
    x: layout.x(point.x),
    y: layout.y(point.y),
    size: point.size,
    colour: point.colour,
    ground: palette.raised,
    angle: Number.isFinite(angle) ? angle : 0,
  };
}

/** Lines that names of points keep off; the ground of a band is none. */
function obstaclesOf(mark: Mark): readonly NameObstacle[] {
  if (mark.kind === 'path') return mark.stroke ? [{ points: mark.points, step: 2 }] : [];
  return mark.kind === 'strokes' && (mark.opacity ?? 1) > 0.8 ? [{ points: mark.segments, step: 4 }] : [];
}

function axesMarks(layout: PlotLayout, palette: Palette): { under: Mark[]; over: Mark[] } {
  const { left, top, innerWidth, innerHeight } = layout;
  const bottom = top + innerHeight;
  const right = left + innerWidth;
  const grid = layout.yTicks.flatMap((tick) => [left, layout.y(tick.value), right, layout.y(tick.value)]);
  const stubs = layout.xTicks.flatMap((tick) => [
    layout.x(tick.value),
    bottom,
    layout.x(tick.value),
    bottom + 5,
  ]);
  const label = (x: number, y: number, text: string, more: Partial<TextMark>): TextMark => ({
    kind: 'text',
    x,
    y,
    text,
    size: 12,
    colour: palette.muted,
    anchor: 'middle',
    baseline: 'top',
    family: 'text',
    ...more,
  });
  return {
    under: [
      {
        kind: 'strokes',
        segments: Float64Array.from(grid),
        stroke: palette.hairline,
        width: 1,
        opacity: 0.7,
      },
    ],
    over: [
      {
        kind: 'strokes',
        segments: Float64Array.from([left, top, left, bottom, left, bottom, right, bottom, ...stubs]),
        stroke: palette.muted,
        width: 1,
      },
      ...layout.xTicks.map((tick) => label(layout.x(tick.value), bottom + 8, tick.label, {})),
      ...layout.yTicks.map((tick) =>
        label(left - 7, layout.y(tick.value), tick.label, { anchor: 'end', baseline: 'middle' }),
      ),
      label(left + innerWidth / 2, layout.height - 15, axisLabel(layout.xAxis), { size: 13 }),
      label(7, top + innerHeight / 2, axisLabel(layout.yAxis), { size: 13, rotate: -90 }),
    ],
  };
}

export function plotFigure(spec: PlotSpec, layout: PlotLayout, palette: Palette): Figure {
  const axes = axesMarks(layout, palette);
  const twinFirst = [...spec.lines].sort((a, b) => Number(b.twin) - Number(a.twin));
  const window = { x: layout.left, y: layout.top, width: layout.innerWidth, height: layout.innerHeight };
  const within = (point: PlotPoint) => {
    const x = layout.x(point.x);
    const y = layout.y(point.y);
    return (
      x >= window.x - 1 &&
      x <= window.x + window.width + 1 &&
      y >= window.y - 1 &&
      y <= window.y + window.height + 1
    );
  };
  const points = spec.points.filter(within);
  const drawn = [
    ...(spec.cells ? cellMarks(spec.cells, layout) : []),
    ...[...spec.bands]
      .sort((a, b) => Number(b.twin) - Number(a.twin))
      .flatMap((band) => bandMarks(band, layout)),
    ...(spec.flow ? flowMarks(spec.flow, layout, palette) : []),
    ...twinFirst.flatMap((line, index) => lineMarks(line, index, layout, palette)),
  ];
  const obstacles = points.some((one) => one.named) ? drawn.flatMap(obstaclesOf) : [];
  return {
    width: layout.width,
    height: layout.height,
    title: spec.title,
    description: spec.description,
    marks: [
      { kind: 'rect', x: 0, y: 0, width: layout.width, height: layout.height, fill: palette.raised },
      ...axes.under,
      {
        kind: 'clip',
        ...window,
        marks: drawn,
      },
      ...axes.over,
      ...points.map((point) => pointMark(point, layout, palette)),
      ...nameMarks(
        points.map((point) => ({ ...point, x: layout.x(point.x), y: layout.y(point.y) })),
        { x0: window.x, x1: window.x + window.width + RIGHT_ROOM, y0: 0, y1: window.y + window.height },
        palette,
        obstacles,
      ),
    ],
  };
}
