import { act, renderHook } from '@testing-library/react';
import { afterEach, describe, expect, it, vi } from 'vitest';

import type { Progress } from '@/engine/continuation/contract';
import { useSweepRun } from '@/features/assigned/engine/use-sweep-run';
import { createPreset } from '@/engine/schema/create';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';
import { createLocalEngine } from '@/workers/local-engine';

const late = vi.hoisted(() => ({
  tell: null as ((progress: Progress) => void) | null,
  disposed: 0,
  heard: false,
}));
vi.mock('@/workers/client', () => ({
  createEngineClient: () => {
    const engine = createLocalEngine();
    return {
      ...engine,
      // A worker that has not begun hears nothing.
      cancel: (job: number) => {
        if (!late.tell) return;
        late.heard = true;
        engine.cancel(job);
      },
      analyse: (...[job, task, onProgress]: Parameters<typeof engine.analyse>) => {
        late.tell = onProgress as (progress: Progress) => void;
        return engine.analyse(job, task, onProgress);
      },
      dispose: () => {
        late.disposed += 1;
        engine.dispose();
      },
    };
  },
}));
afterEach(() => void (late.tell = null));

const RANGE = { parameter: 'K', from: 0.5, to: 2 };

describe('a sweep run beside a page', () => {
  it('gives what is kept of it, and is over although progress comes late', async () => {
    const { result, unmount } = renderHook(() => useSweepRun());
    const done = await act(() => result.current.run(saturatingTwoSexPredator, RANGE));
    expect(done?.status).toBe('complete');
    expect(done?.kept.split.points.map(({ kind }) => kind)).toContain('Hopf');
    expect(result.current.running).toBeNull();
    act(() => late.tell?.({ stage: 'following cycles', fraction: 0.9, partial: null }));
    expect(result.current.running).toBeNull();
    const before = late.disposed;
    unmount();
    expect(late.disposed).toBe(before + 1);
  });

  it('is cancelled although its worker was not there yet', async () => {
    const { result } = renderHook(() => useSweepRun());
    const running = result.current.run(saturatingTwoSexPredator, RANGE);
    act(() => result.current.cancel());
    expect((await act(() => running))?.status).toBe('cancelled');
    expect(late.heard).toBe(true);
  });

  it('says why a model cannot be run', async () => {
    const { result } = renderHook(() => useSweepRun());
    const broken = createPreset({ ...saturatingTwoSexPredator, populations: [], processes: [] });
    const done = await act(() => result.current.run(broken, RANGE));
    expect(done).toBeNull();
    expect(result.current.problem).toMatch(/^The model cannot be run: ./);
    expect(result.current.running).toBeNull();
  });
});
