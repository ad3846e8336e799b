import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';

import { RevisionKeeper, type KeeperOptions } from '@/features/assigned/keeping/revision-keeper';
import { ApiError } from '@/lib/api-client';

interface Body {
  readonly revision: number;
  readonly title: string;
  readonly brief: string;
}
type Edits = Pick<Body, 'title' | 'brief'>;

const START: Body = { revision: 1, title: 'Old', brief: '' };
const lost = () => new ApiError(0, { code: 'no-connection', message: 'The server could not be reached.' });
const conflict = () => new ApiError(409, { code: 'conflict', message: 'It was changed meanwhile.' });

/** A server that keeps one thing, and what was asked of it. */
function keeping(options: Partial<KeeperOptions<Body, Edits>> = {}) {
  let there = START;
  const sent: (Partial<Edits> & { base: number })[] = [];
  let failure: ApiError | null = null;
  const keeper = new RevisionKeeper<Body, Edits>({
    initial: START,
    revisionOf: ({ revision }) => revision,
    send: async (body, edits) => {
      sent.push({ ...edits, base: body.revision });
      if (failure) throw failure;
      if (body.revision !== there.revision) throw conflict();
      there = { ...there, ...edits, revision: there.revision + 1 };
      return there;
    },
    fetch: async () => there,
    ...options,
  });
  return {
    keeper,
    sent,
    there: () => there,
    breakWith: (error: ApiError | null) => (failure = error),
    another: (edits: Partial<Edits>) => (there = { ...there, ...edits, revision: there.revision + 1 }),
  };
}

beforeEach(() => void vi.useFakeTimers());
afterEach(() => void vi.useRealTimers());

describe('edits that are kept by themselves', () => {
  it('go together once one is still, with the revision they were made on', async () => {
    const { keeper, sent } = keeping();
    keeper.change({ title: 'New' });
    await vi.advanceTimersByTimeAsync(500);
    keeper.change({ brief: 'Why' });
    expect(sent).toEqual([]);
    expect(keeper.get().saving.state).toBe('waiting');
    await vi.advanceTimersByTimeAsync(1_000);
    expect(sent).toEqual([{ title: 'New', brief: 'Why', base: 1 }]);
    expect(keeper.get()).toMatchObject({
      body: { revision: 2, title: 'New' },
      edits: {},
      saving: { state: 'saved' },
    });
  });

  it('made while others are under way follow them', async () => {
    const { keeper, sent, there } = keeping();
    keeper.change({ title: 'One' });
    const done = keeper.flush();
    keeper.change({ title: 'Two' });
    expect(await done).toBe(true);
    expect(sent.map(({ title, base }) => [title, base])).toEqual([
      ['One', 1],
      ['Two', 2],
    ]);
    expect(there().title).toBe('Two');
  });

  it('outlast a lost connection', async () => {
    const { keeper, breakWith, there } = keeping();
    breakWith(lost());
    keeper.change({ title: 'New' });
    await vi.advanceTimersByTimeAsync(1_000);
    expect(keeper.get().saving).toMatchObject({ state: 'failed', again: true });
    expect(keeper.get().edits).toEqual({ title: 'New' });
    breakWith(null);
    await vi.advanceTimersByTimeAsync(9_000);
    expect(there().title).toBe('New');
    expect(keeper.isSettled).toBe(true);
  });

  it('go at once when the connection is back', async () => {
    const { keeper, breakWith, there } = keeping();
    breakWith(lost());
    keeper.change({ title: 'New' });
    await keeper.flush();
    breakWith(null);
    keeper.retry();
    await vi.advanceTimersByTimeAsync(0);
    expect(there().title).toBe('New');
  });

  it('are never written over what another saved, before one says so', async () => {
    const { keeper, another, there } = keeping();
    another({ title: 'Theirs' });
    keeper.change({ title: 'Mine' });
    expect(await keeper.flush()).toBe(false);
    expect(keeper.get().saving).toMatchObject({ state: 'conflict', theirs: { title: 'Theirs' } });
    keeper.change({ brief: 'More' });
    await vi.advanceTimersByTimeAsync(20_000);
    expect(there().title).toBe('Theirs');
    expect(await keeper.keepMine()).toBe(true);
    expect(there()).toMatchObject({ title: 'Mine', brief: 'More' });
  });

  it('can be dropped for what another saved', async () => {
    const { keeper, another, there } = keeping();
    another({ title: 'Theirs' });
    keeper.change({ title: 'Mine' });
    await keeper.flush();
    keeper.takeTheirs();
    expect(keeper.get()).toMatchObject({ body: { title: 'Theirs' }, edits: {}, saving: { state: 'saved' } });
    expect(there().title).toBe('Theirs');
  });

  it('that the server refuses in words are no conflict', async () => {
    const { keeper, breakWith } = keeping();
    breakWith(conflict());
    keeper.change({ title: 'New' });
    await keeper.flush();
    expect(keeper.get().saving).toEqual({
      state: 'failed',
      message: 'It was changed meanwhile.',
      again: false,
    });
  });

  it('that would be refused are not sent', async () => {
    const { keeper, sent } = keeping({
      check: (_body, { title }) => (title === '' ? 'A title is needed.' : null),
    });
    keeper.change({ title: '' });
    expect(await keeper.flush()).toBe(false);
    expect(sent).toEqual([]);
    expect(keeper.get().saving).toMatchObject({ state: 'failed', message: 'A title is needed.' });
  });

  it('wait to be sent where that is asked', async () => {
    const { keeper, sent } = keeping({ automatic: () => false });
    keeper.change({ title: 'New' });
    await vi.advanceTimersByTimeAsync(20_000);
    keeper.leave();
    expect(sent).toEqual([]);
    expect(await keeper.flush()).toBe(true);
    expect(sent).toHaveLength(1);
  });
});
