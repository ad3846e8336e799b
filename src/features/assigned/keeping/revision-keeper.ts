import { ApiError } from '@/lib/api-client';

export type Saving<Body> =
  | { readonly state: 'saved' | 'waiting' | 'saving' }
  /** `again` where it is tried anew by itself. */
  | { readonly state: 'failed'; readonly message: string; readonly again: boolean }
  /** Someone else saved in the meantime: what they left. */
  | { readonly state: 'conflict'; readonly theirs: Body };

export interface Kept<Body, Edits> {
  /** As the server has it. */
  readonly body: Body;
  /** What was changed here and is not there yet. */
  readonly edits: Partial<Edits>;
  readonly saving: Saving<Body>;
}

export interface KeeperOptions<Body, Edits> {
  readonly initial: Body;
  readonly revisionOf: (body: Body) => number;
  readonly send: (body: Body, edits: Partial<Edits>) => Promise<Body>;
  readonly fetch: () => Promise<Body>;
  /** What the server would refuse, said without asking it. */
  readonly check?: (body: Body, edits: Partial<Edits>) => string | null;
  /** Whether edits are sent by themselves. */
  readonly automatic?: (body: Body) => boolean;
  readonly onBody?: (body: Body) => void;
}

/** How long one must be still before edits are sent, and how long a lost connection is left alone. */
const PAUSE = 900;
const RETRY = 8_000;

/**
 * Edits of something that has a revision, sent by themselves once one is still for a moment. Nothing is ever
 * written over what another saved: that is told, with the choice of either.
 */
export class RevisionKeeper<Body, Edits extends object> {
  private kept: Kept<Body, Edits>;
  private listeners = new Set<() => void>();
  private timer: ReturnType<typeof setTimeout> | undefined;
  private running: Promise<boolean> | null = null;

  constructor(private readonly options: KeeperOptions<Body, Edits>) {
    this.kept = { body: options.initial, edits: {}, saving: { state: 'saved' } };
  }

  readonly get = (): Kept<Body, Edits> => this.kept;

  readonly subscribe = (listener: () => void): (() => void) => {
    this.listeners.add(listener);
    return () => void this.listeners.delete(listener);
  };

  readonly change = (edits: Partial<Edits>): void => {
    const conflict = this.kept.saving.state === 'conflict';
    this.put({
      edits: { ...this.kept.edits, ...edits },
      saving: conflict ? this.kept.saving : { state: 'waiting' },
    });
    if (!conflict) this.later(PAUSE);
  };

  /** Sends what is not saved yet; true when nothing is left. */
  readonly flush = async (): Promise<boolean> => {
    clearTimeout(this.timer);
    this.running ??= this.sendAll().finally(() => {
      this.running = null;
    });
    return this.running;
  };

  /** What an action of another kind answered. */
  readonly adopt = (body: Body): void => {
    this.put({ body });
    this.options.onBody?.(body);
  };

  /** On a conflict: one's own edits over what they left. */
  readonly keepMine = (): Promise<boolean> => {
    if (this.kept.saving.state === 'conflict')
      this.put({ body: this.kept.saving.theirs, saving: { state: 'waiting' } });
    return this.flush();
  };

  readonly takeTheirs = (): void => {
    if (this.kept.saving.state !== 'conflict') return;
    const { theirs } = this.kept.saving;
    this.drop();
    this.adopt(theirs);
  };

  /** Gives up what is not saved. */
  readonly drop = (): void => {
    clearTimeout(this.timer);
    this.put({ edits: {}, saving: { state: 'saved' } });
  };

  /** Gives up one of the edits, and leaves what was said of saving. */
  readonly forget = (key: keyof Edits): void => {
    const { [key]: _given, ...rest } = this.kept.edits;
    this.put({ edits: rest as Partial<Edits> });
  };

  /** Tries again at once where the connection had failed. */
  readonly retry = (): void => {
    const { saving } = this.kept;
    if (saving.state === 'failed' && saving.again) void this.flush();
  };

  get isSettled(): boolean {
    return Object.keys(this.kept.edits).length === 0;
  }

  /** Called when the page goes: what is sent by itself is sent now. */
  readonly leave = (): void => {
    if (this.options.automatic?.(this.kept.body) === false) clearTimeout(this.timer);
    else void this.flush();
  };

  private put(next: Partial<Kept<Body, Edits>>): void {
    this.kept = { ...this.kept, ...next };
    for (const listener of this.listeners) listener();
  }

  private later(pause: number): void {
    clearTimeout(this.timer);
    if (this.options.automatic?.(this.kept.body) === false) return;
    this.timer = setTimeout(() => void this.flush(), pause);
  }

  private async sendAll(): Promise<boolean> {
    while (!this.isSettled) {
      if (this.kept.saving.state === 'conflict') return false;
      const { body, edits } = this.kept;
      const refusal = this.options.check?.(body, edits) ?? null;
      if (refusal !== null) {
        this.put({ saving: { state: 'failed', message: refusal, again: false } });
        return false;
      }
      this.put({ saving: { state: 'saving' } });
      try {
        const answer = await this.options.send(body, edits);
        this.put({ body: answer, edits: this.editsSince(edits) });
        this.options.onBody?.(answer);
      } catch (error) {
        await this.fail(error, body);
        return false;
      }
    }
    this.put({ saving: { state: 'saved' } });
    return true;
  }

  /** What was edited while the sent ones were under way. */
  private editsSince(sent: Partial<Edits>): Partial<Edits> {
    const keys = Object.keys(this.kept.edits) as (keyof Edits)[];
    const left: Partial<Edits> = {};
    for (const key of keys) if (this.kept.edits[key] !== sent[key]) left[key] = this.kept.edits[key];
    return left;
  }

  private async fail(error: unknown, body: Body): Promise<void> {
    const known = error instanceof ApiError ? error : null;
    if (known?.code === 'conflict') {
      const theirs = await this.options.fetch().catch(() => null);
      if (theirs !== null && this.options.revisionOf(theirs) !== this.options.revisionOf(body))
        return this.put({ saving: { state: 'conflict', theirs } });
    }
    const again = known?.code === 'no-connection';
    const field = known ? Object.values(known.fields)[0] : undefined;
    const message = field ?? known?.message ?? 'That did not work. Reload the page and try again.';
    this.put({ saving: { state: 'failed', message, again } });
    if (again) this.later(RETRY);
  }
}
