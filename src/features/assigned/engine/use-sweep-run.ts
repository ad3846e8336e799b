import { useCallback, useEffect, useRef, useState } from 'react';

import type { SweepRange } from '@/contract/kept-sweep';
import type { PresetDocument } from '@/engine/schema/preset';
import { createEngineClient, type EngineClient } from '@/workers/client';

import { computeSweep, type ComputedSweep } from './compute-sweep';

interface Running {
  readonly job: number;
  readonly stage: string;
  readonly fraction: number;
}

/** The engine in this browser for one sweep at a time: started with its first run, ended with the page. */
export function useSweepRun() {
  const engine = useRef<EngineClient | null>(null);
  const jobs = useRef(0);
  const cancelled = useRef(0);
  const [running, setRunning] = useState<Running | null>(null);
  const [problem, setProblem] = useState<string | null>(null);
  useEffect(
    () => () => {
      jobs.current += 1;
      engine.current?.dispose();
      engine.current = null;
    },
    [],
  );

  /** Null where it failed, with `problem` told, or where a newer run or the end of the page overtook it. */
  const run = useCallback(
    async (document: PresetDocument, range: SweepRange): Promise<ComputedSweep | null> => {
      engine.current ??= createEngineClient();
      const job = ++jobs.current;
      // Told across a port, progress may still arrive after the result.
      let ended = false;
      setProblem(null);
      setRunning({ job, stage: 'starting', fraction: 0 });
      try {
        const done = await computeSweep(engine.current, job, document, range, ({ stage, fraction }) => {
          // One that was cancelled before its worker had begun is cancelled once it has.
          if (cancelled.current === job) engine.current?.cancel(job);
          if (jobs.current === job && !ended) setRunning({ job, stage, fraction });
        });
        return jobs.current === job ? done : null;
      } catch (error) {
        if (jobs.current === job)
          setProblem(error instanceof Error ? error.message : 'The engine stopped. Run the sweep again.');
        return null;
      } finally {
        ended = true;
        if (jobs.current === job) setRunning(null);
      }
    },
    [],
  );
  const cancel = useCallback(() => {
    cancelled.current = jobs.current;
    engine.current?.cancel(jobs.current);
  }, []);
  return { running, problem, run, cancel };
}
