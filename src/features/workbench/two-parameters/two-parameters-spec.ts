import type { BoundariesResult, BoundaryCurve, BoundaryKind } from '@/engine/boundaries/contract';
import { formatNumber } from '@/graphics/numbers';
import type { Palette } from '@/graphics/palette';
import type { LegendItem, PlotCells, PlotHandle, PlotLine, PlotPoint, PlotSpec } from '@/graphics/plot-spec';
import { parameterName } from '@/graphics/quantities';

import { readParameterValue } from '../engine/parameter-values';
import { commonNotes, showsTwin, waitingText, type ViewInput } from '../panes/views/view-input';
import { MAP_NAMES, mapCells, mapLegend } from './map-colours';
import { secondParameter } from './second-parameter';
import { zeroContour } from './zero-contour';

const CURVE_NAMES: Readonly<Record<BoundaryKind, string>> = {
  fold: 'fold',
  Hopf: 'onset of cycles (Hopf)',
  transcritical: 'invasion (transcritical)',
  pitchfork: 'pitchfork',
};

/** Length of the strokes towards the stable side, as a share of the range, and points between two of them. */
const STROKE = 0.018;
const STROKE_EVERY = 5;

function curveColour(kind: BoundaryKind, palette: Palette): string {
  switch (kind) {
    case 'Hopf':
      return palette.hues.woad[2] ?? palette.ink;
    case 'fold':
      return palette.hues.madder[2] ?? palette.ink;
    case 'transcritical':
      return palette.ink;
    case 'pitchfork':
      return palette.hues.sloe[2] ?? palette.ink;
  }
}

/** The parts of a curve that decide stability, or the parts that do not; elsewhere the pen is lifted. */
function part(curve: BoundaryCurve, matters: boolean): { x: Float64Array; y: Float64Array } | null {
  const x = new Float64Array(curve.first.length).fill(NaN);
  const y = new Float64Array(curve.first.length).fill(NaN);
  let any = false;
  for (let k = 0; k < x.length; k += 1) {
    const own = curve.matters[k] === 1;
    // A neighbour's point closes the gap between a solid and a dashed part.
    const beside = curve.matters[k + 1] !== curve.matters[k] && !matters;
    if (curve.feasible[k] !== 1 || (own !== matters && !beside)) continue;
    x[k] = curve.first[k] ?? NaN;
    y[k] = curve.second[k] ?? NaN;
    any = true;
  }
  return any ? { x, y } : null;
}

function curveLines(result: BoundariesResult, twin: boolean, palette: Palette): PlotLine[] {
  return result.curves.flatMap((curve, index) => {
    const colour = twin ? palette.twin : curveColour(curve.kind, palette);
    const name = `${CURVE_NAMES[curve.kind]}${twin ? ', pooled twin' : ''}`;
    const line = (matters: boolean): PlotLine[] => {
      const points = part(curve, matters);
      if (!points) return [];
      return [
        {
          id: `${twin ? 'twin' : 'own'}:${index}:${matters}`,
          label: matters ? name : `${name}, where something else repels already`,
          colour,
          width: matters ? 2.4 : 1.4,
          ...(matters ? {} : { dash: [5, 4] }),
          marker: null,
          ...points,
          twin,
        },
      ];
    };
    return [...line(true), ...line(false), ...(twin ? [] : [strokesOf(curve, index, colour, result)])];
  });
}

/** Short strokes from the curve towards the side where the equilibrium attracts. */
function strokesOf(curve: BoundaryCurve, index: number, colour: string, result: BoundariesResult): PlotLine {
  const wide = Math.abs(result.firstRange[1] - result.firstRange[0]);
  const high = Math.abs(result.secondRange[1] - result.secondRange[0]);
  const [x, y]: [number[], number[]] = [[], []];
  for (let k = 0; k < curve.first.length; k += STROKE_EVERY) {
    const [nx = NaN, ny = NaN] = [curve.stableSide[2 * k], curve.stableSide[2 * k + 1]];
    if (!Number.isFinite(nx) || curve.feasible[k] !== 1) continue;
    const [fx = NaN, fy = NaN] = [curve.first[k], curve.second[k]];
    x.push(fx, fx + nx * STROKE * wide);
    y.push(fy, fy + ny * STROKE * high);
  }
  return {
    id: `side:${index}`,
    label: 'side where it attracts',
    colour,
    width: 1,
    marker: null,
    x: Float64Array.from(x),
    y: Float64Array.from(y),
    twin: false,
    segments: true,
  };
}

/** Zero margin as the map has it: beneath the traced curve, which it should meet. */
function contourLine(cells: PlotCells, palette: Palette): PlotLine {
  return {
    id: 'zero-margin',
    label: 'zero margin on the map',
    colour: palette.ink,
    width: 0.9,
    marker: null,
    ...zeroContour(cells),
    twin: false,
    segments: true,
  };
}

