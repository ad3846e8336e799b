import type { EquilibriaResult } from '@/engine/equilibria/contract';
import type { Trajectory } from '@/engine/integrators/contract';
import type { Quantity } from '@/engine/schema/preset';
import { paddedDomain } from '@/graphics/axis';
import { equilibriumGlyph } from '@/graphics/glyphs';
import { classColours } from '@/graphics/palette';
import type { LegendItem, PlotHandle, PlotLine, PlotPoint, PlotSpec } from '@/graphics/plot-spec';
import { classQuantity, nameQuantity, readQuantity } from '@/graphics/quantities';

import { presentLoops } from '../../cycles/present-loops';
import { equilibriumSentence } from '../equilibrium-words';
import { runStyle } from './branch-runs';
import {
  commonNotes,
  currentStart,
  Extent,
  listClassNames,
  showsTwin,
  waitingText,
  type ListedClass,
  type ViewInput,
} from './view-input';

/** Axes of the plane: as chosen, else the first class of each of the first two populations. */
export function planeAxes(
  classes: readonly ListedClass[],
  axes: readonly Quantity[],
): readonly [Quantity, Quantity] | null {
  const [first] = classes;
  const second = classes.find((one) => one.population !== first?.population) ?? classes[1];
  if (!first || !second) return null;
  const known = (quantity: Quantity | undefined) =>
    quantity &&
    (quantity.quantity === 'total' || classes.some((one) => one.symbol === quantity.of) ? quantity : null);
  return [known(axes[0]) ?? classQuantity(first.symbol), known(axes[1]) ?? classQuantity(second.symbol)];
}

type Reader = NonNullable<ReturnType<typeof readQuantity>>;

function orbit(trajectory: Trajectory, readers: readonly [Reader, Reader]) {
  const { times, states, dimension } = trajectory;
  const x = new Float64Array(times.length);
  const y = new Float64Array(times.length);
  for (let k = 0; k < times.length; k++) {
    x[k] = readers[0](states, k * dimension, times[k] ?? NaN, NaN);
    y[k] = readers[1](states, k * dimension, times[k] ?? NaN, NaN);
  }
  return { x, y };
}

function equilibriumPoints(
  input: ViewInput,
  found: EquilibriaResult | null | undefined,
  readers: readonly [Reader, Reader],
  twin: boolean,
): PlotPoint[] {
  return (found?.equilibria ?? []).flatMap((one, index) => {
    if (!one.feasible) return [];
    const sentence = equilibriumSentence(input.model.populations, one);
    return {
      id: `${twin ? 'twin' : 'own'}:${index}`,
      label: twin ? `pooled twin, ${one.type}` : one.type,
      description: twin ? `Pooled twin, ${sentence}` : sentence,
      x: readers[0](one.state, 0, 0, NaN),
      y: readers[1](one.state, 0, 0, NaN),
      glyph: equilibriumGlyph(one.attracts),
      colour: twin ? input.palette.twin : input.palette.ink,
      size: twin ? 4.5 : 5.5,
      named: false,
      twin,
    };
  });
}

function growthLines(input: ViewInput, x: Quantity, y: Quantity): PlotLine[] {
  const plane = input.state.result?.plane;
  if (!plane || plane.x !== x.of || plane.y !== y.of) return [];
  const colours = classColours(input.model.populations, input.palette);
  const names = new Map(listClassNames(input.model).map((one) => [one.symbol, one.name]));
  return plane.lines.map(({ state, segments }) => {
    const ends = segments.length / 2;
    const xs = new Float64Array(ends);
    const ys = new Float64Array(ends);
    for (let k = 0; k < ends; k++) {
      xs[k] = segments[2 * k] ?? NaN;
      ys[k] = segments[2 * k + 1] ?? NaN;
    }
    return {
      id: `zero-growth:${state}`,
      label: `zero growth of ${names.get(state) ?? state}`,
      colour: colours.get(state) ?? input.palette.muted,
      width: 1.8,
      opacity: 0.9,
      marker: null,
      x: xs,
      y: ys,
      twin: false,
      segments: true,
    };
  });
}

