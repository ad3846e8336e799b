import {
  commentPageSchema,
  commentPeopleSchema,
  threadSchema,
  type CommentQuery,
  type WriteComment,
} from '@/contract/comments';
import { api } from '@/lib/api-client';

const commentsOf = (presetId: string) => `/presets/${encodeURIComponent(presetId)}/comments`;
const one = (presetId: string, id: string) => `${commentsOf(presetId)}/${encodeURIComponent(id)}`;

export function listComments(presetId: string, { state, thread, page }: CommentQuery) {
  const query = new URLSearchParams({ state, page: String(page), ...(thread ? { thread } : {}) });
  return api.get(`${commentsOf(presetId)}?${query.toString()}`, commentPageSchema);
}

export function listPeople(presetId: string) {
  return api.get(`${commentsOf(presetId)}/people`, commentPeopleSchema);
}

export function writeComment(presetId: string, body: WriteComment) {
  return api.post(commentsOf(presetId), body, threadSchema);
}

export function editComment(presetId: string, id: string, body: { text: string; revision: number }) {
  return api.patch(one(presetId, id), body, threadSchema);
}

export function deleteComment(presetId: string, id: string) {
  return api.delete(one(presetId, id));
}

export function resolveThread(presetId: string, id: string, resolved: boolean) {
  return api.put(`${one(presetId, id)}/resolved`, { resolved }, threadSchema);
}
