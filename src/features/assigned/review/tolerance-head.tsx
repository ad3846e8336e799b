import { useMutation, useQueryClient } from '@tanstack/react-query';

import type { AssignedBody, Tolerance, WantedFinding } from '@/contract/assigned-sweeps';

import { REVIEW_KEYS } from '../api/review-operations';
import { changeAssigned, SET_KEYS } from '../api/set-operations';
import { ToleranceFields } from '../components/tolerance-fields';

/** A tolerance beneath the name of its finding; what the tool proposes follows when it is changed. */
export function ToleranceHead({
  assigned,
  wanted,
}: {
  readonly assigned: AssignedBody;
  readonly wanted: WantedFinding;
}) {
  const queries = useQueryClient();
  const { id, revision } = assigned;
  const change = useMutation({
    mutationFn: (tolerance: Tolerance) =>
      changeAssigned(id, {
        baseRevision: revision,
        wanted: assigned.wanted.map((one) =>
          one.id === wanted.id && one.kind !== 'reading' ? { ...one, tolerance } : one,
        ),
      }),
    onSuccess: async (fresh) => {
      queries.setQueryData(SET_KEYS.assigned(id), fresh);
      await queries.invalidateQueries({ queryKey: REVIEW_KEYS.table(id) });
      await queries.invalidateQueries({ queryKey: ['assigned', 'hand-in'] });
    },
    onError: () => queries.invalidateQueries({ queryKey: SET_KEYS.assigned(id) }),
  });
  if (wanted.kind === 'reading') return <p className="text-sm text-muted">in words</p>;
  return (
    <div className="grid gap-1 font-normal">
      <ToleranceFields of={wanted.label} tolerance={wanted.tolerance} onChange={change.mutate} />
      {change.error ? (
        <p role="alert" className="max-w-56 text-sm text-caution">
          {change.error.message}
        </p>
      ) : null}
    </div>
  );
}
