/** Branches of equilibria in the diagram of a sweep, with their special points and integrated bands. */
import type { Band, SpecialPoint, SweepResult } from '@/engine/continuation/contract';
import type { PresetDocument } from '@/engine/schema/preset';
import { equilibriumGlyph, specialPointGlyph } from '@/graphics/glyphs';
import { formatNumber } from '@/graphics/numbers';
import type { PlotBand, PlotLine, PlotPoint } from '@/graphics/plot-spec';
import { readQuantity } from '@/graphics/quantities';

import { quantityColumn } from '../../cycles/cycle-quantity';
import { cyclesAt } from '../../cycles/present-cycles';
import { equilibriumSentence } from '../equilibrium-words';
import { runStyle, STABILITY_WORDS, sweepRuns } from './branch-runs';
import type { CycleSource } from './cycle-marks';
import type { Shown } from './shown-quantities';
import { listClassNames, type ViewInput } from './view-input';

/** Branches, solid where they attract and dashed where they repel. */
export function branchLines(
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

/** Whether a continued cycle that attracts takes the place of an integrated band. */
function isContinued(band: Band, cycles: CycleSource | undefined): boolean {
  const middle = band.parameters[Math.floor(band.parameters.length / 2)] ?? NaN;
  return cycles !== undefined && cyclesAt(cycles.result, middle).some((one) => one.attracts === 1);
}

/** Integrated long-run ranges, where no cycle was continued. */
export function longRunBands(
  model: PresetDocument,
  sweep: SweepResult,
  shown: Shown,
  twin: boolean,
  grey: string,
  cycles: CycleSource | undefined,
): PlotBand[] {
  return sweep.bands.flatMap((band, order) => {
    const column = quantityColumn(model, band.quantities, shown.quantity);
    if (!column || isContinued(band, cycles)) return [];
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

/** A special point on the diagram; a Hopf point has the period with which cycles begin. */
export function specialPointMarks(
  input: ViewInput,
  sweep: SweepResult,
  shown: Shown,
  point: SpecialPoint,
  twin: boolean,
): PlotPoint[] {
  const { model, palette, state } = input;
  const branch = sweep.branches[point.branch];
  const read = readQuantity(model, shown.quantity, sweep.stateSymbols);
  const period = shown.quantity.quantity === 'period' && point.hopf ? (2 * Math.PI) / point.hopf.omega : null;
  const y = period ?? read?.(point.state, 0, NaN, point.parameter) ?? NaN;
  if (!branch || !Number.isFinite(y)) return [];
  const after = Math.min(point.index + 1, branch.parameters.length - 1);
  const before = Math.max(0, after - 1);
  const at = (k: number) =>
    read?.(branch.states, k * branch.dimension, NaN, branch.parameters[k] ?? NaN) ?? NaN;
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

/** Equilibria at the present value. */
export function presentEquilibria(input: ViewInput, shown: Shown, value: number): PlotPoint[] {
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
