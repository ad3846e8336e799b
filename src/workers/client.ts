import { proxy } from 'comlink';

import type { AnalysisResultOf } from '../engine/analyses/contract';
import type { Progress } from '../engine/continuation/contract';
import type { AnalysisTask } from '../engine/schema/analysis-tasks';
import { createEngineWorker } from './create-engine-worker';
import { EngineWorkerHost, type WorkerLike } from './engine-worker-host';
import { NewestWins } from './newest-wins';
import type { EngineClient, ExploreRequest, ExploreResult } from './protocol';

export { EngineStopped } from './engine-worker-host';
export type { EngineClient } from './protocol';

/**
 * The engine in two workers of its own: one answers live requests, the newest first, and one runs the
 * long jobs, so that a sweep never holds up a slider. Both are given every model; the second starts with its first job.
 *
 * @param createWorker replaced in tests
 */
export function createEngineClient(createWorker: () => WorkerLike = createEngineWorker): EngineClient {
  const live = new EngineWorkerHost(createWorker);
  const jobs = new EngineWorkerHost(createWorker, 'call');
  const explore = new NewestWins<ExploreRequest, ExploreResult>((request) =>
    live.call((api) => api.explore(request)),
  );
  return {
    async setModel(document) {
      const report = live.call((api) => api.setModel(document));
      if (!jobs.isResting) jobs.call((api) => api.setModel(document)).catch(() => undefined);
      const answer = await report;
      if (answer.valid) {
        live.remember(document);
        jobs.remember(document);
      }
      return answer;
    },
    explore: (request) => explore.request(request),
    findEquilibria: (job, values, onProgress) =>
      jobs.call((api) => api.findEquilibria(job, values, proxy(onProgress))),
    sweep: (job, request, onProgress) => jobs.call((api) => api.sweep(job, request, proxy(onProgress))),
    analyse<Task extends AnalysisTask>(
      job: number,
      task: Task,
      onProgress: (progress: Progress<AnalysisResultOf<Task>>) => void,
    ) {
      // Across the port the types lose which result belongs to which task; here it is said again.
      type Answer = AnalysisResultOf<Task>;
      const tell = proxy((progress: Progress) => onProgress(progress as Progress<Answer>));
      return jobs.call((api) => api.analyse(job, task, tell) as Promise<Answer>);
    },
    secondOpinion: (request) => jobs.call((api) => api.secondOpinion(request)),
    cancel(job) {
      if (!jobs.isResting) jobs.call((api) => api.cancel(job)).catch(() => undefined);
    },
    dispose() {
      live.dispose();
      jobs.dispose();
    },
  };
}
