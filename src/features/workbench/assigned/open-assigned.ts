import type { SaveWork, Task } from '@/contract/assigned-sweeps';
import type { PresetDocument } from '@/engine/schema/preset';

import type { AssignedWork } from '../state/assigned';
import type { Origin } from '../state/store';
import { fetchTask } from './api/task-operations';
import { readLocalWork, type LocalPlace } from './local-work';

export interface OpenedAssigned {
  readonly work: AssignedWork;
  readonly place: LocalPlace;
  /** Whether this browser had work that the server has not. */
  readonly dirty: boolean;
}

const withRange = (document: PresetDocument, { range }: Pick<SaveWork, 'range'>): PresetDocument => ({
  ...document,
  sweeps: [{ id: 'assigned', name: '', ...range }, ...document.sweeps.slice(1)],
});

/** This browser's copy where it holds what the server has not, else the server's, else the task as it was set. */
function begin(task: Task, local: SaveWork | null) {
  const revision = task.work?.revision ?? 0;
  const work = local ?? task.work;
  const outrun = local !== null && local.baseRevision < revision;
  return {
    document: withRange(work?.document ?? task.document, work ?? task),
    assigned: {
      task,
      findings: work?.findings ?? [],
      runs: work?.runs ?? [],
      revision: local?.baseRevision ?? revision,
      saving: outrun
        ? { kind: 'conflict' as const, revision, savedAt: task.work?.savedAt ?? '' }
        : { kind: 'saved' as const, at: task.work?.savedAt ?? null },
    },
  };
}

/** An assigned sweep as its assignee left it, in this browser or in another. */
export async function openAssigned(
  id: string,
  userId: string,
  signal: AbortSignal,
): Promise<{ document: PresetDocument; origin: Origin; assigned: OpenedAssigned }> {
  const task = await fetchTask(id, signal);
  const place = { userId, assignedId: id };
  const local = task.state === 'open' ? readLocalWork(place) : null;
  const { document, assigned } = begin(task, local);
  return {
    document,
    origin: { kind: 'assigned', id, labName: task.lab.name },
    assigned: { work: assigned, place, dirty: local !== null },
  };
}
