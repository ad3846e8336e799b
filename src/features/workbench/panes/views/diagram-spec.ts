import { paddedDomain } from '@/graphics/axis';
import type { LegendItem, PlotHandle, PlotSpec } from '@/graphics/plot-spec';
import { nameQuantity, parameterName, totalQuantity } from '@/graphics/quantities';

import { readParameterValue } from '../../engine/parameter-values';
import { cycleBands, cycleLines, cyclePoints, type CycleSource } from './cycle-marks';
import { branchLines, longRunBands, presentEquilibria, specialPointMarks } from './equilibrium-marks';
import { shownQuantities, type Shown } from './shown-quantities';
import { commonNotes, Extent, showsTwin, waitingText, type ViewInput } from './view-input';

/** Decades that a logarithmic diagram reaches down: cycles pass through very low densities. */
const DECADES = 40;
/** What is drawn fainter than this is not feasible, and sets no extent. */
const FAINT = 0.5;

function emptyReason({ state }: ViewInput, shown: readonly Shown[]): string | null {
  const waiting = waitingText(state);
  if (waiting) return waiting;
  if (!state.sweepSelection) return 'Choose a parameter on the strip below, and run a sweep.';
  if (!state.sweep)
    return state.job ? 'The sweep is under way…' : 'No sweep has been run yet. Run one from the strip below.';
  const cycles = state.cycles?.split.branches.length ?? 0;
  if (cycles > 0) return null;
  const { split } = state.sweep;
  if (split.status === 'needs-period-map')
    return state.job
      ? 'The period map is being followed…'
      : state.cycles?.split.message ||
          'The period map has no fixed point in this range. Widen it and run again.';
  if (split.branches.length === 0)
    return split.message || 'The sweep found no branch. Widen the range on the strip and run it again.';
  if (shown[0]?.quantity.quantity === 'period')
    return state.job
      ? 'The cycles are being followed…'
      : `There is no period to show: ${state.cycles?.split.message || 'no cycle was followed.'}`;
  return null;
}

/** Cycles of the twin first, so that those of the model lie above. */
function cycleSources({ state }: ViewInput): readonly CycleSource[] {
  const { cycles } = state;
  if (!cycles) return [];
  const twin = showsTwin(state) ? cycles.twin : null;
  return [...(twin ? [{ result: twin, isTwin: true }] : []), { result: cycles.split, isTwin: false }];
}

function legendOf(input: ViewInput, shown: readonly Shown[], spec: Pick<PlotSpec, 'bands'>): LegendItem[] {
  const { state, palette } = input;
  const own: LegendItem[] = shown.map((one) => ({
    label: one.label,
    colour: one.colour,
    marker: null,
    line: 'solid',
  }));
  own.push(
    { label: 'attracts', colour: palette.ink, marker: null, line: 'solid' },
    { label: 'repels', colour: palette.ink, marker: null, line: 'dashed' },
  );
  const colour = shown[0]?.colour ?? palette.ink;
  const forced = state.cycles?.split.forcingPeriod ?? null;
  if (spec.bands.some((band) => band.id.includes('-cycles:')))
    own.push({
      label: forced === null ? 'cycle, lowest to highest' : 'lowest to highest within a cycle of the forcing',
      colour,
      marker: null,
      line: 'band',
    });
  if (spec.bands.some((band) => band.id.includes('-band:')))
    own.push({ label: 'long-run range', colour, marker: null, line: 'band' });
  if (showsTwin(state) && state.sweep?.twin)
    own.push({ label: 'pooled twin', colour: palette.twin, marker: null, line: 'thin' });
  return own;
}

/** What the parts of the sweep say where they were not completed; under forcing the period map stands for it. */
function statusNotes({ state }: ViewInput): readonly string[] {
  const { sweep, cycles } = state;
  const notes: string[] = [];
  if (sweep && sweep.split.status !== 'complete' && sweep.split.status !== 'needs-period-map')
    notes.push(sweep.split.message);
  if (sweep?.split.status === 'needs-period-map')
    notes.push('Time enters the formulas, so nothing rests: fixed points of the period map are followed.');
  if (cycles && !state.job && cycles.split.status !== 'complete') notes.push(cycles.split.message);
  return notes;
}

/** Branches of equilibria and of cycles along the swept parameter, with their special points and the twin. */
export function diagramSpec(input: ViewInput): PlotSpec {
  const { state, model, palette } = input;
  const sweep = state.sweep;
  const key = sweep?.split.parameterKey ?? state.sweepSelection?.parameter ?? '';
  const shown = shownQuantities(input);
  const quantity = shown[0]?.quantity ?? totalQuantity('');
  const { logarithm } = quantity;
  const value = readParameterValue(state.document, key);
  const twin = showsTwin(state) ? (sweep?.twin ?? null) : null;
  const sources = sweep
    ? [...(twin ? [{ result: twin, isTwin: true }] : []), { result: sweep.split, isTwin: false }]
    : [];
  const cycles = cycleSources(input);
  const lines = [
    ...sources.flatMap(({ result, isTwin }) =>
      shown.flatMap((one) => branchLines(model, result, one, isTwin, palette.twin)),
    ),
    ...cycles.flatMap((source) => shown.flatMap((one) => cycleLines(input, source, one))),
  ];
  const continued = (isTwin: boolean) => cycles.find((one) => one.isTwin === isTwin);
  const bands = [
    ...sources.flatMap(({ result, isTwin }) =>
      shown.flatMap((one) => longRunBands(model, result, one, isTwin, palette.twin, continued(isTwin))),
    ),
    ...(quantity.quantity === 'period'
      ? []
      : cycles.flatMap((source) => shown.flatMap((one) => cycleBands(input, source, one)))),
  ];
  const points = [
    ...sources.flatMap(({ result, isTwin }) =>
      shown.flatMap((one) =>
        result.specialPoints.flatMap((point) => specialPointMarks(input, result, one, point, isTwin)),
      ),
    ),
    ...cycles.flatMap((source) => shown.flatMap((one) => cyclePoints(input, source, one))),
    ...(value !== null && sweep ? shown.flatMap((one) => presentEquilibria(input, one, value)) : []),
  ];
  const extent = new Extent(logarithm);
  for (const line of lines) if ((line.opacity ?? 1) > FAINT) extent.addAll(line.y);
  for (const band of bands)
    if ((band.edge?.opacity ?? 1) > FAINT) {
      extent.addAll(band.low);
      extent.addAll(band.high);
    }
  const named = nameQuantity(model, quantity);
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
  const special = (sweep?.split.specialPoints.length ?? 0) + (state.cycles?.split.specialPoints.length ?? 0);
  return {
    title: `Sweep over ${parameter.name}`,
    description: `${named.name} at equilibria and on cycles against ${parameter.name}, with ${special} special points`,
    x: { ...parameter, logarithm: false, domain: from < to ? [from, to] : [0, 1] },
    y: {
      name: shown.length > 1 ? 'density' : named.name,
      unit: named.unit,
      logarithm,
      domain: paddedDomain(extent.low, extent.high, { logarithm, fromZero: true, decades: DECADES }),
    },
    lines,
    bands,
    points,
    handles,
    flow: null,
    legend: legendOf(input, shown, { bands }),
    notes: [
      ...(state.sweepOutdated ? ['Computed before the last edit: run the sweep again.'] : []),
      ...statusNotes(input),
      ...commonNotes(state),
    ],
    empty: emptyReason(input, shown),
  };
}