function pointsOf(result: BoundariesResult, twin: boolean, palette: Palette): PlotPoint[] {
  // One point met from two curves is one mark.
  const seen = new Set<string>();
  return result.specialPoints.flatMap((point): PlotPoint[] => {
    const key = `${point.kind}:${point.first.toPrecision(5)}:${point.second.toPrecision(5)}`;
    if (!point.feasible || seen.has(key)) return [];
    seen.add(key);
    return [
      {
        id: `${twin ? 'twin' : 'own'}:${point.id}`,
        label: point.kind,
        description: `${point.kind}${twin ? ', pooled twin' : ''}. ${point.meaning}`,
        x: point.first,
        y: point.second,
        glyph: point.kind,
        colour: twin ? palette.twin : palette.ink,
        size: 6,
        named: !twin,
        twin,
      },
    ];
  });
}

/** Boundaries and map over the swept parameter across and a second one up. */
export function twoParametersSpec({ state, model, palette }: ViewInput): PlotSpec {
  const first = state.sweepSelection;
  const second = secondParameter(state);
  const empty = (text: string): PlotSpec => ({
    title: 'Two parameters',
    description: text,
    x: { name: '', unit: '', logarithm: false, domain: [0, 1] },
    y: { name: '', unit: '', logarithm: false, domain: [0, 1] },
    lines: [],
    bands: [],
    points: [],
    handles: [],
    flow: null,
    legend: [],
    notes: [],
    empty: text,
  });
  const waiting = waitingText(state);
  if (waiting) return empty(waiting);
  if (!first) return empty('Choose a parameter on the range strip; it lies across, and a second one up.');
  if (!second) return empty('This model has no second parameter. Add one in the model rail.');
  const { boundaries, map, side } = state.twoParameters;
  const across = parameterName(model, first.parameter);
  const up = parameterName(model, second.parameter);
  const traced =
    boundaries?.task.first.parameter === first.parameter &&
    boundaries.task.second.parameter === second.parameter
      ? boundaries.result
      : null;
  const mapped =
    map?.task.x.parameter === first.parameter && map.task.y.parameter === second.parameter
      ? map.result
      : null;
  const cells = mapped ? (side === 'twin' ? mapped.twin : mapped.split) : null;
  const drawn = cells ? mapCells(cells, palette, `1/${model.timeUnit}`) : null;
  const withTwin = showsTwin(state) && traced?.twin ? traced.twin : null;
  const lines = [
    ...(drawn && cells?.quantity === 'margin' ? [contourLine(drawn, palette)] : []),
    ...(withTwin ? curveLines(withTwin, true, palette) : []),
    ...(traced ? curveLines(traced.split, false, palette) : []),
  ];
  const handles: PlotHandle[] = [];
  const here = [
    readParameterValue(state.document, first.parameter),
    readParameterValue(state.document, second.parameter),
  ];
  const [x, y] = here;
  if (x !== null && x !== undefined && y !== null && y !== undefined)
    handles.push({
      id: `two:${first.parameter}|${second.parameter}`,
      label: `Present values, ${across.name} ${formatNumber(x)} and ${up.name} ${formatNumber(y)}`,
      shape: 'ring',
      x,
      y,
      moves: 'both',
      colour: palette.accent,
    });
  const nothing = lines.length === 0 && !drawn;
  const said = traced ? traced.split.message : null;
  return {
    title: `Boundaries over ${across.name} and ${up.name}`,
    description: nothing
      ? 'Nothing is traced or mapped yet.'
      : `${across.name} across, ${up.name} up. ${said ?? ''}${cells ? ` A map of ${MAP_NAMES[cells.quantity]} lies beneath.` : ''}`,
    x: { name: across.name, unit: across.unit, logarithm: false, domain: [first.from, first.to] },
    y: { name: up.name, unit: up.unit, logarithm: false, domain: [second.from, second.to] },
    lines,
    bands: [],
    points: [
      ...(withTwin ? pointsOf(withTwin, true, palette) : []),
      ...(traced ? pointsOf(traced.split, false, palette) : []),
    ],
    handles,
    cells: drawn,
    flow: null,
    legend: [
      ...curveLegend(traced?.split ?? null, withTwin, palette),
      ...(cells ? mapLegend(cells, palette) : []),
    ],
    notes: [
      ...(traced && traced.split.curves.length > 0
        ? [
            'Short strokes point to the side where the equilibrium attracts; dashed where something else repels already.',
          ]
        : []),
      ...(traced && traced.split.curves.length === 0 && said ? [said] : []),
      ...(cells && cells.status !== 'complete' ? [cells.message] : []),
      ...commonNotes(state),
    ],
    empty: null,
  };
}

function curveLegend(
  own: BoundariesResult | null,
  twin: BoundariesResult | null,
  palette: Palette,
): readonly LegendItem[] {
  const kinds = [...new Set(own?.curves.map((one) => one.kind) ?? [])];
  const items = kinds.map((kind): LegendItem => ({
    label: CURVE_NAMES[kind],
    colour: curveColour(kind, palette),
    marker: null,
    line: 'solid',
  }));
  if (twin && twin.curves.length > 0)
    items.push({ label: 'pooled twin', colour: palette.twin, marker: null, line: 'solid' });
  return items;
}
