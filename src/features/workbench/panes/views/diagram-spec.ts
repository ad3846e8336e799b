import type { Band, SpecialPoint, SweepResult } from '@/engine/continuation/contract';
import type { PresetDocument, Quantity } from '@/engine/schema/preset';
import { paddedDomain } from '@/graphics/axis';
import { equilibriumGlyph, specialPointGlyph } from '@/graphics/glyphs';
import { formatNumber } from '@/graphics/numbers';
import { classColours, populationColour } from '@/graphics/palette';
import type { LegendItem, PlotBand, PlotHandle, PlotLine, PlotPoint, PlotSpec } from '@/graphics/plot-spec';
import {
  nameQuantity,
  parameterName,
  poolingShare,
  readQuantity,
  totalQuantity,
  classQuantity,
} from '@/graphics/quantities';

import { readParameterValue } from '../../engine/parameter-values';
import { equilibriumSentence } from '../equilibrium-words';
import { runStyle, STABILITY_WORDS, sweepRuns } from './branch-runs';
import { commonNotes, Extent, listClassNames, showsTwin, waitingText, type ViewInput } from './view-input';

interface Shown {
  readonly quantity: Quantity;
  readonly label: string;
  readonly colour: string;
}

/** The quantity of the axis; all classes where it names none; by default the last population's total. */
function shownQuantities({ model, palette, axes }: ViewInput): readonly Shown[] {
  const last = model.populations.at(-1);
  const quantity = axes[0] ?? totalQuantity(last?.symbol ?? '');
  const colours = classColours(model.populations, palette);
  if (quantity.of === '')
    return listClassNames(model).map((one) => ({
      quantity: { ...classQuantity(one.symbol), logarithm: quantity.logarithm },
      label: one.name,
      colour: colours.get(one.symbol) ?? palette.ink,
    }));
  const population = model.populations.find((one) => one.symbol === quantity.of);
  const colour =
    quantity.quantity === 'total' && population
      ? populationColour(population.hue, palette, population.classes.length)
      : (colours.get(quantity.of) ?? palette.ink);
  return [{ quantity, label: nameQuantity(model, quantity).name, colour }];
}

function branchLines(
  model: PresetDocument,
  sweep: SweepResult,
  shown: Shown,
  twin: boolean,
  grey: string,
): PlotLine[] {
  const read = readQuantity(model, shown.quantity, sweep.stateSymbols);
  if (!read) return [];
  return sweepRuns(sweep).flatMap((run, order) => {
    const branch = sweep.branches[run.branch];
    if (!branch) return [];
    const count = run.to - run.from + 1;
    const y = new Float64Array(count);
    const n = branch.dimension;
    for (let k = 0; k < count; k++)
      y[k] = read(branch.states, (run.from + k) * n, NaN, branch.parameters[run.from + k] ?? NaN);
    const word = STABILITY_WORDS[run.attracts] ?? 'undecided';
    return {
      id: `${twin ? 'twin' : 'own'}:${shown.label}:${order}`,
      label: `${twin ? 'pooled twin, ' : ''}${shown.label}, branch ${run.branch + 1}, ${word}${run.feasible ? '' : ', not feasible'}`,
      colour: twin ? grey : shown.colour,
      ...runStyle(run.attracts, twin),
      opacity: run.feasible ? 1 : 0.3,
      marker: null,
      x: branch.parameters.slice(run.from, run.to + 1),
      y,
      twin,
    };
  });
}

/** Where a band holds a quantity: its column and the factor it is multiplied by. */
export function bandColumn(
  model: PresetDocument,
  band: Band,
  quantity: Quantity,
): readonly [number, number] | null {
  if (quantity.quantity === 'total') {
    const column = band.quantities.lastIndexOf(quantity.of);
    return column >= 0 ? [column, 1] : null;
  }
  if (quantity.quantity !== 'class') return null;
  const column = band.quantities.indexOf(quantity.of);
  if (column >= 0) return [column, 1];
  const population = model.populations.find((one) =>
    one.classes.some((member) => member.symbol === quantity.of),
  );
  const total = population ? band.quantities.indexOf(population.symbol) : -1;
  return total >= 0 ? [total, poolingShare(model, quantity.of)] : null;
}

