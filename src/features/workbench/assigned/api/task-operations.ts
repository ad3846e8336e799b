import {
  receiptSchema,
  taskSchema,
  workSavedSchema,
  type HandIn,
  type SaveWork,
} from '@/contract/assigned-sweeps';
import { api } from '@/lib/api-client';

const path = (id: string) => `/assigned/${encodeURIComponent(id)}`;

export function fetchTask(id: string, signal?: AbortSignal) {
  return api.get(`${path(id)}/task`, taskSchema, signal);
}

export function saveWork(id: string, work: SaveWork) {
  return api.put(`${path(id)}/work`, work, workSavedSchema);
}

export function handIn(id: string, body: HandIn) {
  return api.post(`${path(id)}/hand-ins`, body, receiptSchema);
}
