import { describe, expect, it } from 'vitest';

import type { Progress } from '../../src/engine/continuation/contract';
import type { PictureResult } from '../../src/engine/analyses/contract';
import { pictureTaskSchema } from '../../src/engine/schema/analysis-tasks';
import { createEmptyPreset } from '../../src/engine/schema/create';
import { createLocalEngine } from '../../src/workers/local-engine';
import type { ExploreRequest } from '../../src/workers/protocol';
import { splitPredator } from '../support/example-models';

const request = (changes: Partial<ExploreRequest> = {}): ExploreRequest => ({
  values: {},
  starts: [0.5, 0.25, 0.25],
  horizon: 20,
  samples: 201,
  withTwin: true,
  equilibria: 'search',
  plane: null,
  ...changes,
});

async function makeEngine(eps = 0.3) {
  const engine = createLocalEngine();
  const report = await engine.setModel(splitPredator(eps));
  expect(report.valid).toBe(true);
  return { engine, report };
}

describe('the engine behind the face of the workers', () => {
  it('explores a split predator beside its twin', async () => {
    const { engine } = await makeEngine();
    const found = await engine.explore(
      request({ plane: { x: 'x', y: 'Y', xRange: [0, 2], yRange: [0, 2], cells: 30, arrows: 8 } }),
    );
    // Case A10 at t = 20, eps = 0.3, and A1 for the twin.
    const end = found.trajectory.states.slice(-3);
    [0.4380333849137058, 0.29112963043250395, 0.6787158790038753].forEach((value, i) =>
      expect(end[i]).toBeCloseTo(value, 6),
    );
    expect(found.twinStateSymbols).toEqual(['x', 'Y']);
    // Case B1: x = 1 - eps^2, y = (1 -+ eps) / 2, and the neutral twin at (1, 1).
    const coexistence = found.equilibria?.equilibria.find((one) => one.absent.length === 0);
    [0.91, 0.35, 0.65].forEach((value, i) => expect(coexistence?.state[i]).toBeCloseTo(value, 9));
    expect(coexistence?.type).toBe('stable focus');
    const pooled = found.twinEquilibria?.equilibria.find((one) => one.absent.length === 0);
    [1, 1].forEach((value, i) => expect(pooled?.state[i]).toBeCloseTo(value, 9));
    expect(pooled?.type).toBe('neutral');
    expect(found.plane?.note).toMatch(/total with shares.*coexistence equilibrium/);
    expect(found.plane?.lines.every((line) => line.segments.length > 0)).toBe(true);
    // Unequal mortality damps what is neutral when pooled.
    expect(found.verdict?.answer).toBe('stabilises');
    expect(found.milliseconds).toBeGreaterThan(0);
    engine.dispose();
  });

  it('follows the equilibria of the last look to new numbers', async () => {
    const { engine } = await makeEngine();
    await engine.explore(request());
    const moved = await engine.explore(request({ equilibria: 'track', values: { 'dial:spread': 0.5 } }));
    // Spread 0.5 of eps = 0.3 is eps = 0.15.
    const coexistence = moved.equilibria?.equilibria.find((one) => one.absent.length === 0);
    [1 - 0.15 ** 2, 0.425, 0.575].forEach((value, i) => expect(coexistence?.state[i]).toBeCloseTo(value, 9));
    expect(moved.equilibria?.message).toMatch(/Followed/);
    const none = await engine.explore(request({ equilibria: 'none', withTwin: false }));
    expect(none.equilibria).toBeNull();
    expect(none.twinTrajectory).toBeNull();
    engine.dispose();
  });

  it('answers overtaken requests with the newest', async () => {
    const { engine } = await makeEngine();
    const results = await Promise.all(
      [0.1, 0.2, 0.3].map((horizon) => engine.explore(request({ horizon, equilibria: 'none' }))),
    );
    const ends = results.map(({ trajectory }) => trajectory.times[trajectory.times.length - 1]);
    expect(ends[2]).toBe(0.3);
    ends.forEach((end, k) => expect(end).toBeGreaterThanOrEqual([0.1, 0.2, 0.3][k]));
    engine.dispose();
  });

  it('searches and sweeps as jobs, with progress', async () => {
    const { engine } = await makeEngine();
    const progress: Progress[] = [];
    const { split, twin } = await engine.findEquilibria(1, {}, (one) => progress.push(one));
    expect(split.status).toBe('complete');
    expect(twin?.equilibria.length).toBeGreaterThan(0);
    const sweepRequest = {
      values: {},
      parameter: 'dial:spread',
      from: 0.1,
      to: 2,
      starts: [0.5, 0.25, 0.25],
      withTwin: true,
    };
    const swept = await engine.sweep(2, sweepRequest, (one) => progress.push(one));
    expect(swept.split.status).toBe('complete');
    expect(swept.split.points).toBeGreaterThan(10);
    expect(swept.twin?.status).toBe('complete');
    expect(swept.split.milliseconds).toBeGreaterThan(0);
    expect(swept.verdict.sentence.length).toBeGreaterThan(20);
    // The coexistence branch of case B1: x = 1 - (0.3 s)^2 at spread s.
    const branch = swept.split.branches.find((one) => one.absent.length === 0);
    branch?.parameters.forEach((s, k) => {
      if (s < 3.3) expect(branch.states[3 * k]).toBeCloseTo(1 - (0.3 * s) ** 2, 8);
    });
    expect(branch).toBeDefined();
    for (const one of progress) expect(one.fraction).toBeLessThanOrEqual(1);
    engine.dispose();
  });

  it('cancels a sweep and keeps what was found', async () => {
    const { engine } = await makeEngine();
    const sweepRequest = {
      values: {},
      parameter: 'dial:spread',
      from: -3,
      to: 3,
      starts: [0.5, 0.25, 0.25],
      withTwin: true,
    };
    const running = engine.sweep(5, sweepRequest, () => undefined);
    engine.cancel(5);
    const result = await running;
    expect(result.split.status).toBe('cancelled');
    expect(result.twin).toBeNull();
    expect(result.split.message).toMatch(/Cancelled/);
    engine.dispose();
  });

  it('runs a task of the complete engine as a job, with partial results, and refuses unknown names', async () => {
    const { engine } = await makeEngine();
    const task = pictureTaskSchema.parse({ task: 'picture', parameter: 'spread', from: 0.1, to: 2 });
    const progress: Progress<PictureResult>[] = [];
    const picture = await engine.analyse(3, task, (one) => progress.push(one));
    expect(picture.status).toBe('complete');
    // Case B1 at spread 1, eps = 0.3.
    const [coexistence] = picture.equilibria.split.equilibria.filter((one) => one.absent.length === 0);
    expect(coexistence.state[0]).toBeCloseTo(0.91, 9);
    expect(picture.summary.some((row) => row.of === 'twin')).toBe(true);
    expect(picture.sweep.split.milliseconds).toBeGreaterThan(0);
    expect(progress.some((one) => one.partial?.sweep.split.branches.length)).toBe(true);
    await expect(engine.analyse(4, { ...task, parameter: 'spred' }, () => undefined)).rejects.toThrow(
      /"spred" is no parameter of this model/,
    );
    engine.dispose();
  });

  it('cancels a task and keeps what was found', async () => {
    const { engine } = await makeEngine();
    const task = pictureTaskSchema.parse({ task: 'picture', parameter: 'spread', from: -3, to: 3 });
    const running = engine.analyse(6, task, () => undefined);
    engine.cancel(6);
    const picture = await running;
    expect(picture.status).toBe('cancelled');
    expect(picture.cycles.split.message).toMatch(/not looked for/);
    engine.dispose();
  });

  it('keeps the last valid model when the next has errors', async () => {
    const { engine } = await makeEngine();
    const good = splitPredator(0.3);
    const broken = {
      ...good,
      processes: good.processes.map((one, k) => (k === 0 ? { ...one, rate: 'nonsense_symbol * x' } : one)),
    };
    const report = await engine.setModel(broken);
    expect(report.valid).toBe(false);
    expect(report.diagnostics.some((one) => one.severity === 'error')).toBe(true);
    // Everything else is the last valid model's.
    expect(report.equations.length).toBe(3);
    expect((await engine.explore(request({ equilibria: 'none' }))).trajectory.status).toBe('complete');
    engine.dispose();
  });

  it('has a second opinion that agrees, and says by how much', async () => {
    const { engine } = await makeEngine();
    const opinion = await engine.secondOpinion(request());
    expect(opinion.trajectory.status).toBe('complete');
    expect(opinion.difference).toBeLessThan(1e-5);
    expect(opinion.difference).toBeGreaterThan(0);
    expect(opinion.message).toMatch(/extrapolation.*agrees/);
    engine.dispose();
  });

  it('refuses to work without a model, and after it was closed', async () => {
    const engine = createLocalEngine();
    await expect(engine.explore(request())).rejects.toThrow(/no valid model/);
    await expect(engine.secondOpinion(request())).rejects.toThrow(/no valid model/);
    engine.dispose();
    await expect(engine.setModel(createEmptyPreset())).rejects.toThrow(/closed/);
  });
});