/** Stretches of a band that are settled throughout, or nowhere; they overlap by one point. */
function settledRuns(band: Band): readonly (readonly [number, number])[] {
  const runs: (readonly [number, number])[] = [];
  const count = band.parameters.length;
  let from = 0;
  for (let k = 1; k <= count; k++) {
    if (k < count && band.settled[k] === band.settled[from]) continue;
    runs.push([from, Math.min(k, count - 1)]);
    from = k;
  }
  return runs;
}

function bands(
  model: PresetDocument,
  sweep: SweepResult,
  shown: Shown,
  twin: boolean,
  grey: string,
): PlotBand[] {
  return sweep.bands.flatMap((band, order) => {
    const column = bandColumn(model, band, shown.quantity);
    if (!column) return [];
    const m = band.quantities.length;
    return settledRuns(band).map(([from, to], part): PlotBand => {
      const x = band.parameters.slice(from, to + 1);
      const pick = (values: Float64Array) =>
        Float64Array.from(x, (_value, k) => column[1] * (values[(from + k) * m + column[0]] ?? NaN));
      const settled = band.settled[from] === 1;
      return {
        id: `${twin ? 'twin' : 'own'}-band:${shown.label}:${order}:${part}`,
        label: `${twin ? 'pooled twin, ' : ''}${shown.label}, long-run range${settled ? '' : ' (as far as seen)'}`,
        colour: twin ? grey : shown.colour,
        x,
        low: pick(band.lowest),
        high: pick(band.highest),
        opacity: twin ? 0.16 : 0.2,
        ...(settled ? {} : { dash: [2, 3] }),
        twin,
      };
    });
  });
}

function specialPoint(
  input: ViewInput,
  sweep: SweepResult,
  shown: Shown,
  point: SpecialPoint,
  twin: boolean,
): PlotPoint[] {
  const { model, palette, state } = input;
  const read = readQuantity(model, shown.quantity, sweep.stateSymbols);
  const branch = sweep.branches[point.branch];
  if (!read || !branch) return [];
  const y = read(point.state, 0, NaN, point.parameter);
  const after = Math.min(point.index + 1, branch.parameters.length - 1);
  const before = Math.max(0, after - 1);
  const at = (k: number) => read(branch.states, k * branch.dimension, NaN, branch.parameters[k] ?? NaN);
  const selected = !twin && state.selectedPoint?.id === point.id;
  return [
    {
      id: `${twin ? 'twin' : 'own'}-point:${point.id}`,
      label: twin ? `${point.kind}, twin` : point.kind,
      description: `${twin ? 'Pooled twin: ' : ''}${point.kind} at ${formatNumber(point.parameter, 6)}. ${point.meaning}`,
      x: point.parameter,
      y,
      glyph: specialPointGlyph(point.kind),
      colour: twin ? palette.twin : selected ? palette.accent : palette.ink,
      size: selected ? 8.5 : twin ? 6 : 7,
      named: point.feasible,
      twin,
      ...(point.kind === 'fold' || point.kind === 'pitchfork'
        ? {
            along: {
              dx: (branch.parameters[after] ?? NaN) - (branch.parameters[before] ?? NaN),
              dy: at(after) - at(before),
            },
          }
        : {}),
    },
  ];
}

function presentEquilibria(input: ViewInput, shown: Shown, value: number): PlotPoint[] {
  const { state, model } = input;
  const read = readQuantity(
    model,
    shown.quantity,
    listClassNames(model).map((one) => one.symbol),
  );
  if (!read) return [];
  return (state.result?.equilibria?.equilibria ?? [])
    .filter((one) => one.feasible)
    .map((one, index) => ({
      id: `now:${shown.label}:${index}`,
      label: one.type,
      description: `Now, ${equilibriumSentence(model.populations, one)}`,
      x: value,
      y: read(one.state, 0, NaN, value),
      glyph: equilibriumGlyph(one.attracts),
      colour: input.palette.accent,
      size: 4.5,
      named: false,
      twin: false,
    }));
}

