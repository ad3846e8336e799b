import type { EquilibriaResult } from '@/engine/equilibria/contract';
import type { Trajectory } from '@/engine/integrators/contract';
import type { Quantity } from '@/engine/schema/preset';
import { axisLabel, paddedDomain, type AxisSpec } from '@/graphics/axis';
import { equilibriumGlyph, specialPointGlyph } from '@/graphics/glyphs';
import { formatNumber } from '@/graphics/numbers';
import type { LegendItem } from '@/graphics/plot-spec';
import type { PlotTable } from '@/graphics/plot-table';
import { nameQuantity, readQuantity } from '@/graphics/quantities';

import { presentLoops } from '../../cycles/present-loops';
import { readParameterValue } from '../../engine/parameter-values';
import { equilibriumSentence } from '../equilibrium-words';
import { runStyle, STABILITY_WORDS, sweepRuns } from '../views/branch-runs';
import {
  commonNotes,
  currentStart,
  Extent,
  listClassNames,
  showsTwin,
  waitingText,
  type ViewInput,
} from '../views/view-input';
import { spaceAxes } from './space-axes';
import { cycleRings, orbitPoints } from './space-cycles';
import type { ReadPoint, SpaceLine, SpacePoint } from './space-parts';

export interface SpaceSpec {
  readonly title: string;
  readonly description: string;
  readonly axes: readonly [AxisSpec, AxisSpec, AxisSpec];
  readonly lines: readonly SpaceLine[];
  readonly points: readonly SpacePoint[];
  /** Where the trajectory starts and which classes dragging it moves; null where it cannot be dragged. */
  readonly start: {
    readonly at: readonly [number, number, number];
    readonly classes: readonly string[];
  } | null;
  readonly legend: readonly LegendItem[];
  readonly notes: readonly string[];
  readonly empty: string | null;
}

/** What is drawn fainter is not feasible, and sets no extent. */
const FAINT = 0.5;

type Axes = readonly [Quantity, Quantity, Quantity];
function reader(input: ViewInput, axes: Axes, symbols: readonly string[]): ReadPoint | null {
  const parts = axes.map((axis) => readQuantity(input.model, axis, symbols));
  const [a, b, c] = parts;
  if (!a || !b || !c) return null;
  return (s, o, t, p) => [a(s, o, t, p), b(s, o, t, p), c(s, o, t, p)];
}

function orbit(trajectory: Trajectory, read: ReadPoint, parameter: number): Float64Array {
  const { times, states, dimension } = trajectory;
  const points = new Float64Array(times.length * 3);
  for (let k = 0; k < times.length; k++)
    points.set(read(states, k * dimension, times[k] ?? NaN, parameter), 3 * k);
  return points;
}

function equilibria(
  input: ViewInput,
  found: EquilibriaResult | null | undefined,
  read: ReadPoint,
  parameter: number,
  twin: boolean,
): SpacePoint[] {
  return (found?.equilibria ?? [])
    .filter((one) => one.feasible)
    .map((one) => ({
      label: twin ? `pooled twin, ${one.type}` : one.type,
      description: `${twin ? 'Pooled twin, ' : ''}${equilibriumSentence(input.model.populations, one)}`,
      at: read(one.state, 0, 0, parameter),
      glyph: equilibriumGlyph(one.attracts),
      colour: twin ? input.palette.twin : input.palette.ink,
      size: twin ? 4.5 : 5.5,
      named: false,
      twin,
    }));
}

function phaseParts(input: ViewInput, axes: Axes) {
  const { state, palette, model } = input;
  const lines: SpaceLine[] = [];
  const points: SpacePoint[] = [];
  const key = axes.find((axis) => axis.quantity === 'parameter')?.of;
  const parameter = key ? (readParameterValue(state.document, key) ?? NaN) : NaN;
  const result = state.result;
  const own = reader(
    input,
    axes,
    listClassNames(model).map((one) => one.symbol),
  );
  const twin = showsTwin(state) ? reader(input, axes, result?.twinStateSymbols ?? []) : null;
  if (twin && result?.twinTrajectory) {
    lines.push({
      id: 'twin',
      label: 'pooled twin',
      colour: palette.twin,
      dashed: false,
      opacity: 1,
      twin: true,
      points: orbit(result.twinTrajectory, twin, parameter),
    });
    points.push(...equilibria(input, result.twinEquilibria, twin, parameter, true));
  }
  if (own && result) {
    lines.push({
      id: 'trajectory',
      label: 'trajectory',
      colour: palette.hues[model.populations.at(-1)?.hue ?? 'slate'][2] ?? palette.ink,
      dashed: false,
      opacity: 1,
      twin: false,
      points: orbit(result.trajectory, own, parameter),
    });
    if (!axes.some((axis) => axis.quantity === 'time')) {
      points.push(...equilibria(input, result.equilibria, own, parameter, false));
      const strong = palette.hues[model.populations.at(-1)?.hue ?? 'slate'][3] ?? palette.ink;
      lines.push(...loopLines(input, axes, parameter, strong));
    }
  }
  return { lines, points };
}

