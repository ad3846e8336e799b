import type { SaveWork } from '@/contract/assigned-sweeps';
import { ApiError } from '@/lib/api-client';

import { rangeOf, type AssignedWork } from '../state/assigned';
import type { WorkbenchState, WorkbenchStore } from '../state/store';
import { saveWork } from './api/task-operations';
import { forgetLocalWork, keepWorkLocally, type LocalPlace } from './local-work';

export const KEEPER_TIMES = {
  /** From an edit to its copy in this browser. */
  local: 250,
  /** From the last edit to the server's copy, and at the latest from the first. */
  quiet: 1_000,
  latest: 5_000,
  /** Between tries without a connection: doubled from the first to the longest. */
  firstRetry: 2_000,
  longestRetry: 30_000,
} as const;

/** What the server is given of the bench. */
export function workOf(state: WorkbenchState, assigned: AssignedWork): SaveWork {
  return {
    baseRevision: assigned.revision,
    document: state.document,
    range: rangeOf(assigned, state.sweepSelection),
    findings: [...assigned.findings],
    runs: [...assigned.runs],
  };
}

const changed = (a: WorkbenchState, b: WorkbenchState) =>
  a.document !== b.document ||
  a.sweepSelection !== b.sweepSelection ||
  a.assigned?.findings !== b.assigned?.findings ||
  a.assigned?.runs !== b.assigned?.runs;

/**
 * Keeps an assignee's work: every edit in this browser at once and on the server soon after. Without a connection
 * it stays here and is sent when the connection is back; another window's work is never written over.
 */
export class WorkKeeper {
  private dirty: boolean;
  private sending = false;
  private firstEdit = 0;
  private retry: number = KEEPER_TIMES.firstRetry;
  private localTimer: ReturnType<typeof setTimeout> | undefined;
  private sendTimer: ReturnType<typeof setTimeout> | undefined;
  private unsubscribe: (() => void) | null = null;

  /** @param dirty whether the bench was opened with work that the server does not have */
  constructor(
    private readonly store: WorkbenchStore,
    private readonly place: LocalPlace,
    dirty: boolean,
  ) {
    this.dirty = dirty;
  }

  start(): void {
    this.unsubscribe = this.store.subscribe((state, before) => {
      if (state.assigned && changed(state, before)) this.notice();
    });
    window.addEventListener('online', this.flush);
    window.addEventListener('pagehide', this.flush);
    document.addEventListener('visibilitychange', this.flush);
    if (this.dirty) void this.send();
  }

  stop(): void {
    this.unsubscribe?.();
    window.removeEventListener('online', this.flush);
    window.removeEventListener('pagehide', this.flush);
    document.removeEventListener('visibilitychange', this.flush);
    this.flush();
    clearTimeout(this.sendTimer);
  }

  /** Goes on over what another window saved: this window's work becomes the newest. */
  keepMine(revision: number): void {
    this.patch({ revision, saving: { kind: 'saving' } });
    this.dirty = true;
    void this.send();
  }

  private notice(): void {
    this.dirty = true;
    this.localTimer ??= setTimeout(() => this.keepLocally(), KEEPER_TIMES.local);
    const now = performance.now();
    this.firstEdit ||= now;
    clearTimeout(this.sendTimer);
    const wait = Math.min(KEEPER_TIMES.quiet, Math.max(0, this.firstEdit + KEEPER_TIMES.latest - now));
    this.sendTimer = setTimeout(() => void this.send(), wait);
  }

  private keepLocally(): void {
    clearTimeout(this.localTimer);
    this.localTimer = undefined;
    const state = this.store.getState();
    if (this.dirty && state.assigned) keepWorkLocally(this.place, workOf(state, state.assigned));
  }

  private readonly flush = (): void => {
    if (!this.dirty) return;
    this.keepLocally();
    void this.send();
  };

  private async send(): Promise<void> {
    const state = this.store.getState();
    const { assigned } = state;
    if (this.sending || !this.dirty || !assigned || assigned.saving.kind === 'conflict') return;
    if (assigned.task.state === 'closed') return;
    this.sending = true;
    this.dirty = false;
    this.firstEdit = 0;
    clearTimeout(this.sendTimer);
    this.patch({ saving: { kind: 'saving' } });
    try {
      const saved = await saveWork(assigned.task.id, workOf(state, assigned));
      this.retry = KEEPER_TIMES.firstRetry;
      this.patch({ revision: saved.revision, saving: { kind: 'saved', at: saved.savedAt } });
      this.sending = false;
      if (this.dirty) this.notice();
      else forgetLocalWork(this.place);
    } catch (error) {
      this.sending = false;
      this.dirty = true;
      this.keepLocally();
      this.fail(error);
    }
  }

  private fail(error: unknown): void {
    const refusal = error instanceof ApiError ? error : null;
    if (refusal?.code === 'conflict' && refusal.head) {
      const { number, savedAt } = refusal.head;
      return this.patch({ saving: { kind: 'conflict', revision: number, savedAt } });
    }
    if (refusal && refusal.code !== 'no-connection' && refusal.status < 500)
      return this.patch({ saving: { kind: 'refused', message: refusal.message } });
    this.patch({ saving: { kind: 'no connection' } });
    this.sendTimer = setTimeout(() => void this.send(), this.retry);
    this.retry = Math.min(2 * this.retry, KEEPER_TIMES.longestRetry);
  }

  private patch(patch: Partial<AssignedWork>): void {
    const { assigned, set } = this.store.getState();
    if (assigned) set({ assigned: { ...assigned, ...patch } });
  }
}
