import type { ExtremesResult } from '@/engine/lyapunov/contract';
import type { AxisSpec } from '@/graphics/axis';
import type { Palette } from '@/graphics/palette';
import type { PlotLine, PlotSpec } from '@/graphics/plot-spec';
import { parameterName } from '@/graphics/quantities';

import {
  currentStart,
  Extent,
  commonNotes,
  listClassNames,
  showsTwin,
  waitingText,
  type ViewInput,
} from '../panes/views/view-input';
import { mapCells, mapLegend } from '../two-parameters/map-colours';

/** Width of a dot, as a share of the axis. */
const DOT = 0.0022;
const MARGIN = 0.05;

function emptySpec(title: string, text: string): PlotSpec {
  const axis: AxisSpec = { name: '', unit: '', logarithm: false, domain: [0, 1] };
  return {
    title,
    description: text,
    x: axis,
    y: axis,
    lines: [],
    bands: [],
    points: [],
    handles: [],
    flow: null,
    legend: [],
    notes: [],
    empty: text,
  };
}

/** Dots as short strokes, so that thousands are drawn in one go. */
function dots(
  id: string,
  label: string,
  colour: string,
  xs: readonly number[],
  ys: readonly number[],
  width: number,
): PlotLine {
  const x = new Float64Array(2 * xs.length);
  const y = new Float64Array(2 * xs.length);
  xs.forEach((value, k) => {
    x[2 * k] = value - width / 2;
    x[2 * k + 1] = value + width / 2;
    y[2 * k] = y[2 * k + 1] = ys[k] ?? NaN;
  });
  return { id, label, colour, width: 2.2, marker: null, x, y, twin: false, segments: true };
}

function widened({ low, high }: Extent): [number, number] {
  if (!Number.isFinite(low)) return [0, 1];
  const room = MARGIN * (high - low || Math.abs(high) || 1);
  return [Math.min(low - room, low >= 0 ? Math.max(0, low - room) : low - room), high + room];
}

function quantityLabel(input: ViewInput, symbol: string): string {
  const { populations } = input.model;
  const whole = populations.find((one) => one.symbol === symbol && one.classes.length > 1);
  if (whole) return `${whole.name || whole.symbol}, all classes`;
  return listClassNames(input.model).find((one) => one.symbol === symbol)?.name ?? symbol;
}

function extremesSpec(input: ViewInput): PlotSpec {
  const { state, model, palette } = input;
  const { extremes } = state.longRun;
  const title = 'Long-run extremes';
  const selection = state.sweepSelection;
  if (!selection) return emptySpec(title, 'Choose a parameter on the range strip; it lies across.');
  if (!extremes || extremes.task.parameter !== selection.parameter)
    return emptySpec(
      title,
      'Compute to see the maxima of the long run, with the parameter rising and falling.',
    );
  const { split } = extremes.result;
  const twin = showsTwin(state) ? extremes.result.twin : null;
  const across = parameterName(model, split.parameterKey);
  const name = quantityLabel(input, split.observed);
  const extent = new Extent(false);
  const lines = [...(twin ? sweepLines(twin, palette, true) : []), ...sweepLines(split, palette, false)];
  for (const line of lines) extent.addAll(line.y);
  return {
    title: `Long-run maxima of ${name}`,
    description: `Maxima of ${name} along ${across.name}, upward and downward. ${split.message}`,
    x: { name: across.name, unit: across.unit, logarithm: false, domain: [split.from, split.to] },
    y: { name: `maxima of ${name}`, unit: model.densityUnit, logarithm: false, domain: widened(extent) },
    lines,
    bands: [],
    points: [],
    handles: [],
    flow: null,
    legend: [
      { label: 'parameter rising', colour: DIRECTION(palette, 'upward'), marker: 'circle', line: 'none' },
      { label: 'parameter falling', colour: DIRECTION(palette, 'downward'), marker: 'circle', line: 'none' },
      ...(twin
        ? [{ label: 'pooled twin', colour: palette.twin, marker: 'circle' as const, line: 'none' as const }]
        : []),
    ],
    notes: [
      ...(split.hysteresis.length > 0
        ? split.hysteresis.map(
            ({ from, to }) =>
              `Hysteresis between ${Number(from.toPrecision(4))} and ${Number(to.toPrecision(4))}: what is seen depends on where it comes from.`,
          )
        : split.status === 'complete'
          ? ['No hysteresis seen: upward and downward agree.']
          : []),
      // While it is still being followed, that it stopped before the end says nothing.
      ...(split.status === 'cancelled' ? [] : [split.message]),
      ...commonNotes(state),
    ],
    empty: null,
  };
}

