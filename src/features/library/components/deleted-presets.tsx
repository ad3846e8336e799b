import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';

import { Button } from '@/components/ui/button';
import { formatDay } from '@/lib/format';

import { bringBackPreset, useDeletedPresets } from '../api/deleted-presets';

/** Presets that can still be brought back, and until when. Read from the server once it is opened. */
export function DeletedPresets() {
  const [open, setOpen] = useState(false);
  const deleted = useDeletedPresets(open);
  const queries = useQueryClient();
  const bringBack = useMutation({
    mutationFn: bringBackPreset,
    onSuccess: () => queries.invalidateQueries({ queryKey: ['presets'] }),
  });
  return (
    <details onToggle={(event) => setOpen(event.currentTarget.open)}>
      <summary className="cursor-pointer text-muted">Deleted presets</summary>
      {bringBack.error ? (
        <p role="alert" className="mt-2 text-caution">
          {bringBack.error.message}
        </p>
      ) : null}
      {deleted.error ? (
        <p role="alert" className="mt-2 text-caution">
          {deleted.error.message}
        </p>
      ) : null}
      {deleted.data?.items.length === 0 ? (
        <p className="mt-2 text-muted">None. What is deleted stays here for 30 days.</p>
      ) : null}
      <ul className="mt-2 grid gap-2">
        {deleted.data?.items.map((one) => (
          <li
            key={one.id}
            className="flex flex-wrap items-center gap-x-4 gap-y-1 rounded-lg border bg-raised px-3 py-2"
          >
            <span className="font-medium">{one.title}</span>
            <span className="text-sm text-muted">
              {one.owner}, deleted {formatDay(one.deletedAt)}, gone for good on {formatDay(one.goneAt)}
            </span>
            <span className="ml-auto">
              <Button onClick={() => bringBack.mutate(one.id)} aria-label={`Bring back ${one.title}`}>
                Bring back
              </Button>
            </span>
          </li>
        ))}
      </ul>
    </details>
  );
}
