import { peopleTableSchema, reviewedHandInSchema, type SaveReview } from '@/contract/assigned-sweeps';
import { api } from '@/lib/api-client';

const assigned = (id: string) => `/assigned/${encodeURIComponent(id)}`;
const handIn = (id: string) => `/hand-ins/${encodeURIComponent(id)}`;

export const REVIEW_KEYS = {
  table: (id: string) => ['assigned', 'table', id] as const,
  handIn: (id: string) => ['assigned', 'hand-in', id] as const,
};

/** The calls of those who review, one each. */
export const fetchTable = (id: string) => api.get(`${assigned(id)}/table`, peopleTableSchema);
export const tableFile = (id: string) => `/api${assigned(id)}/table.csv`;
export const sendBack = (id: string, body: { people: readonly string[]; note: string }) =>
  api.post(`${assigned(id)}/send-back`, body, peopleTableSchema);
export const fetchHandIn = (id: string) => api.get(handIn(id), reviewedHandInSchema);
export const saveReview = (id: string, body: SaveReview) =>
  api.put(`${handIn(id)}/review`, body, reviewedHandInSchema);