const DIRECTION = (palette: Palette, direction: 'upward' | 'downward'): string =>
  (direction === 'upward' ? palette.hues.woad[2] : palette.hues.weld[1]) ?? palette.ink;

function sweepLines(result: ExtremesResult, palette: Palette, twin: boolean): PlotLine[] {
  const width = DOT * Math.abs(result.to - result.from);
  return result.sweeps.map((one) => {
    const [xs, ys]: [number[], number[]] = [[], []];
    one.parameters.forEach((parameter, k) => {
      for (let j = one.maximaStart[k] ?? 0; j < (one.maximaStart[k + 1] ?? 0); j += 1) {
        xs.push(parameter);
        ys.push(one.maxima[j] ?? NaN);
      }
    });
    const label = `maxima ${one.direction}${twin ? ', pooled twin' : ''}`;
    const colour = twin ? palette.twin : DIRECTION(palette, one.direction);
    return { ...dots(`${twin ? 'twin' : 'own'}:${one.direction}`, label, colour, xs, ys, width), twin };
  });
}

function basinsSpec(input: ViewInput): PlotSpec {
  const { state, model, palette } = input;
  const { basins } = state.longRun;
  if (!basins) return emptySpec('Basins', 'Compute to see where runs from a plane of start values end.');
  const { x, y } = basins.task;
  const { split } = basins.result;
  const [sx, sy] = [currentStart(state, x.state), currentStart(state, y.state)];
  return {
    title: 'Basins of attraction',
    description: split.message,
    x: {
      name: `start of ${quantityLabel(input, x.state)}`,
      unit: model.densityUnit,
      logarithm: false,
      domain: [x.from, x.to],
    },
    y: {
      name: `start of ${quantityLabel(input, y.state)}`,
      unit: model.densityUnit,
      logarithm: false,
      domain: [y.from, y.to],
    },
    lines: [],
    bands: [],
    points: [],
    handles:
      sx === null || sy === null
        ? []
        : [
            {
              id: `start:${x.state}:${y.state}`,
              label: 'Start values',
              shape: 'ring',
              x: sx,
              y: sy,
              moves: 'both',
              colour: palette.ink,
            },
          ],
    cells: mapCells(split, palette, ''),
    flow: null,
    legend: mapLegend(split, palette),
    notes: [split.message, ...commonNotes(state)],
    empty: null,
  };
}

function sectionSpec(input: ViewInput): PlotSpec {
  const { state, model, palette } = input;
  const { section } = state.longRun;
  if (!section)
    return emptySpec('Section', 'Compute to see the states at which the long run passes a value.');
  const { split } = section.result;
  const n = split.dimension;
  const names = listClassNames(model);
  const shown = names.filter((one) => one.symbol !== section.task.quantity).slice(0, 2);
  const [a, b] = shown;
  if (!a) return emptySpec('Section', 'A section needs a second class to be drawn over.');
  const count = split.times.length;
  const column = (index: number) =>
    Array.from({ length: count }, (_, k) => split.states[k * n + index] ?? NaN);
  const xs = b ? column(a.index) : [...split.times];
  const ys = b ? column(b.index) : column(a.index);
  const [across, up] = [new Extent(false), new Extent(false)];
  across.addAll(Float64Array.from(xs));
  up.addAll(Float64Array.from(ys));
  const domain = widened(across);
  return {
    title: `Section where ${quantityLabel(input, section.task.quantity)} rises through ${section.task.value}`,
    description: `${count} crossings. ${split.message}`,
    x: { name: b ? a.name : 'time', unit: b ? model.densityUnit : model.timeUnit, logarithm: false, domain },
    y: { name: (b ?? a).name, unit: model.densityUnit, logarithm: false, domain: widened(up) },
    lines: [
      dots(
        'section',
        'crossings',
        palette.hues.woad[2] ?? palette.ink,
        xs,
        ys,
        2 * DOT * (domain[1] - domain[0]),
      ),
    ],
    bands: [],
    points: [],
    handles: [],
    flow: null,
    legend: [
      {
        label: `${count} crossings`,
        colour: palette.hues.woad[2] ?? palette.ink,
        marker: 'circle',
        line: 'none',
      },
    ],
    notes: [split.message, ...commonNotes(state)],
    empty: null,
  };
}

/** What the long run is: maxima along the strip, basins over start values, or a section. */
export function longRunSpec(input: ViewInput): PlotSpec {
  const waiting = waitingText(input.state);
  if (waiting) return emptySpec('Long run', waiting);
  switch (input.state.longRun.show) {
    case 'extremes':
      return extremesSpec(input);
    case 'basins':
      return basinsSpec(input);
    case 'section':
      return sectionSpec(input);
  }
}
