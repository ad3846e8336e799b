import type { PresetDocument } from '@/engine/schema/preset';
import type { EngineClient, ExploreRequest, ExploreResult } from '@/workers/protocol';

import type { WorkbenchStore } from '../state/store';

import { DRIVER_DEFAULTS, explain } from './driver-defaults';
import { EngineJobs } from './engine-jobs';
import { readParameterValues, readStarts } from './parameter-values';
import { sameNumbers, sameStructure } from './same-structure';

/** What the last result was computed from. */
interface Asked {
  readonly document: PresetDocument;
  readonly plane: ExploreRequest['plane'];
}

/**
 * Keeps the results on the bench in step with the document: compiles on structural edits, explores on
 * moved numbers, one request in flight and the newest next. Errors keep the last valid model on show.
 */
export class EngineDriver {
  private readonly jobs: EngineJobs;
  private compiled: PresetDocument | null = null;
  private asked: Asked | null = null;
  /** The first look, asked for before the model's report has come. */
  private ahead: { readonly document: PresetDocument; readonly answer: Promise<ExploreResult> } | null = null;
  private mode: 'track' | 'search' = 'search';
  private running = false;
  private stopped = false;
  private frame = 0;
  private idleTimer: ReturnType<typeof setTimeout> | undefined;
  private staleTimer: ReturnType<typeof setTimeout> | undefined;
  private unsubscribe: (() => void) | null = null;

  constructor(
    private readonly store: WorkbenchStore,
    private readonly engine: EngineClient,
  ) {
    this.jobs = new EngineJobs(store, engine, () => this.request());
  }

  start(): void {
    this.stopped = false;
    this.unsubscribe = this.store.subscribe((state, previous) => {
      if (state.document !== previous.document) this.noticeEdit(state.document, previous.document);
      else if (state.planeRequest !== previous.planeRequest) this.schedule();
    });
    this.store.getState().set({ engine: this.jobs.actions });
    // At once, not with the next frame: the engine works while the page is drawn for the first time.
    void this.pump();
  }

  stop(): void {
    this.stopped = true;
    this.unsubscribe?.();
    this.jobs.cancel();
    cancelAnimationFrame(this.frame);
    clearTimeout(this.idleTimer);
    clearTimeout(this.staleTimer);
    this.store.getState().set({ engine: null, job: null, stale: false });
  }

  private noticeEdit(document: PresetDocument, previous: PresetDocument): void {
    if (sameNumbers(document, previous) && sameStructure(document, previous)) return;
    this.mode = 'track';
    clearTimeout(this.idleTimer);
    this.idleTimer = setTimeout(() => {
      this.mode = 'search';
      this.asked = null;
      this.schedule();
    }, DRIVER_DEFAULTS.idleMilliseconds);
    this.schedule();
  }

  /** At most one look a frame, however fast the pointer moves. */
  private schedule(): void {
    if (this.frame !== 0 || this.stopped) return;
    this.frame = requestAnimationFrame(() => {
      this.frame = 0;
      void this.pump();
    });
  }

  private needsModel(document: PresetDocument): boolean {
    if (!this.compiled) return true;
    // At rest the report is read anew, since limits and remarks depend on the numbers too.
    if (this.mode === 'search' && this.compiled !== document) return true;
    return !sameStructure(this.compiled, document);
  }

  private async pump(): Promise<void> {
    if (this.running) return;
    this.running = true;
    this.staleTimer = setTimeout(
      () => this.store.getState().set({ stale: true }),
      DRIVER_DEFAULTS.staleMilliseconds,
    );
    try {
      while (!this.stopped && (await this.step()));
    } catch (error) {
      this.store.getState().set({ engineError: explain(error) });
    } finally {
      clearTimeout(this.staleTimer);
      this.running = false;
      if (this.store.getState().stale) this.store.getState().set({ stale: false });
    }
  }

  /** One request to the engine; false when there is nothing left to ask. */
  private async step(): Promise<boolean> {
    const { document, shownReport, planeRequest } = this.store.getState();
    if (this.needsModel(document)) {
      await this.compile(document);
      return true;
    }
    if (!shownReport || !this.store.getState().report?.valid) return false;
    if (this.asked?.document === document && this.asked.plane === planeRequest) return false;
    await this.explore();
    return true;
  }

  private async compile(document: PresetDocument): Promise<void> {
    const restructured = !this.compiled || !sameStructure(this.compiled, document);
    const compiling = this.engine.setModel(document);
    // The first look is asked for in the same breath; of a model with mistakes nothing comes of it.
    if (this.compiled === null) this.ahead = { document, answer: this.engine.explore(this.firstRequest()) };
    this.ahead?.answer.catch(() => undefined);
    const report = await compiling;
    if (this.stopped) return;
    this.compiled = document;
    if (restructured) this.asked = null;
    const { sweep, set } = this.store.getState();
    set(
      report.valid
        ? {
            report,
            shownDocument: document,
            shownReport: report,
            engineError: null,
            ...(restructured && sweep ? { sweepOutdated: true } : {}),
            ...(restructured ? { secondOpinion: null } : {}),
          }
        : { report },
    );
  }

  private request(): ExploreRequest {
    const { document, planeRequest } = this.store.getState();
    return {
      values: readParameterValues(document),
      starts: readStarts(document),
      horizon: document.horizon,
      samples: DRIVER_DEFAULTS.samples,
      withTwin: document.view.showTwin,
      equilibria: this.mode,
      plane: planeRequest,
    };
  }

  private firstRequest(): ExploreRequest {
    return { ...this.request(), equilibria: 'none' };
  }

  private async explore(): Promise<void> {
    const { document, planeRequest } = this.store.getState();
    // The first picture does not wait for the search: trajectories at once, equilibria with the next look.
    const first = this.store.getState().result === null && this.mode === 'search';
    const request = first ? this.firstRequest() : this.request();
    this.asked = first ? null : { document, plane: planeRequest };
    performance.mark('moiety:explore-asked');
    const { ahead } = this;
    this.ahead = null;
    const answer = await (first && ahead?.document === document
      ? ahead.answer
      : this.engine.explore(request));
    if (this.stopped) return;
    performance.measure('moiety:explore', 'moiety:explore-asked');
    const before = this.store.getState();
    const result = {
      ...answer,
      equilibria: answer.equilibria ?? before.result?.equilibria ?? null,
      twinEquilibria: answer.twinEquilibria ?? before.result?.twinEquilibria ?? null,
      verdict: answer.verdict ?? before.result?.verdict ?? null,
    };
    before.set({ result, engineError: null, secondOpinion: null });
    this.jobs.afterExplore(request.values, request.equilibria === 'search');
  }
}
