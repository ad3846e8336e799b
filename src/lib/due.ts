/** When work is due, in the zone in which it was set, and how far off that is. */

export function formatDue(iso: string, timeZone: string): string {
  return new Intl.DateTimeFormat('en-GB', {
    weekday: 'short',
    day: 'numeric',
    month: 'short',
    year: 'numeric',
    hour: '2-digit',
    minute: '2-digit',
    timeZone,
    timeZoneName: 'short',
  }).format(new Date(iso));
}

const MINUTE = 60_000;
const STEPS = [
  { unit: 'day', length: 24 * 60 * MINUTE, from: 48 * 60 * MINUTE },
  { unit: 'hour', length: 60 * MINUTE, from: 120 * MINUTE },
  { unit: 'minute', length: MINUTE, from: 0 },
] as const;

/** `in 3 days`, `2 hours ago`: whole steps, never rounded up past the time itself. */
export function describeDue(iso: string, now = new Date()): string {
  const left = new Date(iso).getTime() - now.getTime();
  const distance = Math.abs(left);
  const step = STEPS.find(({ from }) => distance >= from) ?? STEPS[2];
  const count = Math.trunc(left / step.length);
  if (count === 0) return left >= 0 ? 'in less than a minute' : 'just now';
  return new Intl.RelativeTimeFormat('en-GB').format(count, step.unit);
}

export function isPast(iso: string, now = new Date()): boolean {
  return new Date(iso).getTime() < now.getTime();
}
