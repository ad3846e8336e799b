import { axisLabel } from '@/graphics/axis';
import { cellCentre } from '@/graphics/cell-marks';
import { formatNumber } from '@/graphics/numbers';
import type { PlotLayout } from '@/graphics/plot-layout';
import type { PlotSpec } from '@/graphics/plot-spec';

/** What lies under the pointer, or under the keyboard's walk. */
export interface Reading {
  readonly text: string;
  readonly x: number;
  readonly y: number;
}

const REACH = 28;

function place(spec: PlotSpec, label: string, x: number, y: number): string {
  const unit = (name: string) => (name ? ` ${name}` : '');
  return `${label}: ${formatNumber(y)}${unit(spec.y.unit)} at ${spec.x.name} ${formatNumber(x)}${unit(spec.x.unit)}`;
}

/** Nearest marked point, else nearest point of a line, within reach of the pointer. */
export function readNearest(spec: PlotSpec, layout: PlotLayout, px: number, py: number): Reading | null {
  let best: Reading | null = null;
  let distance = REACH;
  const consider = (x: number, y: number, text: () => string, favour: number) => {
    const away = Math.hypot(layout.x(x) - px, layout.y(y) - py) - favour;
    if (!(away < distance)) return;
    distance = away;
    best = { x: layout.x(x), y: layout.y(y), text: text() };
  };
  for (const point of spec.points)
    consider(
      point.x,
      point.y,
      () => `${point.description} (${formatNumber(point.x)}; ${formatNumber(point.y)})`,
      8,
    );
  for (const line of spec.lines)
    for (let k = 0; k < line.x.length; k++)
      consider(
        line.x[k] ?? NaN,
        line.y[k] ?? NaN,
        () => place(spec, line.label, line.x[k] ?? NaN, line.y[k] ?? NaN),
        0,
      );
  for (const band of spec.bands)
    for (const [edge, values] of [
      ['lowest', band.low],
      ['highest', band.high],
    ] as const)
      for (let k = 0; k < band.x.length; k++)
        consider(
          band.x[k] ?? NaN,
          values[k] ?? NaN,
          () => place(spec, `${band.label}, ${edge}`, band.x[k] ?? NaN, values[k] ?? NaN),
          0,
        );
  return best ?? readCell(spec, layout, px, py);
}

/** The cell of a map under the pointer. */
function readCell(spec: PlotSpec, layout: PlotLayout, px: number, py: number): Reading | null {
  if (!spec.cells) return null;
  const { x, y, describe } = spec.cells;
  const ix = Math.floor(((layout.x.invert(px) - x.from) / (x.to - x.from)) * x.count);
  const iy = Math.floor(((layout.y.invert(py) - y.from) / (y.to - y.from)) * y.count);
  if (!(ix >= 0 && ix < x.count && iy >= 0 && iy < y.count)) return null;
  const text = describe(iy * x.count + ix);
  if (text === null) return null;
  const place = `${spec.x.name} ${formatNumber(cellCentre(x, ix))}, ${spec.y.name} ${formatNumber(cellCentre(y, iy))}`;
  return { text: `${text} at ${place}`, x: px, y: py };
}

/** Steps in which the arrow keys walk along one line. */
const WALK_STEPS = 40;

export interface Walk {
  readonly track: number;
  readonly step: number;
}

interface Track {
  readonly label: string;
  readonly length: number;
  at(step: number): { readonly x: number; readonly y: number; readonly text: string };
}

/** The marked points are the first track, each line and each edge of a band is one more. */
function tracks(spec: PlotSpec): readonly Track[] {
  const all: Track[] = [];
  if (spec.points.length > 0)
    all.push({
      label: 'marked points',
      length: spec.points.length,
      at: (step) => {
        const point = spec.points[step];
        return {
          x: point?.x ?? NaN,
          y: point?.y ?? NaN,
          text: `${point?.description ?? ''} ${axisLabel(spec.x)} ${formatNumber(point?.x ?? NaN)}, ${axisLabel(spec.y)} ${formatNumber(point?.y ?? NaN)}`,
        };
      },
    });
  const curve = (label: string, xs: Float64Array, ys: Float64Array): void => {
    if (xs.length === 0) return;
    const length = Math.min(WALK_STEPS, xs.length);
    all.push({
      label,
      length,
      at: (step) => {
        const k = Math.round((step * (xs.length - 1)) / Math.max(1, length - 1));
        const x = xs[k] ?? NaN;
        const y = ys[k] ?? NaN;
        return { x, y, text: place(spec, label, x, y) };
      },
    });
  };
  for (const line of spec.lines) if (!line.segments) curve(line.label, line.x, line.y);
  for (const band of spec.bands) {
    curve(`${band.label}, lowest`, band.x, band.low);
    curve(`${band.label}, highest`, band.x, band.high);
  }
  return all;
}

/** One arrow key: left and right along a track, up and down to another track. */
export function walk(
  spec: PlotSpec,
  layout: PlotLayout,
  from: Walk | null,
  key: string,
): { readonly walk: Walk; readonly reading: Reading } | null {
  const all = tracks(spec);
  if (all.length === 0) return null;
  let { track, step } = from ?? { track: 0, step: -1 };
  if (key === 'ArrowUp' || key === 'ArrowDown') {
    track = (track + (key === 'ArrowDown' ? 1 : -1) + all.length) % all.length;
    step = from ? step : 0;
  } else step += key === 'ArrowRight' ? 1 : -1;
  track = Math.min(track, all.length - 1);
  const current = all[track];
  if (!current) return null;
  step = Math.max(0, Math.min(current.length - 1, step));
  const { x, y, text } = current.at(step);
  return { walk: { track, step }, reading: { text, x: layout.x(x), y: layout.y(y) } };
}
