import { beforeAll, describe, expect, it } from 'vitest';

import { PALETTES } from '@/graphics/palette';
import { createLocalEngine } from '@/workers/local-engine';
import { readParameterValues, readStarts } from '@/features/workbench/engine/parameter-values';
import { createWorkbenchStore, type WorkbenchState } from '@/features/workbench/state/store';
import { branchRuns } from '@/features/workbench/panes/views/branch-runs';
import { diagramSpec } from '@/features/workbench/panes/views/diagram-spec';
import { planeSpec } from '@/features/workbench/panes/views/plane-spec';
import { trajectoriesSpec } from '@/features/workbench/panes/views/trajectories-spec';
import { walk, readNearest } from '@/features/workbench/panes/plot/plot-reading';
import { isSensible, pannedView, zoomedView } from '@/features/workbench/panes/plot/plot-zoom';
import { layoutPlot } from '@/graphics/plot-layout';
import { spaceSpec, spaceTables } from '@/features/workbench/panes/space/space-spec';
import { specialPointRows, sortRows } from '@/features/workbench/findings/special-point-rows';
import { placeTicks } from '@/features/workbench/strip/strip-ticks';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';

const document = saturatingTwoSexPredator;
let state: WorkbenchState;

beforeAll(async () => {
  const engine = createLocalEngine();
  const report = await engine.setModel(document);
  const values = readParameterValues(document);
  const starts = readStarts(document);
  const result = await engine.explore({
    values,
    starts,
    horizon: 40,
    samples: 200,
    withTwin: true,
    equilibria: 'search',
    plane: null,
  });
  const range = document.sweeps[0];
  if (!range) throw new Error('The preset has a sweep.');
  const selection = { parameter: range.parameter, from: range.from, to: range.to };
  const sweep = await engine.sweep(1, { values, starts, withTwin: true, ...selection }, () => undefined);
  const store = createWorkbenchStore(document, { kind: 'new' });
  store.getState().set({
    report,
    shownReport: report,
    shownDocument: document,
    result,
    sweep,
    sweepSelection: selection,
  });
  state = store.getState();
}, 60_000);

const input = (axes: Parameters<typeof trajectoriesSpec>[0]['axes'] = []) => ({
  state,
  model: document,
  palette: PALETTES.light,
  axes,
});

describe('trajectories', () => {
  it('draws every class with its own marker and the twin in grey beneath', () => {
    const spec = trajectoriesSpec(input());
    const own = spec.lines.filter((line) => !line.twin);
    const classes = document.populations.flatMap((one) => one.classes);
    expect(own).toHaveLength(classes.length);
    expect(new Set(own.map((line) => line.marker)).size).toBe(classes.length);
    expect(spec.lines.filter((line) => line.twin).every((line) => line.colour === PALETTES.light.twin)).toBe(
      true,
    );
    expect(spec.handles.map((handle) => handle.y)).toEqual(classes.map((one) => one.start));
  });

  it('adds the classes up to totals', () => {
    const classes = trajectoriesSpec(input()).lines.filter((line) => !line.twin);
    const totals = trajectoriesSpec(input([{ quantity: 'total', of: '', logarithm: false }])).lines.filter(
      (line) => !line.twin,
    );
    expect(totals).toHaveLength(document.populations.length);
    const sum = (lines: typeof totals, k: number) => lines.reduce((all, line) => all + (line.y[k] ?? NaN), 0);
    expect(sum(totals, 50)).toBeCloseTo(sum(classes, 50), 10);
  });
});

describe('phase plane and space', () => {
  it('marks feasible equilibria, filled where they attract', () => {
    const spec = planeSpec(input());
    const feasible = state.result?.equilibria?.equilibria.filter((one) => one.feasible) ?? [];
    expect(spec.points.filter((point) => !point.twin)).toHaveLength(feasible.length);
    expect(feasible.length).toBeGreaterThan(0);
    for (const [k, one] of feasible.entries())
      expect(spec.points.filter((point) => !point.twin)[k]?.glyph === 'attracting').toBe(
        one.attracts === 'yes',
      );
  });

  it('gives the same numbers in space as the trajectory has', () => {
    const spec = spaceSpec('space', input());
    const table = spaceTables(spec).find((one) => one.name === 'trajectory');
    expect(table?.rows[0]).toEqual(
      document.populations
        .flatMap((one) => one.classes)
        .slice(0, 3)
        .map((one) => one.start),
    );
    expect(spec.start?.classes).toHaveLength(3);
  });
});

