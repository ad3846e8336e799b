import { describe, expect, it } from 'vitest';

import { driveInSlices, letMessagesThrough, SLICE_MILLISECONDS } from '../../src/workers/drive-in-slices';
import { collectTransferables } from '../../src/workers/transferables';

function* busy(milliseconds: number): Generator<number, string> {
  const end = performance.now() + milliseconds;
  let count = 0;
  while (performance.now() < end) yield (count += 1);
  return 'done';
}

describe('slices', () => {
  it('let messages through while a long run goes on', async () => {
    let heard = 0;
    let running = true;
    const listen = async () => {
      while (running) {
        await letMessagesThrough();
        heard += 1;
      }
    };
    void listen();
    const slices: number[] = [];
    await expect(
      driveInSlices(busy(8 * SLICE_MILLISECONDS), { onSlice: (n) => slices.push(n) }),
    ).resolves.toBe('done');
    running = false;
    expect(heard).toBeGreaterThan(3);
    expect(slices.length).toBeGreaterThan(3);
    expect([...slices].sort((a, b) => a - b)).toEqual(slices);
  });

  it('abandon a superseded run and let it clean up', async () => {
    let cleaned = false;
    function* run(): Generator<number, string> {
      try {
        yield* busy(10_000);
        return 'never';
      } finally {
        cleaned = true;
      }
    }
    let looks = 0;
    const began = performance.now();
    await expect(driveInSlices(run(), { isSuperseded: () => (looks += 1) === 2 })).resolves.toBeNull();
    expect(cleaned).toBe(true);
    expect(performance.now() - began).toBeLessThan(1000);
  });

  it('pass on what a run throws', async () => {
    function* broken(): Generator<number, string> {
      yield 1;
      throw new Error('a mistake');
    }
    await expect(driveInSlices(broken())).rejects.toThrow('a mistake');
  });
});

describe('transferables', () => {
  it('are the whole buffers of large arrays, each once', () => {
    const shared = new Float64Array(600);
    const alone = new Float64Array(300);
    const result = {
      a: { times: shared, states: alone },
      b: [{ times: shared }],
      small: new Float64Array(3),
      part: new Float64Array(5000).subarray(0, 1000),
      memory: new Float64Array(new WebAssembly.Memory({ initial: 1 }).buffer).subarray(0, 512),
      none: null,
    };
    expect(collectTransferables(result)).toEqual([shared.buffer, alone.buffer]);
    expect(collectTransferables('text')).toEqual([]);
  });
});