/** The cycles at the present value of the swept parameter. */
function loopLines(input: ViewInput, axes: Axes, parameter: number, colour: string): SpaceLine[] {
  const { state, palette } = input;
  return presentLoops(state).flatMap((loop): SpaceLine[] => {
    const read = reader(input, axes, loop.stateSymbols);
    if (!read) return [];
    return [
      {
        id: loop.id,
        label: loop.label,
        name: loop.name,
        colour: loop.isTwin ? palette.twin : colour,
        dashed: loop.cycle.attracts !== 1,
        opacity: 1,
        twin: loop.isTwin,
        points: orbitPoints(loop.orbit, loop.stateSymbols.length, read, parameter),
      },
    ];
  });
}

function sweepParts(input: ViewInput, axes: Axes) {
  const { state, palette, model } = input;
  const lines: SpaceLine[] = [];
  const points: SpacePoint[] = [];
  const colour = palette.hues[model.populations.at(-1)?.hue ?? 'slate'][2] ?? palette.ink;
  const twin = showsTwin(state) ? (state.sweep?.twin ?? null) : null;
  for (const sweep of [twin, state.sweep?.split ?? null]) {
    if (!sweep) continue;
    const isTwin = sweep === twin;
    const read = reader(input, axes, sweep.stateSymbols);
    if (!read) continue;
    sweepRuns(sweep).forEach((run, order) => {
      const branch = sweep.branches[run.branch];
      if (!branch) return;
      const line = new Float64Array((run.to - run.from + 1) * 3);
      for (let k = run.from; k <= run.to; k++)
        line.set(
          read(branch.states, k * branch.dimension, NaN, branch.parameters[k] ?? NaN),
          3 * (k - run.from),
        );
      lines.push({
        id: `${isTwin ? 'twin' : 'own'}:${order}`,
        label: `${isTwin ? 'pooled twin, ' : ''}branch ${run.branch + 1}, ${STABILITY_WORDS[run.attracts] ?? 'undecided'}`,
        colour: isTwin ? palette.twin : colour,
        dashed: Boolean(runStyle(run.attracts, isTwin).dash),
        opacity: run.feasible ? 1 : 0.3,
        twin: isTwin,
        points: line,
      });
    });
    for (const point of sweep.specialPoints)
      points.push({
        label: isTwin ? `${point.kind}, twin` : point.kind,
        description: `${isTwin ? 'Pooled twin: ' : ''}${point.kind} at ${formatNumber(point.parameter, 6)}. ${point.meaning}`,
        at: read(point.state, 0, NaN, point.parameter),
        glyph: specialPointGlyph(point.kind),
        colour: isTwin ? palette.twin : state.selectedPoint?.id === point.id ? palette.accent : palette.ink,
        size: isTwin ? 6 : 7,
        named: point.feasible,
        twin: isTwin,
      });
    const cycles = isTwin ? state.cycles?.twin : state.cycles?.split;
    if (cycles) {
      const rings = cycleRings(input, cycles, read, isTwin);
      lines.push(...rings.lines);
      points.push(...rings.points);
    }
  }
  const value = readParameterValue(state.document, state.cycles?.split.parameterKey ?? '');
  if (value !== null) lines.push(...loopLines(input, axes, value, palette.accent));
  return { lines, points };
}

function startOf(input: ViewInput, axes: Axes): SpaceSpec['start'] {
  if (axes.some((axis) => axis.quantity !== 'class') || new Set(axes.map((axis) => axis.of)).size < 3)
    return null;
  const [x = null, y = null, z = null] = axes.map((axis) => currentStart(input.state, axis.of));
  if (x === null || y === null || z === null) return null;
  return { at: [x, y, z], classes: axes.map((axis) => axis.of) };
}

