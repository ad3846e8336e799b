import type { AnalysisResultOf, AnalysisResults, PictureResult } from '@/engine/analyses/contract';
import type { Progress, SpecialPoint, SweepResult } from '@/engine/continuation/contract';
import type {
  EngineClient,
  ExploreRequest,
  ParameterValues,
  SplitSweepResult,
  SweepRequest,
} from '@/workers/protocol';

import type { EngineActions, WorkbenchData, WorkbenchStore } from '../state/store';
import type { LongRunName } from '../state/long-run';
import type { TwoParameters } from '../state/two-parameters';
import { DRIVER_DEFAULTS, explain, sameValues } from './driver-defaults';
import { readParameterValues, readStarts, readTaskValues } from './parameter-values';
import { hasUnfollowedCycles, pictureTask } from './picture-task';
import { LONG_RUN_NAMES, longRunTask } from './long-run-tasks';
import { boundariesTask, mapTask } from './two-parameter-tasks';

/** Long runs: one at a time, with progress, cancel, and partial results that stay. */
export class EngineJobs {
  readonly actions: EngineActions = {
    sweep: () => void this.follow('Sweep'),
    picture: () => void this.picture(),
    traceBoundaries: (point) => void this.traceBoundaries(point),
    computeMap: () => void this.computeMap(),
    longRun: (name) => void this.runLongRun(name),
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
    if (!atRest || job || !sweepSelection || !this.isQuick() || (current && !outdated)) return;
    void (aside && !outdated && this.keepsCycles() ? this.judgeAgain() : this.follow('Sweep'));
  }

  private isQuick(): boolean {
    const { sweep, cycles } = this.store.getState();
    const parts = [sweep?.split, sweep?.twin, cycles?.split, cycles?.twin];
    return parts.reduce((sum, one) => sum + (one?.milliseconds ?? 0), 0) < DRIVER_DEFAULTS.quickMilliseconds;
  }

