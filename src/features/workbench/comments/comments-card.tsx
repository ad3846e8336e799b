import { useEffect, useRef } from 'react';
import { useSearchParams } from 'react-router-dom';

import { Button } from '@/components/ui/button';
import { plural } from '@/lib/format';
import { part } from '@/lib/part';
import { useSession } from '@/lib/session';

import { Card } from '../findings/card';
import { useWorkbench } from '../state/store';
import { useCommentsUi } from './comments-ui';
import { useOpenCount } from './use-open-count';

const CommentsPanel = part(() => import('./comments-panel'));

type Preset = { readonly id: string; readonly version: number; readonly mayComment: boolean };

function CardOfPreset({ id, version, mayComment }: Preset) {
  const { open, thread, pin, set } = useCommentsUi();
  const [parameters] = useSearchParams();
  const asked = parameters.get('comment');
  const card = useRef<HTMLDivElement>(null);
  const user = useSession().data?.user;
  const count = useOpenCount();
  useEffect(() => {
    const place = `${id} ${asked ?? ''}`;
    // A card that comes back, in a sheet for instance, is as it was left.
    if (useCommentsUi.getState().place !== place)
      set({ place, open: asked !== null, thread: asked, pin: null, filter: 'open' });
  }, [asked, id, set]);
  useEffect(() => {
    if (open) card.current?.scrollIntoView({ block: 'nearest' });
  }, [open, thread, pin]);
  if (!user) return null;
  return (
    <div ref={card}>
      <Card
        title="Comments"
        aside={
          <Button size="small" look="quiet" aria-expanded={open} onClick={() => set({ open: !open })}>
            {open ? 'Close' : count > 0 ? plural(count, 'open thread') : 'Open'}
          </Button>
        }
      >
        {open ? (
          <CommentsPanel
            presetId={id}
            userId={user.id}
            version={version}
            mayComment={mayComment}
            fallback={<p role="status">Reading the comments…</p>}
          />
        ) : null}
      </Card>
    </div>
  );
}

/** What people say about the preset on the bench; starters and shared presets have no comments. */
export function CommentsCard() {
  const origin = useWorkbench((state) => state.origin);
  if (origin.kind !== 'preset' || origin.starter) return null;
  const { id, version, rights } = origin;
  return <CardOfPreset id={id} version={version} mayComment={rights.includes('comment')} />;
}
