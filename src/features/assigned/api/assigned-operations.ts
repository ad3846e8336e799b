import { assignedPageSchema, taskSchema, type AssignedState } from '@/contract/assigned-sweeps';
import { api } from '@/lib/api-client';

const path = (id: string) => `/assigned/${encodeURIComponent(id)}`;

export const ASSIGNED_KEYS = {
  all: ['assigned'] as const,
  mine: ['assigned', 'mine'] as const,
  task: (id: string) => ['assigned', 'task', id] as const,
  ofLab: (labId: string, state: AssignedState | undefined, page: number) =>
    ['assigned', 'lab', labId, state ?? 'all', page] as const,
};

export function fetchTask(id: string, signal?: AbortSignal) {
  return api.get(`${path(id)}/task`, taskSchema, signal);
}

/** Sweeps set for oneself in all labs, what is due first. */
export function fetchMine() {
  return api.get('/assigned', assignedPageSchema);
}

export function fetchOfLab(labId: string, state: AssignedState | undefined, page: number) {
  const query = new URLSearchParams({ page: String(page), ...(state ? { state } : {}) });
  return api.get(`/labs/${encodeURIComponent(labId)}/assigned?${query.toString()}`, assignedPageSchema);
}
