import { assignedSchema, type ChangeAssigned } from '@/contract/assigned-sweeps';
import { labSchema } from '@/contract/labs';
import { api } from '@/lib/api-client';

const path = (id: string) => `/assigned/${encodeURIComponent(id)}`;
const lab = (labId: string) => `/labs/${encodeURIComponent(labId)}`;

export const SET_KEYS = {
  assigned: (id: string) => ['assigned', 'set', id] as const,
  members: (labId: string) => ['assigned', 'members', labId] as const,
};

/** The calls of those who set sweeps, one each. */
export const fetchAssigned = (id: string) => api.get(path(id), assignedSchema);
export const createAssigned = (labId: string, preset: { presetId: string; version: number }) =>
  api.post(`${lab(labId)}/assigned`, preset, assignedSchema);
export const changeAssigned = (id: string, body: ChangeAssigned) => api.patch(path(id), body, assignedSchema);
export const openAssigned = (id: string, baseRevision: number) =>
  api.post(`${path(id)}/open`, { baseRevision }, assignedSchema);
export const closeAssigned = (id: string, baseRevision: number) =>
  api.post(`${path(id)}/close`, { baseRevision }, assignedSchema);
export const setAgain = (id: string, baseRevision: number) =>
  api.post(`${path(id)}/again`, { baseRevision }, assignedSchema);
export const deleteAssigned = (id: string) => api.delete(path(id));

/** People of the lab, to choose those whom a sweep is for. */
export const fetchMembers = (labId: string) => api.get(lab(labId), labSchema);
