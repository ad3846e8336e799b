import { EngineSession } from './engine-session';
import { NewestWins } from './newest-wins';
import type { EngineClient, ExploreRequest, ExploreResult } from './protocol';

/**
 * The engine in this very thread, behind the same face as the workers: for tests, and where workers
 * cannot be had. Two sessions, as there are two workers, so that jobs do not disturb live work.
 */
export function createLocalEngine(): EngineClient {
  const live = new EngineSession();
  const jobs = new EngineSession();
  const explore = new NewestWins<ExploreRequest, ExploreResult>((request) => live.explore(request));
  let disposed = false;
  const open = (): void => {
    if (disposed) throw new Error('The engine was closed with its page.');
  };
  return {
    async setModel(document) {
      open();
      jobs.setModel(document);
      return live.setModel(document);
    },
    async explore(request) {
      open();
      return explore.request(request);
    },
    async findEquilibria(job, values, onProgress) {
      open();
      return jobs.findEquilibria(job, values, onProgress);
    },
    async sweep(job, request, onProgress) {
      open();
      return jobs.sweep(job, request, onProgress);
    },
    async analyse(job, task, onProgress) {
      open();
      return jobs.analyse(job, task, onProgress);
    },
    async secondOpinion(request) {
      open();
      return jobs.secondOpinion(request);
    },
    cancel: (job) => jobs.cancel(job),
    dispose() {
      disposed = true;
    },
  };
}
