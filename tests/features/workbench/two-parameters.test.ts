import { beforeAll, describe, expect, it } from 'vitest';

import { runStudy } from '@/batch/run-study';
import { boundariesTask, mapTask } from '@/features/workbench/engine/two-parameter-tasks';
import { studyOf, studyTasks } from '@/features/workbench/dialogs/study-tasks';
import { readNearest } from '@/features/workbench/panes/plot/plot-reading';
import { createWorkbenchStore, type WorkbenchStore } from '@/features/workbench/state/store';
import { secondParameter } from '@/features/workbench/two-parameters/second-parameter';
import { twoParametersSpec } from '@/features/workbench/two-parameters/two-parameters-spec';
import { cellCentre, cellMarks } from '@/graphics/cell-marks';
import { PALETTES } from '@/graphics/palette';
import { layoutPlot } from '@/graphics/plot-layout';
import { plotTables } from '@/graphics/plot-table';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';
import { createLocalEngine } from '@/workers/local-engine';

const document = saturatingTwoSexPredator;
let store: WorkbenchStore;

const specNow = () =>
  twoParametersSpec({ state: store.getState(), model: document, palette: PALETTES.light, axes: [] });

beforeAll(async () => {
  const engine = createLocalEngine();
  store = createWorkbenchStore(document, { kind: 'new' });
  const shownReport = await engine.setModel(document);
  store.getState().set({
    shownReport,
    report: shownReport,
    shownDocument: document,
    sweepSelection: { parameter: 'K', from: 0.2, to: 4 },
  });
  const { set, twoParameters } = store.getState();
  const wanted = { ...twoParameters, cells: 24 };
  set({ twoParameters: wanted });
  const boundaries = boundariesTask(store.getState());
  const map = mapTask(store.getState());
  if (!boundaries || !map) throw new Error('There is a sweep and a second parameter.');
  set({
    twoParameters: {
      ...wanted,
      boundaries: { task: boundaries, result: await engine.analyse(1, boundaries, () => undefined) },
      map: { task: map, result: await engine.analyse(2, map, () => undefined) },
    },
  });
});

describe('the view over two parameters', () => {
  it('offers spread first, up to a little beyond the traits as entered', () => {
    expect(secondParameter(store.getState())).toEqual({ parameter: 'dial:spread', from: 0, to: 1.5 });
  });

  it('draws the onset of cycles of the split model, and the twin in grey at its own value', () => {
    const { lines, legend } = specNow();
    const own = lines.find((one) => one.label === 'onset of cycles (Hopf)');
    const twin = lines.find((one) => one.label === 'onset of cycles (Hopf), pooled twin');
    // Known facts of the preset: 1.32477 at spread 1, 1.375 pooled.
    const nearOne = [...(own?.y ?? [])].reduce(
      (best, spread, k) => (Math.abs(spread - 1) < Math.abs((own?.y[best] ?? 9) - 1) ? k : best),
      0,
    );
    expect(own?.x[nearOne]).toBeCloseTo(1.32477, 2);
    for (const K of twin?.x ?? []) expect(K).toBeCloseTo(1.375, 6);
    expect(twin?.colour).toBe(PALETTES.light.twin);
    expect(legend.map((one) => one.label)).toContain('pooled twin');
  });

  it('lays the map beneath, whose sign changes where the boundary runs', () => {
    const { cells, lines } = specNow();
    if (!cells) throw new Error('no map');
    const own = lines.find((one) => one.label === 'onset of cycles (Hopf)');
    for (let iy = 0; iy < cells.y.count; iy += 1) {
      const spread = cellCentre(cells.y, iy);
      const k = [...(own?.y ?? [])].findIndex((value) => Math.abs(value - spread) < 0.05);
      const onset = own?.x[k] ?? NaN;
      const width = (cells.x.to - cells.x.from) / cells.x.count;
      for (let ix = 0; ix < cells.x.count; ix += 1) {
        const [K, value] = [cellCentre(cells.x, ix), cells.value(iy * cells.x.count + ix)];
        if (Number.isNaN(value) || Math.abs(K - onset) < width) continue;
        expect(value > 0).toBe(K < onset);
      }
    }
  });

  it('has a zero contour that lies on the traced boundary', () => {
    const { lines } = specNow();
    const contour = lines.find((one) => one.id === 'zero-margin');
    const own = lines.find((one) => one.label === 'onset of cycles (Hopf)');
    expect(contour?.x.length).toBeGreaterThan(20);
    contour?.y.forEach((spread, k) => {
      const near = [...(own?.y ?? [])].reduce(
        (best, value, at) => (Math.abs(value - spread) < Math.abs((own?.y[best] ?? 9) - spread) ? at : best),
        0,
      );
      // A cell is 0.16 wide; the margin is nearly straight within it.
      expect(Math.abs((contour.x[k] ?? NaN) - (own?.x[near] ?? NaN))).toBeLessThan(0.03);
    });
  });

  it('reads the exact value of the cell under the pointer, and keeps it in the table', () => {
    const spec = specNow();
    const layout = layoutPlot(spec, 800, 500, null);
    const reading = readNearest(spec, layout, layout.x(3.2), layout.y(0.31));
    expect(reading?.text).toMatch(/^margin −?[\d.]+ .*coexistence repels at/);
    const table = plotTables(spec).find((one) => one.name === 'stability margin');
    expect(table?.rows.length).toBeGreaterThan(300);
    expect(cellMarks(spec.cells!, layout).length).toBeLessThan(24 * 24);
  });

  it('holds the present values as a ring that moves both', () => {
    const [ring] = specNow().handles;
    expect(ring).toMatchObject({ x: 1.8, y: 1, moves: 'both', id: 'two:K|dial:spread' });
  });

  it('traces one point of the sweep alone when asked', () => {
    const state = {
      ...store.getState(),
      sweep: { split: { stateSymbols: ['x', 'y1', 'y2'] } } as never,
    };
    const hopf = {
      kind: 'Hopf',
      parameter: 1.3,
      state: Float64Array.of(1, 2, 3),
      hopf: { omega: 0.4 },
    } as never;
    expect(boundariesTask(state, hopf)?.point).toEqual({
      kind: 'Hopf',
      first: 1.3,
      second: 1,
      state: { x: 1, y1: 2, y2: 3 },
      omega: 0.4,
    });
  });

  it('goes into the exported study, which batch accepts and reruns', () => {
    const { twoParameters, longRun } = store.getState();
    const offered = studyTasks(document, { parameter: 'K', from: 0.2, to: 4 }, { twoParameters, longRun });
    const labels = offered.map((one) => one.label);
    expect(labels).toContain('boundaries over K and dial:spread');
    expect(labels).toContain('map of the stability margin over K and dial:spread');
    const wanted = offered.filter((one) => one.task.task === 'boundaries').map((one) => one.task);
    const outcome = runStudy(JSON.parse(JSON.stringify(studyOf(document, wanted))));
    expect(outcome.ok).toBe(true);
  });

  it('says what to do where nothing lies across yet', () => {
    const blank = createWorkbenchStore(document, { kind: 'new' });
    blank.getState().set({ shownReport: store.getState().shownReport, sweepSelection: null });
    const spec = twoParametersSpec({
      state: blank.getState(),
      model: document,
      palette: PALETTES.light,
      axes: [],
    });
    expect(spec.empty).toMatch(/Choose a parameter/);
  });
});
