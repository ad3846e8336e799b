import { releaseProxy, wrap, type Endpoint, type Remote } from 'comlink';

import type { PresetDocument } from '../engine/schema/preset';
import type { EngineApi } from './protocol';

/** What a worker must offer here; tests put one of their own in its place. */
export interface WorkerLike extends Endpoint {
  terminate(): void;
}

/** Crashes in a row, without an answer between them, after which a worker is not started again. */
const MOST_CRASHES = 3;

/** Why a call was not answered: the worker died, or the page closed it. */
export class EngineStopped extends Error {
  override readonly name = 'EngineStopped';
}

/**
 * One worker kept alive: when it dies, all that it still owed is rejected with the reason, a new one
 * is started and given the last model, and later calls go there.
 */
export class EngineWorkerHost {
  private worker: WorkerLike | null = null;
  private api: Remote<EngineApi> | null = null;
  private document: PresetDocument | null = null;
  private crashes = 0;
  private disposed = false;
  private resting = false;
  private readonly owed = new Set<(reason: Error) => void>();

  /** @param startsAt `call` waits with the worker until it is first asked something. */
  constructor(
    private readonly createWorker: () => WorkerLike,
    startsAt: 'once' | 'call' = 'once',
  ) {
    if (startsAt === 'once') this.start();
    else this.resting = true;
  }

  /** Whether nothing has been asked of it yet. */
  get isResting(): boolean {
    return this.resting;
  }

  /** Calls the engine; rejected with `EngineStopped` if the worker dies before it answers. */
  call<Result>(ask: (api: Remote<EngineApi>) => Promise<Result>): Promise<Result> {
    if (this.resting && !this.disposed) this.start();
    const { api } = this;
    if (!api) return Promise.reject(new EngineStopped(this.disposed ? CLOSED : BROKEN));
    return new Promise<Result>((resolve, reject) => {
      this.owed.add(reject);
      ask(api)
        .then((result) => {
          this.crashes = 0;
          resolve(result);
        }, reject)
        .finally(() => this.owed.delete(reject));
    });
  }

  /** Keeps the document, so that a worker started anew knows the model. */
  remember(document: PresetDocument): void {
    this.document = document;
  }

  dispose(): void {
    this.disposed = true;
    this.stop(CLOSED);
  }

  private start(): void {
    this.resting = false;
    const worker = this.createWorker();
    this.worker = worker;
    worker.addEventListener('error', this.handleCrash);
    worker.addEventListener('messageerror', this.handleCrash);
    this.api = wrap<EngineApi>(worker);
    // The report went out when the document was first set.
    if (this.document) this.api.setModel(this.document).catch(() => undefined);
  }

  private readonly handleCrash = (event: Event): void => {
    event.preventDefault?.();
    const reason =
      'message' in event && typeof event.message === 'string' ? ` It said: ${event.message}` : '';
    this.crashes += 1;
    this.stop(`The engine stopped unexpectedly and was started again.${reason} Repeat the last step.`);
    if (this.crashes < MOST_CRASHES && !this.disposed) this.start();
  };

  private stop(reason: string): void {
    const { worker, api, owed } = this;
    this.worker = null;
    this.api = null;
    worker?.removeEventListener('error', this.handleCrash);
    worker?.removeEventListener('messageerror', this.handleCrash);
    api?.[releaseProxy]();
    worker?.terminate();
    const rejects = [...owed];
    owed.clear();
    rejects.forEach((reject) => reject(new EngineStopped(reason)));
  }
}

const CLOSED = 'The engine was closed with its page.';
const BROKEN = 'The engine stopped several times in a row and is not started again. Reload the page.';
