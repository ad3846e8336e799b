import { beforeAll, describe, expect, it } from 'vitest';

import { documentFromEquations } from '@/engine/schema/equations';
import {
  longRunTask,
  observedSymbol,
  planeOfStarts,
  sectionLevel,
} from '@/features/workbench/engine/long-run-tasks';
import { longRunSpec } from '@/features/workbench/long-run/long-run-spec';
import type { LongRunName } from '@/features/workbench/state/long-run';
import { createWorkbenchStore, type WorkbenchStore } from '@/features/workbench/state/store';
import { PALETTES } from '@/graphics/palette';
import { createLocalEngine } from '@/workers/local-engine';

/** Two competitors that shut each other out: x' = x (1 - x - 2 y), y' = y (1 - y - 2 x); separatrix x = y. */
function bistable() {
  const made = documentFromEquations({
    title: 'Two that exclude each other',
    equations: ["x' = r*x*(1 - x - 2*y)", "y' = y*(1 - y - 2*x)"],
    parameters: { r: 1 },
    init: { x: 0.6, y: 0.4 },
    sign: 'nonnegative',
  });
  if (!made.ok) throw new Error('The equations are valid.');
  return made.document;
}

const document = bistable();
let store: WorkbenchStore;
const specNow = () =>
  longRunSpec({ state: store.getState(), model: document, palette: PALETTES.light, axes: [] });

beforeAll(async () => {
  const engine = createLocalEngine();
  store = createWorkbenchStore(document, { kind: 'new' });
  const shownReport = await engine.setModel(document);
  store.getState().set({
    shownReport,
    report: shownReport,
    shownDocument: document,
    sweepSelection: { parameter: 'r', from: 0.5, to: 2 },
  });
  for (const name of [
    'extremes',
    'basins',
    'section',
    'lyapunov',
  ] as const satisfies readonly LongRunName[]) {
    const task = longRunTask(store.getState(), name);
    if (!task) throw new Error(`no task of ${name}`);
    const small =
      task.task === 'basins' ? { ...task, x: { ...task.x, cells: 10 }, y: { ...task.y, cells: 10 } } : task;
    const quick = small.task === 'extremes' ? { ...small, values: 6 } : small;
    const result = await engine.analyse(1, quick, () => undefined);
    const { longRun, set } = store.getState();
    set({ longRun: { ...longRun, [name]: { task: quick, result } } });
  }
});

describe('the long run', () => {
  it('observes the first class, and a section lies at its value', () => {
    expect(observedSymbol(store.getState())).toBe('x');
    expect(sectionLevel(store.getState())).toBe(0.6);
    expect(planeOfStarts(store.getState())).toEqual(['x', 'y']);
  });

  it('draws maxima upward and downward, and says that there is no hysteresis', () => {
    store.getState().set({ longRun: { ...store.getState().longRun, show: 'extremes' } });
    const spec = specNow();
    expect(spec.lines.map((one) => one.label)).toEqual(['maxima upward', 'maxima downward']);
    expect(spec.notes.join(' ')).toMatch(/No hysteresis/);
    expect(spec.x.domain).toEqual([0.5, 2]);
  });

  it('colours each side of the separatrix by where it ends', () => {
    store.getState().set({ longRun: { ...store.getState().longRun, show: 'basins' } });
    const { cells, handles } = specNow();
    if (!cells) throw new Error('no basins');
    const below = cells.describe(8);
    const above = cells.describe(80);
    expect(below).not.toBe(above);
    expect(cells.colour(8)).not.toBe(cells.colour(80));
    expect(handles[0]).toMatchObject({ id: 'start:x:y', x: 0.6, y: 0.4 });
  });

  it('says how many crossings a section has', () => {
    store.getState().set({ longRun: { ...store.getState().longRun, show: 'section' } });
    expect(specNow().legend[0]?.label).toMatch(/crossings/);
  });

  it('asks for what is missing', () => {
    const blank = createWorkbenchStore(document, { kind: 'new' });
    blank.getState().set({ shownReport: store.getState().shownReport, sweepSelection: null });
    const spec = longRunSpec({ state: blank.getState(), model: document, palette: PALETTES.light, axes: [] });
    expect(spec.empty).toMatch(/Choose a parameter/);
  });
});
