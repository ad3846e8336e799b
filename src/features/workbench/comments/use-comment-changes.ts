import { useMutation, useQueryClient } from '@tanstack/react-query';

import { ApiError } from '@/lib/api-client';

import { errorWords } from '../dialogs/error-words';

/** Runs changes of comments one at a time, and reads the list again after each, refused ones too. */
export function useCommentChanges(presetId: string) {
  const queries = useQueryClient();
  const change = useMutation({
    mutationFn: (work: () => Promise<unknown>) => work(),
    onSettled: () => queries.invalidateQueries({ queryKey: ['comments', presetId] }),
  });
  const { error } = change;
  const words =
    error === null
      ? null
      : error instanceof ApiError
        ? (error.fields.text ?? errorWords(error))
        : errorWords(error);
  return {
    busy: change.isPending,
    error: words,
    run: (work: () => Promise<unknown>, done?: () => void) =>
      change.mutate(work, done ? { onSuccess: () => done() } : {}),
  };
}
