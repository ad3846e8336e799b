import { MessageSquarePlus } from 'lucide-react';

import { useWorkbench } from '../state/store';
import type { SpecialPointRow } from '../findings/special-point-rows';
import { useCommentsUi } from './comments-ui';
import { pinOf } from './points';

/** Begins a comment on a special point, where one may comment. */
export function CommentOnPoint({
  row,
  parameter,
}: {
  readonly row: SpecialPointRow;
  readonly parameter: string;
}) {
  const may = useWorkbench(({ origin }) => origin.kind === 'preset' && origin.rights.includes('comment'));
  const pin = pinOf(row, parameter);
  if (!may || pin === null) return null;
  return (
    <button
      type="button"
      className="flex items-center gap-1 rounded text-left text-xs text-accent hover:underline"
      onClick={() => useCommentsUi.getState().set({ open: true, thread: null, pin })}
    >
      <MessageSquarePlus size={12} aria-hidden /> Comment on this point
    </button>
  );
}
