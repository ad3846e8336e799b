import type { Visit } from './visits';

const quantile = (sorted: readonly number[], share: number) =>
  sorted[Math.min(sorted.length - 1, Math.floor(share * sorted.length))] ?? Number.NaN;

const shown = (milliseconds: number) => `${milliseconds.toFixed(1).padStart(7)} ms`;

/** A line a route: how many, median, 99th percentile, and whether its target was met. */
export function reportLine(visit: Visit, times: readonly number[]): string {
  const sorted = [...times].sort((a, b) => a - b);
  const median = quantile(sorted, 0.5);
  const most = quantile(sorted, 0.99);
  const { target } = visit;
  const met = target === null || (median < target.median && (target.most === null || most < target.most));
  const wanted =
    target === null
      ? ''
      : `(${target.median}${target.most === null ? '' : ` and ${target.most}`} wanted: ${met ? 'met' : 'missed'})`;
  const counted = String(times.length).padStart(6);
  return `  ${visit.name.padEnd(34)}${counted} ${shown(median)} ${shown(most)}  ${wanted}`.trimEnd();
}
