/** Wall-clock time of a zone, as `2026-12-01T17:00`, and the instant that it means. */

const MINUTE = 60_000;
/** No time before is meant: it is a year that is still being typed. */
const WALL_TIME = /^[2-9]\d{3}-\d\d-\d\dT\d\d:\d\d$/;

function partsIn(timeZone: string, instant: Date): Record<string, string> {
  const format = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hourCycle: 'h23',
    year: 'numeric',
    month: '2-digit',
    day: '2-digit',
    hour: '2-digit',
    minute: '2-digit',
  });
  return Object.fromEntries(format.formatToParts(instant).map(({ type, value }) => [type, value]));
}

export function toWallTime(iso: string, timeZone: string): string {
  const { year = '', month, day, hour, minute } = partsIn(timeZone, new Date(iso));
  return `${year.padStart(4, '0')}-${month}-${day}T${hour}:${minute}`;
}

/**
 * The instant of a wall-clock time. One that a zone skips in spring is moved on by what was skipped; of one that
 * comes twice in autumn it is the first. Null where it is no time.
 */
export function fromWallTime(wall: string, timeZone: string): string | null {
  const asUtc = WALL_TIME.test(wall) ? Date.parse(`${wall}:00Z`) : NaN;
  if (!Number.isFinite(asUtc)) return null;
  const offsetAt = (instant: number) =>
    Date.parse(`${toWallTime(new Date(instant).toISOString(), timeZone)}:00Z`) - instant;
  // A day on either side lies beyond any change of the clocks; the two offsets are the candidates.
  const [before, after] = [offsetAt(asUtc - 24 * 60 * MINUTE), offsetAt(asUtc + 24 * 60 * MINUTE)];
  const fits = [asUtc - before, asUtc - after].find((instant) => instant + offsetAt(instant) === asUtc);
  return new Date(fits ?? asUtc - before).toISOString();
}

export function ownTimeZone(): string {
  return new Intl.DateTimeFormat().resolvedOptions().timeZone;
}

/** Every zone that the browser knows, and one that it does not list but that is in use. */
export function timeZones(inUse: string): readonly string[] {
  const known = Intl.supportedValuesOf('timeZone');
  return known.includes(inUse) ? known : [inUse, ...known];
}
