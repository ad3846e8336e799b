import { afterEach, describe, expect, it, vi } from 'vitest';

import { createLocalEngine } from '@/workers/local-engine';
import type { EngineClient, ExploreRequest } from '@/workers/protocol';
import { EngineDriver } from '@/features/workbench/engine/engine-driver';
import { withParameterValue, withStart } from '@/features/workbench/engine/parameter-values';
import { sameStructure } from '@/features/workbench/engine/same-structure';
import { createWorkbenchStore } from '@/features/workbench/state/store';

import { twoSexes } from './support';

/** The true engine, with a note of what it was asked. */
function watched() {
  const engine = createLocalEngine();
  const models: number[] = [];
  const explored: ExploreRequest[] = [];
  let running = 0;
  let most = 0;
  const client: EngineClient = {
    ...engine,
    setModel: (document) => {
      models.push(document.processes.length);
      return engine.setModel(document);
    },
    explore: async (request) => {
      explored.push(request);
      most = Math.max(most, ++running);
      try {
        return await engine.explore(request);
      } finally {
        running--;
      }
    },
  };
  return { client, models, explored, mostAtOnce: () => most };
}

const drivers: EngineDriver[] = [];
function bench(client: EngineClient) {
  const store = createWorkbenchStore(twoSexes(), { kind: 'new' });
  const driver = new EngineDriver(store, client);
  drivers.push(driver);
  driver.start();
  return store;
}
afterEach(() => drivers.splice(0).forEach((driver) => driver.stop()));

describe('the engine driver', () => {
  it('computes a first picture by itself', async () => {
    const store = bench(watched().client);
    await vi.waitFor(
      () => expect(store.getState().result?.equilibria?.equilibria.length).toBeGreaterThan(0),
      10_000,
    );
    expect(store.getState().shownReport?.valid).toBe(true);
    expect(store.getState().result?.trajectory.times.at(-1)).toBe(100);
  });

  it('follows moved numbers without compiling, one request at a time, the newest last', async () => {
    const { client, models, explored, mostAtOnce } = watched();
    const store = bench(client);
    await vi.waitFor(() => expect(store.getState().result?.equilibria ?? null).not.toBeNull(), 10_000);
    const compiled = models.length;
    for (let k = 1; k <= 30; k++) {
      store.getState().edit('Move K', (document) => withParameterValue(document, 'K', 3 + k / 100), 'K');
      await new Promise((resolve) => setTimeout(resolve, 4));
    }
    await vi.waitFor(() => expect(explored.at(-1)?.values['K']).toBeCloseTo(3.3, 12), 5_000);
    expect(models.length).toBe(compiled);
    expect(mostAtOnce()).toBe(1);
    expect(explored.some((request) => request.equilibria === 'track')).toBe(true);
    // At rest the equilibria are sought anew.
    await vi.waitFor(() => expect(explored.at(-1)?.equilibria).toBe('search'), 5_000);
    expect(store.getState().past).toHaveLength(1);
  });

  it('keeps the last valid model on show while a formula is wrong', async () => {
    const store = bench(watched().client);
    await vi.waitFor(() => expect(store.getState().result?.equilibria ?? null).not.toBeNull(), 10_000);
    const before = store.getState();
    before.edit('Type a formula', (document) => ({
      ...document,
      processes: document.processes.map((one, k) => (k === 0 ? { ...one, rate: 'x*(1 - ' } : one)),
    }));
    await vi.waitFor(() => expect(store.getState().report?.valid).toBe(false), 5_000);
    expect(store.getState().report?.diagnostics.some((one) => one.severity === 'error')).toBe(true);
    expect(store.getState().shownReport).toBe(before.shownReport);
    expect(store.getState().shownDocument).toBe(before.shownDocument);
    expect(store.getState().result).toBe(before.result);
  });

  it('sweeps, and says in words when the engine has gone', async () => {
    const { client } = watched();
    const store = bench(client);
    store.getState().set({ sweepSelection: { parameter: 'K', from: 0.5, to: 6 } });
    await vi.waitFor(() => expect(store.getState().sweep?.split.status).toBe('complete'), 20_000);
    await vi.waitFor(() => expect(store.getState().job).toBeNull(), 20_000);
    expect(store.getState().job).toBeNull();
    expect(store.getState().verdict).toBe(store.getState().sweep?.verdict);
    vi.spyOn(client, 'explore').mockRejectedValue(new Error('The worker stopped.'));
    store.getState().edit('Move K', (document) => withParameterValue(document, 'K', 2));
    await vi.waitFor(() => expect(store.getState().engineError).toContain('The worker stopped.'), 5_000);
  });
});

describe('what makes a new system', () => {
  const document = twoSexes();
  it.each([
    ['a parameter value', withParameterValue(document, 'K', 4), true],
    ['a trait value', withParameterValue(document, 'm_y1', 0.5), true],
    ['the spread', withParameterValue(document, 'dial:spread', 0.5), true],
    ['a start value', withStart(document, 'y1', 3), true],
    ['a share of births', withParameterValue(document, 'q_y1', 0.6), false],
    ['a formula', { ...document, processes: document.processes.slice(1) }, false],
    [
      'the end of a range',
      { ...document, parameters: document.parameters.map((one) => ({ ...one, max: 9 })) },
      false,
    ],
    ['the title', { ...document, title: 'Other' }, true],
  ])('%s', (_what, changed, same) => {
    expect(changed).not.toBe(document);
    expect(sameStructure(document, changed)).toBe(same);
  });

  it('leaves a document alone where there is nothing to move', () => {
    expect(withParameterValue(document, 'nothing', 1)).toBe(document);
    expect(withParameterValue(document, 'K', 3)).toBe(document);
    expect(withParameterValue(document, 'K', NaN)).toBe(document);
    expect(withStart(document, 'y1', -2).populations[1]?.classes[0]?.start).toBe(0);
  });
});
