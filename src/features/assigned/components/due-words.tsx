import { describeDue, formatDue, isPast } from '@/lib/due';

/** When it is due, in the zone in which it was set; and, while it matters, how far off that is. */
export function DueWords({
  dueAt,
  timeZone,
  open,
}: {
  readonly dueAt: string | null;
  readonly timeZone: string;
  readonly open: boolean;
}) {
  if (dueAt === null) return <span className="text-muted">no due date yet</span>;
  return (
    <span className={open && isPast(dueAt) ? 'text-caution' : 'text-muted'}>
      due {formatDue(dueAt, timeZone)}
      {open ? `, ${describeDue(dueAt)}` : ''}
    </span>
  );
}
