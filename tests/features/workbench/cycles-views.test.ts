import { beforeAll, describe, expect, it } from 'vitest';

import { documentFromEquations } from '@/engine/schema/equations';
import type { PresetDocument, Quantity } from '@/engine/schema/preset';
import { cyclesAt, presentOrbit } from '@/features/workbench/cycles/present-cycles';
import { cycleRuns } from '@/features/workbench/cycles/cycle-runs';
import { pictureTask } from '@/features/workbench/engine/picture-task';
import {
  readParameterValues,
  readStarts,
  readTaskValues,
} from '@/features/workbench/engine/parameter-values';
import { specialPointRows } from '@/features/workbench/findings/special-point-rows';
import { diagramSpec } from '@/features/workbench/panes/views/diagram-spec';
import { createWorkbenchStore, type WorkbenchState } from '@/features/workbench/state/store';
import { placeTicks } from '@/features/workbench/strip/strip-ticks';
import { markedPoints } from '@/features/workbench/cycles/marked-points';
import { juvenileAdultConsumer } from '@/presets/juvenile-adult-consumer';
import { PALETTES } from '@/graphics/palette';
import { createLocalEngine } from '@/workers/local-engine';

/**
 * Bautin's normal form cut at the fifth order: r' = r (mu + r^2 - r^4), one turn in 2 pi. Cycles have
 * r^2 = (1 +- sqrt(1 + 4 mu))/2; they fold at mu = -1/4, and the inner ones, which repel, begin at the
 * Hopf point mu = 0.
 */
function normalForm(): PresetDocument {
  const made = documentFromEquations({
    title: 'Normal form',
    equations: ["x' = x*(mu + x^2 + y^2 - (x^2 + y^2)^2) - y", "y' = y*(mu + x^2 + y^2 - (x^2 + y^2)^2) + x"],
    parameters: { mu: 0.1 },
    init: { x: 1, y: 0 },
    box: { x: [-3, 3], y: [-3, 3] },
    sign: 'any',
  });
  if (!made.ok) throw new Error('The equations are valid.');
  return made.document;
}

const outer = (mu: number) => Math.sqrt((1 + Math.sqrt(1 + 4 * mu)) / 2);
const inner = (mu: number) => Math.sqrt((1 - Math.sqrt(1 + 4 * mu)) / 2);

const document = normalForm();
let state: WorkbenchState;

beforeAll(async () => {
  const engine = createLocalEngine();
  const report = await engine.setModel(document);
  const selection = { parameter: 'mu', from: -0.5, to: 0.5 };
  const request = {
    ...selection,
    values: readParameterValues(document),
    starts: readStarts(document),
    withTwin: true,
  };
  const picture = await engine.analyse(
    1,
    pictureTask(request, document, readTaskValues(document, report)),
    () => undefined,
  );
  const store = createWorkbenchStore(document, { kind: 'new' });
  store.getState().set({
    report,
    shownReport: report,
    shownDocument: document,
    sweep: picture.sweep,
    cycles: picture.cycles,
    picture,
    sweepSelection: selection,
  });
  state = store.getState();
}, 60_000);

const show = (quantity: Quantity['quantity'], of: string, logarithm = false) =>
  diagramSpec({ state, model: document, palette: PALETTES.light, axes: [{ quantity, of, logarithm }] });

function cycles() {
  const { split } = state.cycles ?? {};
  if (!split) throw new Error('There are cycles.');
  return split;
}

describe('the task behind a sweep', () => {
  it('holds no dial of a trait that does not spread, which a task would refuse', async () => {
    const model = juvenileAdultConsumer;
    const engine = createLocalEngine();
    const values = readTaskValues(model, await engine.setModel(model));
    expect(Object.keys(readParameterValues(model))).toContain('dial:g');
    expect(Object.keys(values)).not.toContain('dial:g');
    expect(values['K']).toBe(10);
  });
});

