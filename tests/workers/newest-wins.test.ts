import { describe, expect, it } from 'vitest';

import { NewestWins } from '../../src/workers/newest-wins';

/** Another side whose answers are given by hand. */
function makeAsked() {
  const asked: { request: string; answer: (result: string | null) => void; fail: (reason: Error) => void }[] =
    [];
  const ask = (request: string) =>
    new Promise<string | null>((resolve, reject) => asked.push({ request, answer: resolve, fail: reject }));
  return { asked, ask };
}

const settle = () => new Promise((resolve) => setTimeout(resolve, 0));

describe('newest wins', () => {
  it('forgets the requests between and answers everyone with the newest', async () => {
    const { asked, ask } = makeAsked();
    const queue = new NewestWins(ask, 1);
    const results = ['a', 'b', 'c', 'd'].map((one) => queue.request(one));
    expect(asked.map((one) => one.request)).toEqual(['a']);
    asked[0].answer('A');
    await expect(results[0]).resolves.toBe('A');
    await settle();
    expect(asked.map((one) => one.request)).toEqual(['a', 'd']);
    asked[1].answer('D');
    await expect(Promise.all(results.slice(1))).resolves.toEqual(['D', 'D', 'D']);
  });

  it('answers a request that was dropped with the result of the one that overtook it', async () => {
    const { asked, ask } = makeAsked();
    const queue = new NewestWins(ask);
    const first = queue.request('old');
    const second = queue.request('new');
    expect(asked.map((one) => one.request)).toEqual(['old', 'new']);
    asked[0].answer(null);
    await settle();
    asked[1].answer('NEW');
    await expect(Promise.all([first, second])).resolves.toEqual(['NEW', 'NEW']);
  });

  it('never answers with a result older than the request', async () => {
    const { asked, ask } = makeAsked();
    const queue = new NewestWins(ask);
    const first = queue.request('a');
    const second = queue.request('b');
    const third = queue.request('c');
    asked[1].answer('B');
    await expect(Promise.all([first, second])).resolves.toEqual(['B', 'B']);
    let early = true;
    void third.then(() => (early = false));
    asked[0].answer('A');
    await settle();
    expect(early).toBe(true);
    asked[2].answer('C');
    await expect(third).resolves.toBe('C');
  });

  it('passes a failure on to those concerned, and goes on', async () => {
    const { asked, ask } = makeAsked();
    const queue = new NewestWins(ask, 1);
    const first = queue.request('a');
    const second = queue.request('b');
    asked[0].fail(new Error('no model'));
    await expect(first).rejects.toThrow('no model');
    await settle();
    asked[1].answer('B');
    await expect(second).resolves.toBe('B');
    const third = queue.request('c');
    await settle();
    asked[2].answer(null);
    await expect(third).rejects.toThrow(/dropped the newest/);
  });
});
