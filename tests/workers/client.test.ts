import { expose } from 'comlink';
import { describe, expect, it, vi } from 'vitest';

import { cyclesTaskSchema, type AnalysisTask } from '../../src/engine/schema/analysis-tasks';
import { createEmptyPreset } from '../../src/engine/schema/create';
import { createEngineClient, EngineStopped } from '../../src/workers/client';
import type { EngineApi, ExploreRequest } from '../../src/workers/protocol';

/** A worker of this thread: a message port with an engine behind it, and a way to make it die. */
function makeWorker(api: Partial<Record<keyof EngineApi, (...rest: never[]) => unknown>>) {
  const { port1, port2 } = new MessageChannel();
  const crashes: EventListenerOrEventListenerObject[] = [];
  expose(api, port2);
  port1.start();
  const worker = {
    postMessage: (message: unknown, transfer?: Transferable[]) => port1.postMessage(message, transfer ?? []),
    addEventListener: (type: string, listener: EventListenerOrEventListenerObject) => {
      if (type === 'message') port1.addEventListener('message', listener);
      else if (type === 'error') crashes.push(listener);
    },
    removeEventListener: (type: string, listener: EventListenerOrEventListenerObject) =>
      port1.removeEventListener(type, listener),
    terminate: vi.fn(() => {
      port1.close();
      port2.close();
    }),
    crash(message: string) {
      const event = Object.assign(new Event('error'), { message });
      for (const listener of crashes)
        if (typeof listener === 'function') listener(event);
        else listener.handleEvent(event);
    },
  };
  return worker;
}

const REQUEST: ExploreRequest = {
  values: {},
  starts: [],
  horizon: 1,
  samples: 2,
  withTwin: false,
  equilibria: 'none',
  plane: null,
};

function makeClient(api: Parameters<typeof makeWorker>[0]) {
  const workers: ReturnType<typeof makeWorker>[] = [];
  const client = createEngineClient(() => {
    const worker = makeWorker(api);
    workers.push(worker);
    return worker;
  });
  return { client, workers };
}

describe('engine client', () => {
  it('gives live work to one worker and jobs to another, which starts with the first of them', async () => {
    const setModel = vi.fn(() => ({ valid: true }));
    const { client, workers } = makeClient({
      setModel,
      explore: async () => ({ milliseconds: 1 }),
      secondOpinion: () => ({ difference: 0.5 }),
    });
    const document = createEmptyPreset();
    expect(await client.setModel(document)).toMatchObject({ valid: true });
    client.cancel(3);
    expect(await client.explore(REQUEST)).toMatchObject({ milliseconds: 1 });
    expect(workers).toHaveLength(1);
    expect(setModel).toHaveBeenCalledTimes(1);
    expect(await client.secondOpinion(REQUEST)).toMatchObject({ difference: 0.5 });
    expect(workers).toHaveLength(2);
    expect(setModel).toHaveBeenCalledTimes(2);
    expect(setModel).toHaveBeenLastCalledWith(document);
    const sent = workers.map((worker) => vi.spyOn(worker, 'postMessage'));
    await client.explore(REQUEST);
    expect(sent.map((one) => one.mock.calls.length)).toEqual([1, 0]);
    await client.secondOpinion(REQUEST);
    expect(sent.map((one) => one.mock.calls.length)).toEqual([1, 1]);
    await client.setModel(document);
    await vi.waitFor(() => expect(setModel).toHaveBeenCalledTimes(4));
    client.dispose();
  });

  it('tells of progress and passes a cancel on', async () => {
    const cancel = vi.fn();
    const { client } = makeClient({
      cancel,
      sweep: async (_job: number, _request: unknown, onProgress: (progress: unknown) => Promise<void>) => {
        await onProgress({ fraction: 0.5, stage: 'half way', partial: null });
        return { status: 'done' };
      },
    });
    const stages: string[] = [];
    const request = { values: {}, parameter: 'r', from: 0, to: 1, starts: [], withTwin: false };
    await client.sweep(7, request, (progress) => stages.push(progress.stage));
    expect(stages).toEqual(['half way']);
    client.cancel(7);
    await vi.waitFor(() => expect(cancel).toHaveBeenCalledWith(7));
    client.dispose();
  });

  it('hands a task and its partial results across, and its result back', async () => {
    const { client } = makeClient({
      analyse: async (
        _job: number,
        task: AnalysisTask,
        onProgress: (progress: unknown) => Promise<void>,
      ): Promise<unknown> => {
        await onProgress({ fraction: 0.5, stage: task.task, partial: { split: { points: 3 }, twin: null } });
        return { split: { points: 7, periods: Float64Array.of(1, 2) }, twin: null };
      },
    });
    const task = cyclesTaskSchema.parse({ task: 'cycles', parameter: 'r', from: 0, to: 1 });
    const heard: unknown[] = [];
    const { split } = await client.analyse(1, task, ({ stage, partial }) =>
      heard.push([stage, partial?.split.points]),
    );
    expect(heard).toEqual([['cycles', 3]]);
    expect(split).toEqual({ points: 7, periods: Float64Array.of(1, 2) });
    client.dispose();
  });

  it('after a crash rejects what was owed, starts a new worker and gives it the last model', async () => {
    const setModel = vi.fn(() => ({ valid: true }));
    let hang = true;
    const { client, workers } = makeClient({
      setModel,
      explore: () => (hang ? new Promise(() => undefined) : { milliseconds: 2 }),
    });
    const document = createEmptyPreset();
    await client.setModel(document);
    const owed = client.explore(REQUEST);
    workers[0].crash('out of memory');
    await expect(owed).rejects.toThrow(/stopped unexpectedly.*out of memory/);
    await expect(owed).rejects.toBeInstanceOf(EngineStopped);
    expect(workers[0].terminate).toHaveBeenCalled();
    expect(workers).toHaveLength(2);
    await vi.waitFor(() => expect(setModel).toHaveBeenCalledTimes(2));
    expect(setModel).toHaveBeenLastCalledWith(document);
    hang = false;
    expect(await client.explore(REQUEST)).toMatchObject({ milliseconds: 2 });
    client.dispose();
  });

  it('does not restart for ever, and says so', async () => {
    const { client, workers } = makeClient({ explore: () => ({ milliseconds: 1 }) });
    for (const at of [0, 1, 2]) workers[at].crash('cannot load');
    expect(workers).toHaveLength(3);
    await expect(client.explore(REQUEST)).rejects.toThrow(/several times in a row/);
    client.dispose();
  });

  it('passes on a mistake of the engine without taking it for a crash', async () => {
    const { client, workers } = makeClient({
      explore: () => {
        throw new Error('There is no valid model yet.');
      },
    });
    await expect(client.explore(REQUEST)).rejects.toThrow('There is no valid model yet.');
    expect(workers).toHaveLength(1);
    client.dispose();
    await expect(client.explore(REQUEST)).rejects.toThrow(/closed with its page/);
  });
});