describe('cycles at one value of the parameter', () => {
  it('meets a branch that turns back as often as it passes, with its stability', () => {
    const both = cyclesAt(cycles(), -0.1).filter((one) => one.feasible);
    const radii = both.map((one) => [one.highest[0] ?? NaN, one.attracts] as const).sort();
    expect(radii).toHaveLength(2);
    expect(radii[0]?.[0]).toBeCloseTo(inner(-0.1), 2);
    expect(radii[0]?.[1]).toBe(0);
    expect(radii[1]?.[0]).toBeCloseTo(outer(-0.1), 2);
    expect(radii[1]?.[1]).toBe(1);
    expect(cyclesAt(cycles(), -0.4)).toHaveLength(0);
    expect(cyclesAt(cycles(), 0.2)).toHaveLength(1);
  });

  it('gives the whole cycle between two that were continued', () => {
    const mu = 0.2137;
    const [present] = cyclesAt(cycles(), mu);
    const branch = cycles().branches[present?.branch ?? -1];
    if (!present || !branch) throw new Error('There is a cycle.');
    const orbit = presentOrbit(branch, present);
    for (let k = 0; k < orbit.length; k += 2)
      expect(Math.hypot(orbit[k] ?? NaN, orbit[k + 1] ?? NaN)).toBeCloseTo(outer(mu), 2);
    expect(orbit.at(-2)).toBeCloseTo(orbit[0] ?? NaN, 6);
    expect(present.period).toBeCloseTo(2 * Math.PI, 6);
  });
});

describe('cycles in the diagram of a sweep', () => {
  it('draws a solid edge where the cycle attracts and a dashed one where it repels', () => {
    const { bands } = show('class', 'x');
    const attracting = bands.find((one) => one.label.includes('attracts'));
    const repelling = bands.find((one) => one.label.includes('repels'));
    expect(attracting?.dash).toBeUndefined();
    expect(attracting?.edge?.width).toBe(2.6);
    expect(repelling?.dash).toHaveLength(2);
    attracting?.x.forEach((mu, k) => expect(attracting.high[k]).toBeCloseTo(outer(mu), 4));
    attracting?.x.forEach((mu, k) => expect(attracting.low[k]).toBeCloseTo(-outer(mu), 4));
  });

  it('turns at the fold, where both stretches end', () => {
    const fold = cycles().specialPoints.find((one) => one.kind === 'fold of cycles');
    expect(fold?.parameter).toBeCloseTo(-0.25, 6);
    const runs = cycleRuns(document, cycles(), { quantity: 'class', of: 'x', logarithm: false });
    const ends = runs.flatMap((run) => [run.parameters[0], run.parameters.at(-1)]);
    expect(ends.filter((end) => end === fold?.parameter)).toHaveLength(2);
    const mark = show('class', 'x').points.find((one) => one.glyph === 'fold of cycles');
    expect(mark?.y).toBeCloseTo(Math.SQRT1_2, 4);
    expect(mark?.description).toContain('fold of cycles at');
    expect(mark?.along).toBeDefined();
  });

  it('shows the period instead, with the Hopf point at the period with which cycles begin', () => {
    const spec = show('period', '');
    expect(spec.bands).toHaveLength(0);
    expect(spec.y.name).toBe('period of the cycle');
    for (const line of spec.lines) for (const y of line.y) expect(y).toBeCloseTo(2 * Math.PI, 5);
    expect(spec.points.find((one) => one.glyph === 'Hopf')?.y).toBeCloseTo(2 * Math.PI, 5);
  });

  it('lists special points of cycles with those of equilibria, and puts them on the strip', () => {
    if (!state.sweep) throw new Error('There is a sweep.');
    const rows = specialPointRows(state.sweep, state.cycles);
    expect(rows.map((row) => row.kind).sort()).toEqual(['Hopf', 'fold of cycles']);
    const ticks = placeTicks(
      markedPoints(state.sweep.split, cycles()).map((point) => ({ point, twin: false })),
      -0.5,
      0.5,
      800,
    );
    expect(ticks.map((tick) => tick.point.kind)).toEqual(['fold of cycles', 'Hopf']);
  });
});
