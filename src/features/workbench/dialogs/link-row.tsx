import { useState } from 'react';

import { Button } from '@/components/ui/button';
import type { ShareLink } from '@/contract/presets';
import { formatDay, formatDayAndTime, plural } from '@/lib/format';

/** What has become of a link: revoked, ended, or when it will end. */
function fate({ revokedAt, expiresAt }: ShareLink, now: number): 'revoked' | 'ended' | null {
  if (revokedAt) return 'revoked';
  return expiresAt && Date.parse(expiresAt) <= now ? 'ended' : null;
}

function words(link: ShareLink, ended: boolean): string {
  const { createdAt, opened, lastOpenedAt, revokedAt, expiresAt, access } = link;
  return [
    access === 'view' ? 'view only' : 'copy allowed',
    `made ${formatDay(createdAt)}`,
    `opened ${plural(opened, 'time')}${lastOpenedAt ? `, last ${formatDayAndTime(lastOpenedAt)}` : ''}`,
    revokedAt ? `revoked ${formatDay(revokedAt)}` : '',
    expiresAt && !revokedAt ? `${ended ? 'ended' : 'ends'} ${formatDayAndTime(expiresAt)}` : '',
  ]
    .filter(Boolean)
    .join(', ');
}

/** One link to a preset, with what is known of its use. */
export function LinkRow({
  link,
  busy,
  onRevoke,
}: {
  readonly link: ShareLink;
  readonly busy: boolean;
  readonly onRevoke: () => void;
}) {
  const [now] = useState(() => Date.now());
  const over = fate(link, now);
  return (
    <li className="flex items-center justify-between gap-3 px-3 py-2">
      <span className="min-w-0">
        <span className="block truncate">{link.label || 'Without a label'}</span>
        <span className="text-sm text-muted">{words(link, over === 'ended')}</span>
      </span>
      {over ? (
        <span className="text-sm text-muted">{over}</span>
      ) : (
        <Button
          look="caution"
          size="small"
          disabled={busy}
          onClick={onRevoke}
          aria-label={`Revoke ${link.label || 'this link'}`}
        >
          Revoke
        </Button>
      )}
    </li>
  );
}
