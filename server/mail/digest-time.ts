const QUARTER = 15 * 60_000;
/** Two days of quarters: a day on which the hour is left out by a change of clocks is passed over. */
const FURTHEST = 2 * 24 * 4;

/** The next moment, after `now`, at which clocks of a time zone strike an hour. Every offset in use is whole quarters. */
export function nextStrike(now: Date, hour: number, timeZone: string): Date {
  const clock = new Intl.DateTimeFormat('en-GB', {
    timeZone,
    hour: '2-digit',
    minute: '2-digit',
    hourCycle: 'h23',
  });
  const wanted = `${String(hour).padStart(2, '0')}:00`;
  const first = (Math.floor(now.getTime() / QUARTER) + 1) * QUARTER;
  for (let step = 0; step < FURTHEST; step += 1) {
    const moment = new Date(first + step * QUARTER);
    if (clock.format(moment) === wanted) return moment;
  }
  return new Date(first + FURTHEST * QUARTER);
}
