import { describe, expect, it } from 'vitest';

import type { Progress } from '../../src/engine/continuation/contract';
import { ANALYSIS_TASK_SCHEMAS, type AnalysisTask } from '../../src/engine/schema/analysis-tasks';
import { z } from '../../src/engine/schema/zod';
import { createLocalEngine } from '../../src/workers/local-engine';
import { collectTransferables } from '../../src/workers/transferables';
import { saturatingTwoSexPredator } from '../../src/presets/saturating-two-sex-predator';

const taskSchema = z.discriminatedUnion('task', [...ANALYSIS_TASK_SCHEMAS]);
const K = { parameter: 'K', from: 0.5, to: 2 };
const spread = { parameter: 'spread', from: 0.5, to: 1.5 };

/** One small task of each kind. */
const tasks: readonly AnalysisTask[] = [
  { task: 'cycles', ...K },
  { task: 'boundaries', first: K, second: spread, kinds: ['Hopf'] },
  { task: 'map', x: { ...K, cells: 8 }, y: { ...spread, cells: 6 } },
  {
    task: 'basins',
    x: { state: 'x', from: 0.1, to: 1, cells: 3 },
    y: { state: 'y1', from: 0.1, to: 1, cells: 3 },
    transient: 200,
    observed: 200,
  },
  { task: 'lyapunov', horizon: 200, transient: 50, exponents: 1 },
  { task: 'section', quantity: 'x', value: 0.4, crossings: 5, parameters: { K: 2 } },
  { task: 'extremes', ...K, values: 4, transient: 200, observed: 200 },
  { task: 'picture', ...K },
].map((task) => taskSchema.parse(task));

/** Every status in a result, however deep. */
function statusesOf(value: unknown): string[] {
  if (typeof value !== 'object' || value === null || ArrayBuffer.isView(value)) return [];
  return Object.entries(value).flatMap(([key, inner]) =>
    key === 'status' && typeof inner === 'string' ? [inner] : statusesOf(inner),
  );
}

describe('every task of the engine, as the page asks for it', () => {
  it('has an example here', () => {
    const names = ANALYSIS_TASK_SCHEMAS.map((schema) => schema.shape.task.value);
    expect(tasks.map((one) => one.task)).toEqual(names);
  });

  it.each(tasks.map((task) => [task.task, task] as const))(
    '%s is answered for split and pooled, and can cross to the page',
    async (_name, task) => {
      const engine = createLocalEngine();
      expect((await engine.setModel(saturatingTwoSexPredator)).valid).toBe(true);
      const progress: Progress<unknown>[] = [];
      const result = await engine.analyse(1, task, (one) => progress.push(one));
      const statuses = statusesOf(result);
      expect(statuses.length).toBeGreaterThanOrEqual(2);
      expect(new Set(statuses)).toEqual(new Set(['complete']));
      if ('twin' in result) expect(result.twin).not.toBeNull();
      for (const one of progress) expect(one.fraction).toBeGreaterThanOrEqual(0);
      // The copy is what the page gets; what is handed over is whole buffers of the result's own.
      const copy = structuredClone(result, { transfer: collectTransferables(result) });
      expect(statusesOf(copy)).toEqual(statuses);
      engine.dispose();
    },
  );

  it.each(tasks.map((task) => [task.task, task] as const))(
    '%s can be cancelled, and keeps the shape of its result',
    async (_name, task) => {
      const engine = createLocalEngine();
      await engine.setModel(saturatingTwoSexPredator);
      const running = engine.analyse(2, task, () => undefined);
      engine.cancel(2);
      // A task done within its first slice is complete all the same.
      for (const status of statusesOf(await running)) expect(['cancelled', 'complete']).toContain(status);
      engine.dispose();
    },
  );
});
