/** Branches of cycles in the diagram of a sweep: bands between lowest and highest, or their period. */
import type { CyclesResult } from '@/engine/cycles/contract';
import { specialPointGlyph } from '@/graphics/glyphs';
import type { PlotBand, PlotLine, PlotPoint } from '@/graphics/plot-spec';

import { cycleRuns, specialExtent, type CycleRun } from '../../cycles/cycle-runs';
import { branchName, cyclePointSentence } from '../../cycles/cycle-words';
import { runStyle, STABILITY_WORDS } from './branch-runs';
import type { Shown } from './shown-quantities';
import type { ViewInput } from './view-input';

/** The cycles of the model, or of its pooled twin. */
export interface CycleSource {
  readonly result: CyclesResult;
  readonly isTwin: boolean;
}

const NOT_FEASIBLE = 0.3;
/** The twin's ground is the faintest, so that it leaves the hue of the model. */
const TWIN_GROUND = 0.05;
const GROUND = 0.2;
const REPELLING_GROUND = 0.08;

function labelOf({ result, isTwin }: CycleSource, shown: Shown, run: CycleRun): string {
  const origin = result.branches[run.branch]?.origin;
  return [
    ...(isTwin ? ['pooled twin'] : []),
    shown.label,
    origin ? branchName(origin) : 'cycles',
    `${STABILITY_WORDS[run.attracts] ?? 'undecided'}${run.feasible ? '' : ', not feasible'}`,
  ].join(', ');
}

const idOf = (source: CycleSource, shown: Shown, order: number) =>
  `${source.isTwin ? 'twin' : 'own'}-cycles:${shown.label}:${order}`;

/** Bands with an edge solid where the cycle attracts and dashed where it repels. */
export function cycleBands(input: ViewInput, source: CycleSource, shown: Shown): readonly PlotBand[] {
  const { model, palette } = input;
  return cycleRuns(model, source.result, shown.quantity).map((run, order): PlotBand => {
    const { width, dash } = runStyle(run.attracts, source.isTwin);
    const faint = run.feasible ? 1 : NOT_FEASIBLE;
    return {
      id: idOf(source, shown, order),
      label: labelOf(source, shown, run),
      colour: source.isTwin ? palette.twin : shown.colour,
      x: run.parameters,
      low: run.low,
      high: run.high,
      opacity: (source.isTwin ? TWIN_GROUND : run.attracts === 1 ? GROUND : REPELLING_GROUND) * faint,
      edge: { width, opacity: faint },
      ...(dash ? { dash } : {}),
      twin: source.isTwin,
    };
  });
}

/** Thin lines of the mean over a period; of the period itself where that is on show. */
export function cycleLines(input: ViewInput, source: CycleSource, shown: Shown): readonly PlotLine[] {
  const { model, palette } = input;
  const period = shown.quantity.quantity === 'period';
  return cycleRuns(model, source.result, shown.quantity).map((run, order): PlotLine => {
    const style = runStyle(run.attracts, source.isTwin);
    return {
      id: `${idOf(source, shown, order)}:mean`,
      label: `${labelOf(source, shown, run)}${period ? '' : ', mean'}`,
      colour: source.isTwin ? palette.twin : shown.colour,
      ...style,
      width: period ? style.width : 0.9,
      opacity: (run.feasible ? 1 : NOT_FEASIBLE) * (period ? 1 : 0.85),
      marker: null,
      x: run.parameters,
      y: run.mean,
      twin: source.isTwin,
    };
  });
}

/** Special points of cycles, at the highest value of the cycle there. */
export function cyclePoints(input: ViewInput, source: CycleSource, shown: Shown): readonly PlotPoint[] {
  const { model, palette, state } = input;
  const { result, isTwin } = source;
  return result.specialPoints.flatMap((point): PlotPoint[] => {
    const branch = result.branches[point.branch];
    const extent = branch ? specialExtent(model, branch, point, shown.quantity) : null;
    if (!branch || !extent) return [];
    const selected = !isTwin && state.selectedPoint?.id === point.id;
    const run = cycleRuns(model, result, shown.quantity).find(
      (one) => one.branch === point.branch && one.parameters.includes(point.parameter),
    );
    const at = run?.parameters.indexOf(point.parameter) ?? -1;
    const before = Math.max(0, at - 1);
    return [
      {
        id: `${isTwin ? 'twin' : 'own'}-cycle-point:${shown.label}:${point.id}`,
        label: isTwin ? `${point.kind}, twin` : point.kind,
        description: `${isTwin ? 'Pooled twin: ' : ''}${cyclePointSentence(point)}`,
        x: point.parameter,
        y: extent.high,
        glyph: specialPointGlyph(point.kind),
        colour: isTwin ? palette.twin : selected ? palette.accent : palette.ink,
        size: selected ? 8.5 : isTwin ? 6 : 7,
        named: point.feasible,
        twin: isTwin,
        ...(run && at > 0 && point.kind === 'fold of cycles'
          ? {
              along: {
                dx: point.parameter - (run.parameters[before] ?? NaN),
                dy: extent.high - (run.high[before] ?? NaN),
              },
            }
          : {}),
      },
    ];
  });
}
