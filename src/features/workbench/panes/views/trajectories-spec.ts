import type { Trajectory } from '@/engine/integrators/contract';
import type { Quantity } from '@/engine/schema/preset';
import { paddedDomain } from '@/graphics/axis';
import { classMarker, twinMarker } from '@/graphics/glyphs';
import { classColours, populationColour } from '@/graphics/palette';
import type { LegendItem, PlotHandle, PlotLine, PlotSpec } from '@/graphics/plot-spec';
import { nameQuantity, readQuantity } from '@/graphics/quantities';

import {
  commonNotes,
  currentStart,
  Extent,
  listClassNames,
  showsTwin,
  waitingText,
  type ViewInput,
} from './view-input';

interface Drawn {
  readonly quantity: Quantity;
  readonly label: string;
  readonly colour: string;
  readonly index: number;
}

/** Every class, every total, or every share, as the first axis says. */
function drawnQuantities({ model, palette, axes }: ViewInput): readonly Drawn[] {
  const kind = axes[0]?.quantity ?? 'class';
  const classes = listClassNames(model);
  if (kind === 'total')
    return model.populations.map((population, index) => ({
      quantity: { quantity: 'total', of: population.symbol, logarithm: false },
      label: population.name || population.symbol,
      colour: populationColour(population.hue, palette, population.classes.length),
      index,
    }));
  const colours = classColours(model.populations, palette);
  const shown = kind === 'proportion' ? classes.filter((one) => one.population.classes.length > 1) : classes;
  return shown.map((one) => ({
    quantity: { quantity: kind === 'proportion' ? 'proportion' : 'class', of: one.symbol, logarithm: false },
    label: kind === 'proportion' ? `share of ${one.name}` : one.name,
    colour: colours.get(one.symbol) ?? palette.ink,
    index: one.index,
  }));
}

function sample(trajectory: Trajectory, read: NonNullable<ReturnType<typeof readQuantity>>): Float64Array {
  const { times, states, dimension } = trajectory;
  const values = new Float64Array(times.length);
  for (let k = 0; k < times.length; k++) values[k] = read(states, k * dimension, times[k] ?? NaN, NaN);
  return values;
}

function twinLines(input: ViewInput, drawn: readonly Drawn[]): PlotLine[] {
  const { state, model, palette } = input;
  const twin = state.result?.twinTrajectory;
  if (!twin || !showsTwin(state)) return [];
  const lines: PlotLine[] = [];
  for (const one of drawn) {
    const read = readQuantity(model, one.quantity, state.result?.twinStateSymbols ?? []);
    if (!read) continue;
    const y = sample(twin, read);
    // Classes with equal shares of a pooled total would hide one another.
    if (lines.some((line) => line.y.every((value, k) => value === y[k]))) continue;
    lines.push({
      id: `twin:${one.label}`,
      label: `pooled twin, ${one.label}`,
      colour: palette.twin,
      width: 1.6,
      marker: twinMarker(one.index),
      x: twin.times,
      y,
      twin: true,
    });
  }
  return lines;
}

function startHandles({ state, palette, axes }: ViewInput, drawn: readonly Drawn[]): PlotHandle[] {
  if ((axes[0]?.quantity ?? 'class') !== 'class') return [];
  return drawn.flatMap((one) => {
    const start = currentStart(state, one.quantity.of);
    if (start === null) return [];
    return {
      id: `start:${one.quantity.of}`,
      label: `Start of ${one.label}`,
      shape: 'ring' as const,
      x: 0,
      y: start,
      moves: 'y' as const,
      colour: palette.ink,
    };
  });
}

/** Trajectories against time, of classes, totals or shares, with the pooled twin in grey. */
export function trajectoriesSpec(input: ViewInput): PlotSpec {
  const { state, model, axes } = input;
  const logarithm = axes[0]?.logarithm ?? false;
  const kind = axes[0]?.quantity ?? 'class';
  const trajectory = state.result?.trajectory;
  const symbols = listClassNames(model).map((one) => one.symbol);
  const drawn = drawnQuantities(input);
  const own: PlotLine[] = trajectory
    ? drawn.flatMap((one) => {
        const read = readQuantity(model, one.quantity, symbols);
        if (!read) return [];
        return {
          id: one.label,
          label: one.label,
          colour: one.colour,
          width: 2,
          marker: classMarker(one.index),
          x: trajectory.times,
          y: sample(trajectory, read),
          twin: false,
        };
      })
    : [];
  const lines = [...twinLines(input, drawn), ...own];
  const extent = new Extent(logarithm);
  for (const line of lines) extent.addAll(line.y);
  const yName = kind === 'proportion' ? 'share of its population' : 'density';
  const notes = [
    ...(trajectory && trajectory.status !== 'complete' ? [trajectory.message] : []),
    ...commonNotes(state),
  ];
  const legend: LegendItem[] = own.map((line) => ({
    label: line.label,
    colour: line.colour,
    marker: line.marker,
    line: 'solid',
  }));
  if (lines.length > own.length)
    legend.push({ label: 'pooled twin', colour: input.palette.twin, marker: 'hollow circle', line: 'thin' });
  return {
    title: 'Trajectories',
    description: `${own.map((line) => line.label).join(', ')} over ${model.horizon} ${model.timeUnit}`,
    x: {
      ...nameQuantity(model, { quantity: 'time', of: '', logarithm: false }),
      logarithm: false,
      domain: [0, state.document.horizon],
    },
    y: {
      name: yName,
      unit: kind === 'proportion' ? '' : model.densityUnit,
      logarithm,
      domain:
        kind === 'proportion' && !logarithm
          ? [0, 1]
          : paddedDomain(extent.low, extent.high, { logarithm, fromZero: true }),
    },
    lines,
    bands: [],
    points: [],
    handles: startHandles(input, drawn),
    flow: null,
    legend,
    notes,
    empty:
      waitingText(state) ??
      (kind === 'proportion' && drawn.length === 0
        ? 'No population is split into classes, so there are no shares. Show classes instead.'
        : null),
  };
}