describe('the diagram of a sweep', () => {
  it('covers each branch by runs that meet', () => {
    for (const branch of state.sweep?.split.branches ?? []) {
      const runs = branchRuns(branch, 0);
      expect(runs[0]?.from).toBe(0);
      expect(runs.at(-1)?.to).toBe(branch.parameters.length - 1);
      for (let k = 1; k < runs.length; k++) expect(runs[k]?.from).toBe(runs[k - 1]?.to);
    }
  });

  it('draws attraction solid and repulsion dashed, and marks the special points with their names', () => {
    const spec = diagramSpec(input());
    expect(spec.empty).toBeNull();
    for (const line of spec.lines.filter((one) => !one.twin)) {
      if (line.label.includes('attracts')) expect([line.width, line.dash]).toEqual([2.6, undefined]);
      if (line.label.includes('repels')) expect([line.width, line.dash?.length]).toEqual([1.4, 2]);
    }
    const kinds = state.sweep?.split.specialPoints.map((one) => one.kind);
    expect(spec.points.filter((one) => one.id.startsWith('own-point')).map((one) => one.label)).toEqual(
      kinds,
    );
    expect(kinds?.length).toBeGreaterThan(0);
    expect(spec.handles[0]?.id).toBe(`parameter:${document.sweeps[0]?.parameter}`);
  });

  it('pairs points with those of the twin and gives the shift', () => {
    if (!state.sweep) throw new Error('There is a sweep.');
    const rows = specialPointRows(state.sweep, null);
    for (const row of rows)
      if (row.split && row.twin) expect(row.shift).toBe(row.split.parameter - row.twin.parameter);
    expect(rows.filter((row) => row.twin)).toHaveLength(state.sweep.twin?.specialPoints.length ?? 0);
    const sorted = sortRows(rows, { key: 'split', descending: true }).flatMap(
      (row) => row.split?.parameter ?? [],
    );
    expect(sorted).toEqual([...sorted].sort((a, b) => b - a));
  });

  it('names ticks of the strip without overlap', () => {
    const [point] = state.sweep?.split.specialPoints ?? [];
    if (!point) throw new Error('There is a special point.');
    const crowd = [0.1, 0.11, 0.12, 0.9].map((parameter) => ({
      point: { ...point, parameter, feasible: true },
      twin: false,
    }));
    const ticks = placeTicks(crowd, 0, 1, 500);
    expect(ticks.map((tick) => tick.row)).toEqual([0, 1, null, 0]);
    expect(placeTicks(crowd, 0.5, 1, 500)).toHaveLength(1);
  });
});

describe('reading a plot', () => {
  it('reads the nearest value under the pointer, in words with units', () => {
    const spec = trajectoriesSpec(input());
    const layout = layoutPlot(spec, 600, 400, null);
    const line = spec.lines.find((one) => !one.twin);
    if (!line) throw new Error('There is a line.');
    const reading = readNearest(spec, layout, layout.x(line.x[60] ?? NaN), layout.y(line.y[60] ?? NaN));
    expect(reading?.text).toContain('at time');
    expect(readNearest(spec, layout, -500, -500)).toBeNull();
  });

  it('walks along points and lines by the arrow keys', () => {
    const spec = diagramSpec(input());
    const layout = layoutPlot(spec, 600, 400, null);
    const first = walk(spec, layout, null, 'ArrowRight');
    expect(first?.reading.text).toContain(spec.points[0]?.description ?? '?');
    const line = walk(spec, layout, first?.walk ?? null, 'ArrowDown');
    expect(line?.walk.track).toBe(1);
    expect(line?.reading.text).toContain(spec.lines[0]?.label ?? '?');
    const back = walk(spec, layout, { track: 1, step: 0 }, 'ArrowLeft');
    expect(back?.walk.step).toBe(0);
  });

  it('zooms about the pointer and pans, within reason', () => {
    const layout = layoutPlot(trajectoriesSpec(input()), 600, 400, null);
    const at = layout.x.invert(300);
    const near = zoomedView(layout, 300, 200, 0.5);
    const after = layoutPlot(trajectoriesSpec(input()), 600, 400, near);
    expect(near.x[1] - near.x[0]).toBeCloseTo((layout.xAxis.domain[1] - layout.xAxis.domain[0]) / 2, 9);
    expect(after.x.invert(300)).toBeGreaterThan(at - 1);
    expect(after.x.invert(300)).toBeLessThan(at + 1);
    const moved = pannedView(layout, 50, 0);
    expect(moved.x[0]).toBeLessThan(layout.xAxis.domain[0]);
    expect(moved.y[0]).toBeCloseTo(layout.yAxis.domain[0], 9);
    expect(isSensible({ x: [1, 1 + 1e-14], y: [0, 1] })).toBe(false);
  });
});
