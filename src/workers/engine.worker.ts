/** Shell of the engine in a worker: a session behind comlink, results handed over without copying. */
import { expose, transfer } from 'comlink';

import { EngineSession } from './engine-session';
import type { EngineApi } from './protocol';
import { collectTransferables } from './transferables';

const session = new EngineSession();

function handOver<Result>(result: Result): Result {
  return transfer(result, collectTransferables(result));
}

const api: EngineApi = {
  setModel: (document) => session.setModel(document),
  async explore(request) {
    const result = await session.explore(request);
    return result && handOver(result);
  },
  findEquilibria: async (job, values, onProgress) =>
    handOver(await session.findEquilibria(job, values, onProgress)),
  sweep: async (job, request, onProgress) => handOver(await session.sweep(job, request, onProgress)),
  analyse: async (job, task, onProgress) => handOver(await session.analyse(job, task, onProgress)),
  secondOpinion: (request) => handOver(session.secondOpinion(request)),
  cancel: (job) => session.cancel(job),
};

expose(api);
