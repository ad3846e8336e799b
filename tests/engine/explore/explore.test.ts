import { describe, expect, it } from 'vitest';

import { explore, exploreInSlices } from '../../../src/engine/explore/explore';
import type { ExploreRequest } from '../../../src/engine/explore/contract';
import { secondOpinion } from '../../../src/engine/explore/trajectories';
import { compileModel, type CompiledModel } from '../../../src/engine/system/compile-model';
import type { PresetDocument } from '../../../src/engine/schema/preset';
import { STARTER_PRESETS } from '../../../src/presets';
import { splitPredator } from '../../support/example-models';

function compile(document: PresetDocument): CompiledModel {
  const compiled = compileModel(document);
  if (!compiled.ok) throw new Error(compiled.diagnostics.map((one) => one.message).join('\n'));
  return compiled.model;
}

const requestFor = (model: CompiledModel, changes: Partial<ExploreRequest> = {}): ExploreRequest => {
  const [x, y] = model.system.stateSymbols;
  return {
    values: {},
    starts: [...model.starts],
    horizon: 160,
    samples: 600,
    withTwin: true,
    equilibria: 'search',
    plane:
      y === undefined
        ? null
        : {
            x,
            y,
            xRange: [0, 2 * model.starts[0] + 1],
            yRange: [0, 2 * model.starts[1] + 1],
            cells: 48,
            arrows: 16,
          },
    ...changes,
  };
};

describe.each(STARTER_PRESETS)('starter preset $id', ({ document }) => {
  it('is explored whole: trajectory, twin, equilibria, plane', () => {
    const model = compile(document);
    const request = requestFor(model, { horizon: document.horizon });
    const found = explore(model, request);
    expect(found.trajectory.status).toBe('complete');
    expect(found.trajectory.states.every((value) => Number.isFinite(value) && value > -1e-9)).toBe(true);
    expect(found.twinTrajectory === null).toBe(model.twin.system === null);
    expect(found.twinTrajectory?.status ?? 'complete').toBe('complete');
    expect(found.equilibria?.status).toBe(model.system.autonomous ? 'complete' : 'needs-period-map');
    if (request.plane) expect(found.plane?.flow.length).toBeGreaterThan(0);
    const opinion = secondOpinion(model, request);
    expect(opinion.trajectory.status).toBe('complete');
    expect(opinion.message).toMatch(/agrees|differs/);
  });
});

describe('exploring', () => {
  const model = compile(splitPredator(0.3));

  it('follows a slider of a three-class model well within a frame', () => {
    const found = explore(model, requestFor(model));
    if (!found.equilibria) throw new Error('equilibria were asked for');
    const known = { split: found.equilibria, twin: found.twinEquilibria };
    let fastest = Infinity;
    for (let k = 0; k < 40; k += 1) {
      const began = performance.now();
      explore(
        model,
        requestFor(model, { equilibria: 'track', values: { 'dial:spread': 1 - k / 100 } }),
        known,
      );
      fastest = Math.min(fastest, performance.now() - began);
    }
    // Milliseconds: measured at about 3 on two shared cores.
    expect(fastest).toBeLessThan(15);
  });

  it('yields while it works, and leaves the parameters as asked for', () => {
    const request = requestFor(model, { horizon: 20_000, samples: 50, values: { 'dial:spread': 0.5 } });
    const run = exploreInSlices(model, request, null);
    let slices = 0;
    let next = run.next();
    for (; !next.done; next = run.next()) slices += 1;
    expect(slices).toBeGreaterThan(3);
    const f = new Float64Array(3);
    model.system.rhs(0, Float64Array.of(1, 1, 1), f);
    // y1' = x (y1 + y2)/2 - (1 + 0.15) y1 at 1, 1, 1.
    expect(f[1]).toBeCloseTo(1 - 1.15, 12);
  });

  it('searches where nothing is known to follow', () => {
    const found = explore(model, requestFor(model, { equilibria: 'track' }), null);
    expect(found.equilibria?.equilibria.length).toBe(2);
  });

  it('says so where axes span no plane', () => {
    const plane = { x: 'x', y: 'x', xRange: [0, 1], yRange: [0, 1], cells: 4, arrows: 2 } as const;
    const found = explore(model, requestFor(model, { equilibria: 'none', plane }));
    expect(found.plane).toMatchObject({ lines: [], note: 'These two axes span no plane of states.' });
  });

  it('passes a broken trajectory on as a value, and the second opinion says who came how far', () => {
    // Prey growth quadratic in the prey: infinite in finite time once there are no predators.
    const document = splitPredator(0.3);
    const runaway = compile({
      ...document,
      processes: document.processes.map((one, k) => (k === 0 ? { ...one, rate: 'x^2' } : one)),
    });
    const request = requestFor(runaway, { starts: [2, 0, 0], horizon: 5, equilibria: 'none', plane: null });
    const found = explore(runaway, request);
    expect(found.trajectory.status).not.toBe('complete');
    expect(found.trajectory.times.length).toBeGreaterThan(10);
    expect(found.trajectory.times.length).toBeLessThan(600);
    expect(found.trajectory.message.length).toBeGreaterThan(10);
  });
});
