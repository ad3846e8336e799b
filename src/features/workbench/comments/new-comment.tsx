import { useState } from 'react';

import { CheckField } from '@/components/fields/check-field';
import { Button } from '@/components/ui/button';
import { formatNumber } from '@/graphics/numbers';

import { isDirty } from '../dialogs/saving-rules';
import { useWorkbench } from '../state/store';
import { writeComment } from './api/comment-operations';
import { useCommentsUi } from './comments-ui';
import { Composer } from './composer';
import { textKey } from './kept-text';
import { useCommentChanges } from './use-comment-changes';

/** Begins a thread: on the preset, on the version at hand, or on the point that was chosen. */
export function NewComment({
  presetId,
  userId,
  version,
}: {
  readonly presetId: string;
  readonly userId: string;
  readonly version: number;
}) {
  const { run, busy, error } = useCommentChanges(presetId);
  const { pin, set } = useCommentsUi();
  const dirty = useWorkbench(isDirty);
  const [onVersion, setOnVersion] = useState(false);
  return (
    <div className="grid gap-2">
      {pin ? (
        <p className="flex flex-wrap items-center gap-2 text-sm">
          <span>
            On the {pin.model === 'twin' ? 'pooled ' : ''}
            {pin.kind} at {pin.parameter} = <span className="figures">{formatNumber(pin.value, 4)}</span>,
            version {version}
            {dirty ? ', with changes that are not saved' : ''}
          </span>
          <Button size="small" look="quiet" onClick={() => set({ pin: null })}>
            Not on this point
          </Button>
        </p>
      ) : (
        <CheckField label={`On version ${version} alone`} checked={onVersion} onChange={setOnVersion} />
      )}
      <Composer
        key={pin ? `${pin.kind} ${pin.value}` : 'whole'}
        focus={pin !== null}
        presetId={presetId}
        label="New comment"
        action="Comment"
        keptAs={textKey(userId, presetId, 'new')}
        busy={busy}
        error={error}
        onSend={(text, sent) =>
          run(
            () => writeComment(presetId, { text, version: pin || onVersion ? version : null, pin }),
            () => {
              sent();
              set({ pin: null, filter: 'open', thread: null });
            },
          )
        }
      />
    </div>
  );
}
