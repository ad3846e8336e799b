import { activityPageSchema } from '@/contract/activity';
import { api } from '@/lib/api-client';

export function listActivity(id: string, page: number) {
  return api.get(`/presets/${encodeURIComponent(id)}/activity?page=${page}`, activityPageSchema);
}