function emptyReason(input: ViewInput): string | null {
  const { state } = input;
  const waiting = waitingText(state);
  if (waiting) return waiting;
  if (!state.sweepSelection) return 'Choose a parameter on the strip below, and run a sweep.';
  if (!state.sweep)
    return state.job ? 'The sweep is under way…' : 'No sweep has been run yet. Run one from the strip below.';
  const { split } = state.sweep;
  if (split.branches.length === 0)
    return split.message || 'The sweep found no branch. Widen the range on the strip and run it again.';
  return null;
}

/** Branches of equilibria along the swept parameter, with special points, long-run bands and the twin. */
export function diagramSpec(input: ViewInput): PlotSpec {
  const { state, model, palette } = input;
  const sweep = state.sweep;
  const key = sweep?.split.parameterKey ?? state.sweepSelection?.parameter ?? '';
  const shown = shownQuantities(input);
  const logarithm = shown[0]?.quantity.logarithm ?? false;
  const value = readParameterValue(state.document, key);
  const twin = showsTwin(state) ? (sweep?.twin ?? null) : null;
  const sources = sweep
    ? [...(twin ? [{ result: twin, isTwin: true }] : []), { result: sweep.split, isTwin: false }]
    : [];
  const lines = sources.flatMap(({ result, isTwin }) =>
    shown.flatMap((one) => branchLines(model, result, one, isTwin, palette.twin)),
  );
  const allBands = sources.flatMap(({ result, isTwin }) =>
    shown.flatMap((one) => bands(model, result, one, isTwin, palette.twin)),
  );
  const points = sources.flatMap(({ result, isTwin }) =>
    shown.flatMap((one) =>
      result.specialPoints.flatMap((point) => specialPoint(input, result, one, point, isTwin)),
    ),
  );
  if (value !== null && sweep) points.push(...shown.flatMap((one) => presentEquilibria(input, one, value)));
  const extent = new Extent(logarithm);
  for (const line of lines) if (line.opacity === 1) extent.addAll(line.y);
  for (const band of allBands) {
    extent.addAll(band.low);
    extent.addAll(band.high);
  }
  const named = nameQuantity(model, shown[0]?.quantity ?? totalQuantity(''));
  const parameter = parameterName(model, key);
  const from = sweep?.split.from ?? state.sweepSelection?.from ?? 0;
  const to = sweep?.split.to ?? state.sweepSelection?.to ?? 1;
  const handles: PlotHandle[] =
    value === null || !sweep
      ? []
      : [
          {
            id: `parameter:${key}`,
            label: parameter.name,
            shape: 'vertical',
            x: value,
            y: NaN,
            moves: 'x',
            colour: palette.accent,
          },
        ];
  const legend: LegendItem[] = shown.map((one) => ({
    label: one.label,
    colour: one.colour,
    marker: null,
    line: 'solid',
  }));
  legend.push(
    { label: 'attracts', colour: palette.ink, marker: null, line: 'solid' },
    { label: 'repels', colour: palette.ink, marker: null, line: 'dashed' },
  );
  if (allBands.length > 0)
    legend.push({
      label: 'long-run range',
      colour: shown[0]?.colour ?? palette.ink,
      marker: null,
      line: 'band',
    });
  if (twin) legend.push({ label: 'pooled twin', colour: palette.twin, marker: null, line: 'thin' });
  const status = sweep && sweep.split.status !== 'complete' ? [sweep.split.message] : [];
  return {
    title: `Sweep over ${parameter.name}`,
    description: `${named.name} at equilibrium against ${parameter.name}, with ${sweep?.split.specialPoints.length ?? 0} special points`,
    x: { ...parameter, logarithm: false, domain: from < to ? [from, to] : [0, 1] },
    y: {
      name: shown.length > 1 ? 'density' : named.name,
      unit: named.unit,
      logarithm,
      domain: paddedDomain(extent.low, extent.high, { logarithm, fromZero: true }),
    },
    lines,
    bands: allBands,
    points,
    handles,
    flow: null,
    legend,
    notes: [
      ...(state.sweepOutdated ? ['Computed before the last edit: run the sweep again.'] : []),
      ...status,
      ...commonNotes(state),
    ],
    empty: emptyReason(input),
  };
}
