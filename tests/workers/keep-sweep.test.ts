import { describe, expect, it } from 'vitest';

import { KEPT_SWEEP_LIMITS, keptSweepSchema } from '../../src/contract/kept-sweep';
import type { Branch, SweepResult } from '../../src/engine/continuation/contract';
import { cyclesTaskSchema } from '../../src/engine/schema/analysis-tasks';
import { saturatingTwoSexPredator } from '../../src/presets/saturating-two-sex-predator';
import { keepSweep } from '../../src/workers/keep-sweep';
import { createLocalEngine } from '../../src/workers/local-engine';

const quiet = () => undefined;

/** A branch of `count` points that turns once in the middle and changes its stability once. */
function longBranch(count: number, dimension: number): Branch {
  const parameters = Float64Array.from({ length: count }, (_, k) => Math.min(k, count - 1 - k) / count);
  return {
    parameters,
    states: Float64Array.from({ length: count * dimension }, (_, k) => Math.sin(k)),
    dimension,
    leading: new Float64Array(count),
    attracts: Uint8Array.from({ length: count }, (_, k) => (k < 1234 ? 1 : 0)),
    feasible: new Uint8Array(count).fill(1),
    typeIndex: new Uint8Array(count),
    types: [],
    absent: [],
    startEnd: { reason: 'left the range', message: '' },
    endEnd: { reason: 'left the range', message: '' },
  };
}

describe('a sweep as it is kept', () => {
  it('holds the special points of equilibria and cycles and the branches of both models', async () => {
    const engine = createLocalEngine();
    const document = saturatingTwoSexPredator;
    await engine.setModel(document);
    const range = { parameter: 'K', from: 0.5, to: 2 };
    const sweep = await engine.sweep(1, { values: {}, ...range, starts: [], withTwin: true }, quiet);
    const cycles = await engine.analyse(2, cyclesTaskSchema.parse({ task: 'cycles', ...range }), quiet);
    const kept = keptSweepSchema.parse(keepSweep(sweep, cycles));
    expect(kept.range).toEqual(range);
    const hopf = sweep.split.specialPoints.find((one) => one.kind === 'Hopf');
    expect(hopf).toBeDefined();
    expect(kept.split.points.find((one) => one.kind === 'Hopf')?.parameter).toBe(hopf?.parameter);
    expect(kept.split.branches.filter((one) => one.of === 'equilibria')).toHaveLength(
      sweep.split.branches.length,
    );
    const loop = kept.split.branches.find((one) => one.of === 'cycles');
    expect(loop).toBeDefined();
    const symbol = sweep.split.stateSymbols[0] ?? '';
    const last = (loop?.parameters.length ?? 0) - 1;
    expect(loop?.lowest[symbol]?.[last]).toBeLessThan(loop?.values[symbol]?.[last] ?? NaN);
    expect(kept.twin?.branches.length).toBeGreaterThan(0);
  });

  it('is thinned to what the contract allows; ends, turns and changes of stability stay', () => {
    const count = 5_000;
    const sweep: SweepResult = {
      status: 'complete',
      message: 'Complete.',
      parameterKey: 'K',
      from: 0,
      to: 1,
      stateSymbols: Array.from({ length: 30 }, (_, i) => `N${i}`),
      branches: Array.from({ length: 100 }, () => longBranch(count, 30)),
      specialPoints: [],
      bands: [],
      points: 100 * count,
      milliseconds: 1,
    };
    const kept = keptSweepSchema.parse(keepSweep({ split: sweep, twin: sweep }, null));
    expect(JSON.stringify(kept).length).toBeLessThan(1_000_000);
    expect(kept.split.thinned).toBe(true);
    expect(kept.split.branches).toHaveLength(KEPT_SWEEP_LIMITS.branches);

    const alone = { ...sweep, branches: sweep.branches.slice(0, 1) };
    const [branch] = keepSweep({ split: alone, twin: null }, null).split.branches;
    expect(branch?.parameters[0]).toBe(0);
    expect(branch?.parameters.at(-1)).toBe(0);
    expect(Math.max(...(branch?.parameters ?? []))).toBeCloseTo(0.4998, 4);
    const change = branch?.attracts.indexOf(0) ?? -1;
    expect(branch?.parameters[change]).toBeCloseTo(1234 / count, 7);
    expect(branch?.parameters[change - 1]).toBeCloseTo(1233 / count, 7);
  });
});