  /** Branches of cycles stay as they are along the strip; fixed points of a period map are wanted at its value. */
  private keepsCycles(): boolean {
    const { cycles, sweep, sweepSelection } = this.store.getState();
    const same = (one: SweepRequest | null) =>
      one !== null &&
      one.parameter === sweepSelection?.parameter &&
      one.from === sweepSelection.from &&
      one.to === sweepSelection.to;
    return cycles?.split.status === 'complete' && sweep?.split.status === 'complete' && same(this.sweptAt);
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

  private request(): SweepRequest | null {
    const { document, sweepSelection, shownReport } = this.store.getState();
    if (!sweepSelection || !shownReport) return null;
    return {
      ...sweepSelection,
      values: readParameterValues(document),
      starts: readStarts(document),
      withTwin: true,
    };
  }

  /** The sweep alone, for what it says of the present value: cycles stay. */
  private async judgeAgain(): Promise<void> {
    const request = this.request();
    if (!request) return;
    await this.run(`Sweep over ${request.parameter}`, async (id) => {
      const sweep = await this.engine.sweep(id, { ...request, bands: false }, (progress) =>
        this.progress(id, progress),
      );
      this.show(id, request, { sweep: this.withBands(sweep), verdict: sweep.verdict });
    });
  }

  /** Bands that were integrated before stay where no cycle could be continued. */
  private withBands(sweep: SplitSweepResult): SplitSweepResult {
    const before = this.store.getState().sweep;
    const keep = (now: SweepResult, then: SweepResult | null | undefined): SweepResult =>
      then && then.bands.length > 0 ? { ...now, bands: then.bands } : now;
    return {
      ...sweep,
      split: keep(sweep.split, before?.split),
      twin: sweep.twin && keep(sweep.twin, before?.twin),
    };
  }

  /** All branches of equilibria and the cycles from them, streamed as they come. */
  private async follow(name: string): Promise<PictureResult | null> {
    const request = this.request();
    const { document, shownReport } = this.store.getState();
    if (!request || !shownReport) return null;
    const task = pictureTask(request, document, readTaskValues(document, shownReport));
    let done: PictureResult | null = null;
    await this.run(`${name} over ${request.parameter}`, async (id) => {
      const result = await this.engine.analyse(id, task, (progress) => {
        this.progress(id, progress);
        if (progress.partial) this.showPicture(id, request, progress.partial, false);
      });
      if (!this.showPicture(id, request, result, true)) return;
      done = result;
      if (result.status !== 'complete' || !hasUnfollowedCycles(result)) return;
      const sweep = await this.engine.sweep(id, request, (progress) => this.progress(id, progress));
      this.show(id, request, { sweep, verdict: sweep.verdict });
    });
    return done;
  }

  private async picture(): Promise<void> {
    const found = (await this.follow('Full picture'))?.equilibria;
    const { result, set } = this.store.getState();
    if (found && result) set({ result: { ...result, equilibria: found.split, twinEquilibria: found.twin } });
  }

  /** Cycles of before stay on show until the first new one is there. */
  private showPicture(id: number, request: SweepRequest, picture: PictureResult, done: boolean): boolean {
    const { cycles: before } = this.store.getState();
    const along = before?.split.parameterKey === request.parameter ? before : null;
    const begun = done || picture.cycles.split.points > 0;
    return this.show(id, request, {
      sweep: picture.sweep,
      cycles: begun ? picture.cycles : along,
      picture,
      ...(done ? { verdict: picture.sweep.verdict } : {}),
    });
  }

  /** False where a newer run has taken the place of this one. */
  private show(id: number, request: SweepRequest, patch: Partial<WorkbenchData>): boolean {
    const { job, set } = this.store.getState();
    if (job?.id !== id) return false;
    this.sweptAt = request;
    set({ ...patch, sweepOutdated: false });
    return true;
  }

  /** Curves of special points over the swept parameter and the second one. */
  private async traceBoundaries(point?: SpecialPoint): Promise<void> {
    const task = boundariesTask(this.store.getState(), point);
    if (!task) return;
    await this.run(`Boundaries over ${task.first.parameter} and ${task.second.parameter}`, async (id) => {
      const show = (result: AnalysisResults['boundaries']) =>
        this.showTwo(id, { second: task.second, boundaries: { task, result } });
      const result = await this.engine.analyse(id, task, (progress) => {
        this.progress(id, progress);
        if (progress.partial && progress.partial.split.curves.length > 0) show(progress.partial);
      });
      show(result);
    });
  }

  /** The map over both, coarse first. */
  private async computeMap(): Promise<void> {
    const task = mapTask(this.store.getState());
    if (!task) return;
    await this.run(`Map over ${task.x.parameter} and ${task.y.parameter}`, async (id) => {
      const second = { parameter: task.y.parameter, from: task.y.from, to: task.y.to };
      const show = (result: AnalysisResults['map']) => this.showTwo(id, { second, map: { task, result } });
      const result = await this.engine.analyse(id, task, (progress) => {
        this.progress(id, progress);
        if (progress.partial) show(progress.partial);
      });
      show(result);
    });
  }

  /** One of the tasks of the long run, with partial results as they come. */
  private async runLongRun(name: LongRunName): Promise<void> {
    const task = longRunTask(this.store.getState(), name);
    if (!task) return;
    await this.run(LONG_RUN_NAMES[name], async (id) => {
      const show = (result: AnalysisResultOf<typeof task>) => {
        const { job, longRun, set } = this.store.getState();
        if (job?.id === id) set({ longRun: { ...longRun, [name]: { task, result } } });
      };
      const result = await this.engine.analyse(id, task, (progress) => {
        this.progress(id, progress);
        if (progress.partial) show(progress.partial);
      });
      show(result);
    });
  }

  private showTwo(id: number, patch: Partial<TwoParameters>): void {
    const { job, twoParameters, set } = this.store.getState();
    if (job?.id === id) set({ twoParameters: { ...twoParameters, ...patch } });
  }

  private async run(name: string, work: (id: number) => Promise<void>): Promise<void> {
    const id = this.begin(name);
    try {
      await work(id);
    } catch (error) {
      this.store.getState().set({ engineError: explain(error) });
    } finally {
      this.end(id);
    }
  }

  private async findEquilibria(): Promise<void> {
    const { document } = this.store.getState();
    await this.run('Search for equilibria', async (id) => {
      const found = await this.engine.findEquilibria(id, readParameterValues(document), (progress) =>
        this.progress(id, progress),
      );
      const { result, set, job } = this.store.getState();
      if (result && job?.id === id)
        set({ result: { ...result, equilibria: found.split, twinEquilibria: found.twin } });
    });
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
