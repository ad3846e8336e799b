import type { Progress } from '@/engine/continuation/contract';
import type {
  EngineClient,
  ExploreRequest,
  ParameterValues,
  SplitSweepResult,
  SweepRequest,
} from '@/workers/protocol';

import type { EngineActions, WorkbenchStore } from '../state/store';

import { DRIVER_DEFAULTS, explain, sameValues } from './driver-defaults';

import { readParameterValues, readStarts } from './parameter-values';

/** Long runs: one at a time, with progress, cancel, and partial results that stay. */
export class EngineJobs {
  readonly actions: EngineActions = {
    sweep: () => void this.sweep(),
    findEquilibria: () => void this.findEquilibria(),
    secondOpinion: () => void this.secondOpinion(),
    cancel: () => this.cancel(),
  };

  private nextId = 1;
  private sweptAt: SweepRequest | null = null;

  constructor(
    private readonly store: WorkbenchStore,
    private readonly engine: EngineClient,
    private readonly exploreRequest: () => ExploreRequest,
  ) {}

  cancel(): void {
    const { job } = this.store.getState();
    if (job) this.engine.cancel(job.id);
  }

  /** Marks the sweep on show as outdated or not, and runs a quick one again once the numbers rest. */
  afterExplore(values: ParameterValues, atRest: boolean): void {
    const { sweep, sweepSelection, job, result, sweepOutdated, set } = this.store.getState();
    const swept = sweep ? this.sweptAt : null;
    const current = swept !== null && sameValues(swept.values, values);
    const aside = swept !== null && sameValues(swept.values, values, swept.parameter);
    const outdated = sweep !== null && (!aside || (sweepOutdated && !current));
    set({
      sweepOutdated: outdated,
      verdict: sweep && current && !outdated ? sweep.verdict : (result?.verdict ?? null),
    });
    if (!atRest || job || !sweepSelection) return;
    const quick = !sweep || sweep.split.milliseconds < DRIVER_DEFAULTS.quickSweepMilliseconds;
    if (quick && (!current || outdated)) void this.sweep();
  }

  private begin(name: string): number {
    this.cancel();
    const id = this.nextId++;
    this.store
      .getState()
      .set({ job: { id, name, stage: 'starting', fraction: 0, startedAt: performance.now() } });
    return id;
  }

  private progress(id: number, { stage, fraction }: Progress): void {
    const { job, set } = this.store.getState();
    if (job?.id === id) set({ job: { ...job, stage, fraction } });
  }

  private end(id: number): void {
    const { job, set } = this.store.getState();
    if (job?.id === id) set({ job: null });
  }

  private async sweep(): Promise<void> {
    const { document, sweepSelection, shownReport } = this.store.getState();
    if (!sweepSelection || !shownReport) return;
    const request: SweepRequest = {
      ...sweepSelection,
      values: readParameterValues(document),
      starts: readStarts(document),
      withTwin: true,
    };
    const id = this.begin(`Sweep over ${sweepSelection.parameter}`);
    const show = (sweep: SplitSweepResult, done: boolean) => {
      if (this.store.getState().job?.id !== id) return;
      this.sweptAt = request;
      this.store.getState().set({ sweep, sweepOutdated: false, ...(done ? { verdict: sweep.verdict } : {}) });
    };
    try {
      const result = await this.engine.sweep(id, request, (progress) => {
        this.progress(id, progress);
        if (progress.partial) show(progress.partial, false);
      });
      show(result, true);
    } catch (error) {
      this.store.getState().set({ engineError: explain(error) });
    } finally {
      this.end(id);
    }
  }

  private async findEquilibria(): Promise<void> {
    const { document } = this.store.getState();
    const id = this.begin('Search for equilibria');
    try {
      const found = await this.engine.findEquilibria(id, readParameterValues(document), (progress) =>
        this.progress(id, progress),
      );
      const { result, set, job } = this.store.getState();
      if (result && job?.id === id)
        set({ result: { ...result, equilibria: found.split, twinEquilibria: found.twin } });
    } catch (error) {
      this.store.getState().set({ engineError: explain(error) });
    } finally {
      this.end(id);
    }
  }

  private async secondOpinion(): Promise<void> {
    try {
      const opinion = await this.engine.secondOpinion({
        ...this.exploreRequest(),
        equilibria: 'none',
        plane: null,
      });
      this.store.getState().set({ secondOpinion: opinion });
    } catch (error) {
      this.store.getState().set({ engineError: explain(error) });
    }
  }
}