function axesOf(
  input: ViewInput,
  axes: Axes,
  lines: readonly SpaceLine[],
  points: readonly SpacePoint[],
): readonly [AxisSpec, AxisSpec, AxisSpec] {
  const specs = axes.map((axis, k): AxisSpec => {
    const extent = new Extent(axis.logarithm);
    for (const line of lines)
      if (line.opacity > FAINT)
        for (let at = k; at < line.points.length; at += 3) extent.add(line.points[at] ?? NaN);
    for (const point of points) extent.add(point.at[k] ?? NaN);
    const sweep = input.state.sweep?.split;
    const swept = axis.quantity === 'parameter' && sweep?.parameterKey === axis.of;
    return {
      ...nameQuantity(input.model, axis),
      logarithm: axis.logarithm,
      domain:
        swept && !axis.logarithm
          ? [sweep.from, sweep.to]
          : paddedDomain(extent.low, extent.high, { logarithm: axis.logarithm, fromZero: true, pad: 0.03 }),
    };
  });
  const [x, y, z] = specs;
  if (!x || !y || !z) throw new Error('A space has three axes.');
  return [x, y, z];
}

/** Phase space, or the sweep against two quantities. */
export function spaceSpec(view: 'space' | 'space-diagram', input: ViewInput): SpaceSpec {
  const { state, model, palette } = input;
  const key =
    view === 'space-diagram'
      ? (state.sweep?.split.parameterKey ?? state.sweepSelection?.parameter ?? null)
      : null;
  const axes = spaceAxes(model, view, input.axes, key);
  const blank: AxisSpec = { name: '', unit: '', logarithm: false, domain: [0, 1] };
  const title = view === 'space' ? 'Phase space' : 'Sweep in space';
  if (!axes)
    return {
      title,
      description: '',
      axes: [blank, blank, blank],
      lines: [],
      points: [],
      start: null,
      legend: [],
      notes: [],
      empty:
        view === 'space' || key
          ? 'A space needs at least two classes. Add a class, or show trajectories instead.'
          : 'Choose a parameter on the strip below, and run a sweep.',
    };
  const { lines, points } = view === 'space' ? phaseParts(input, axes) : sweepParts(input, axes);
  const named = axesOf(input, axes, lines, points);
  const own = lines.find((line) => !line.twin);
  // The twin is grey whatever it does, and has its one entry.
  const loops = lines.filter((line) => line.id.startsWith('cycle:') && !line.twin);
  const legend: LegendItem[] = own
    ? [
        {
          label: view === 'space' ? 'trajectory' : 'attracts',
          colour: own.colour,
          marker: null,
          line: 'solid',
        },
      ]
    : [];
  if (own && view === 'space-diagram')
    legend.push({ label: 'repels', colour: own.colour, marker: null, line: 'dashed' });
  if (lines.some((line) => line.twin))
    legend.push({ label: 'pooled twin', colour: palette.twin, marker: null, line: 'thin' });
  if (view === 'space')
    legend.push(
      ...loops.map((line): LegendItem => ({
        label: line.name ?? line.label,
        colour: line.colour,
        marker: null,
        line: line.dashed ? 'dashed' : 'solid',
      })),
    );
  if (view === 'space')
    legend.push(
      { label: 'attracts', colour: palette.ink, marker: 'attracting', line: 'none' },
      { label: 'repels', colour: palette.ink, marker: 'repelling', line: 'none' },
    );
  return {
    title,
    description: named.map(axisLabel).join(', '),
    axes: named,
    lines,
    points,
    start: view === 'space' ? startOf(input, axes) : null,
    legend,
    notes: commonNotes(state),
    empty:
      waitingText(state) ??
      (view === 'space-diagram' && lines.length === 0
        ? state.sweep?.split.message || 'No sweep has been run yet. Run one from the strip below.'
        : null),
  };
}

/** The same numbers as the space shows. */
export function spaceTables(spec: SpaceSpec): readonly PlotTable[] {
  const columns = spec.axes.map(axisLabel);
  const rows = (points: Float64Array) =>
    Array.from({ length: points.length / 3 }, (_value, k) => [...points.subarray(3 * k, 3 * k + 3)]);
  return [
    ...spec.lines.map((line) => ({ name: line.label, columns, rows: rows(line.points) })),
    ...(spec.points.length > 0
      ? [
          {
            name: 'Marked points',
            columns: ['point', ...columns, 'meaning'],
            rows: spec.points.map((point) => [point.label, ...point.at, point.description]),
          },
        ]
      : []),
  ];
}