/** The cycle at the present value of the swept parameter, solid where it attracts. */
function cycleLoops(
  input: ViewInput,
  pair: (symbols: readonly string[]) => readonly [Reader, Reader] | null,
): PlotLine[] {
  const { state, palette, model } = input;
  const last = model.populations.at(-1);
  return presentLoops(state).flatMap((loop): PlotLine[] => {
    const readers = pair(loop.stateSymbols);
    if (!readers) return [];
    const n = loop.stateSymbols.length;
    const read = (reader: Reader) =>
      Float64Array.from({ length: loop.orbit.length / n }, (_value, k) =>
        reader(loop.orbit, k * n, NaN, NaN),
      );
    return [
      {
        id: loop.id,
        label: loop.label,
        name: loop.name,
        colour: loop.isTwin ? palette.twin : (palette.hues[last?.hue ?? 'slate'][2] ?? palette.ink),
        ...runStyle(loop.cycle.attracts, loop.isTwin),
        marker: null,
        x: read(readers[0]),
        y: read(readers[1]),
        twin: loop.isTwin,
      },
    ];
  });
}

function startHandle({ state, palette }: ViewInput, x: Quantity, y: Quantity): PlotHandle[] {
  if (x.quantity !== 'class' || y.quantity !== 'class' || x.of === y.of) return [];
  const at = [currentStart(state, x.of), currentStart(state, y.of)] as const;
  if (at[0] === null || at[1] === null) return [];
  return [
    {
      id: `start:${x.of}:${y.of}`,
      label: 'Start of the trajectory',
      shape: 'ring',
      x: at[0],
      y: at[1],
      moves: 'both',
      colour: palette.ink,
    },
  ];
}

/** Phase plane: zero-growth lines, flow, trajectory, equilibria and the twin. */
export function planeSpec(input: ViewInput): PlotSpec {
  const { state, model, palette } = input;
  const classes = listClassNames(model);
  const axes = planeAxes(classes, input.axes);
  const [x, y] = axes ?? [classQuantity(''), classQuantity('')];
  const symbols = classes.map((one) => one.symbol);
  const pair = (of: readonly string[]): readonly [Reader, Reader] | null => {
    const a = readQuantity(model, x, of);
    const b = readQuantity(model, y, of);
    return a && b ? [a, b] : null;
  };
  const readers = pair(symbols);
  const twinReaders = showsTwin(state) ? pair(state.result?.twinStateSymbols ?? []) : null;
  const lines: PlotLine[] = growthLines(input, x, y);
  const twin = state.result?.twinTrajectory;
  if (twin && twinReaders)
    lines.push({
      id: 'twin',
      label: 'pooled twin',
      colour: palette.twin,
      width: 1.6,
      marker: 'hollow circle',
      ...orbit(twin, twinReaders),
      twin: true,
    });
  const trajectory = state.result?.trajectory;
  if (trajectory && readers)
    lines.push({
      id: 'trajectory',
      label: 'trajectory',
      colour: palette.ink,
      width: 1.8,
      marker: null,
      ...orbit(trajectory, readers),
      twin: false,
    });
  lines.push(...cycleLoops(input, pair));
  const points = [
    ...(twinReaders ? equilibriumPoints(input, state.result?.twinEquilibria, twinReaders, true) : []),
    ...(readers ? equilibriumPoints(input, state.result?.equilibria, readers, false) : []),
  ];
  const extents = [new Extent(x.logarithm), new Extent(y.logarithm)] as const;
  for (const line of lines.filter((one) => !one.segments)) {
    extents[0].addAll(line.x);
    extents[1].addAll(line.y);
  }
  for (const point of points) {
    extents[0].add(point.x);
    extents[1].add(point.y);
  }
  const named = [nameQuantity(model, x), nameQuantity(model, y)] as const;
  const plane = state.result?.plane;
  const sliced =
    plane && plane.x === x.of && plane.y === y.of && x.quantity === 'class' && y.quantity === 'class';
  const legend: LegendItem[] = lines.map((line) => ({
    label: line.name ?? line.label,
    colour: line.colour,
    marker: line.marker,
    line: line.dash ? 'dashed' : line.twin ? 'thin' : 'solid',
  }));
  return {
    title: 'Phase plane',
    description: `${named[1].name} against ${named[0].name}`,
    x: {
      ...named[0],
      logarithm: x.logarithm,
      domain: paddedDomain(extents[0].low, extents[0].high, { logarithm: x.logarithm, fromZero: true }),
    },
    y: {
      ...named[1],
      logarithm: y.logarithm,
      domain: paddedDomain(extents[1].low, extents[1].high, { logarithm: y.logarithm, fromZero: true }),
    },
    lines,
    bands: [],
    points,
    handles: startHandle(input, x, y),
    flow: sliced && !x.logarithm && !y.logarithm ? plane.flow : null,
    legend,
    notes: [...(sliced && plane.note ? [plane.note] : []), ...commonNotes(state)],
    empty:
      waitingText(state) ??
      (axes ? null : 'A phase plane needs two classes. Add a class, or show trajectories instead.'),
  };
}
