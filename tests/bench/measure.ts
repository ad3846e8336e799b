/** Timing for the bench: rounds, medians, and the shape of a row. */

export interface Row {
  readonly name: string;
  /** Measured, as text with its unit. */
  readonly value: string;
  /** What is aimed for; empty where there is no target. */
  readonly target: string;
  /** Null where there is no target or nothing was measured. */
  readonly met: boolean | null;
}

export interface Timing {
  /** Milliseconds a call. */
  readonly median: number;
  readonly fastest: number;
}

const WARM_CALLS = 3;

/**
 * Time of one call: the fastest of each round, then the median over rounds, so that other work on the
 * machine counts as little as can be. A round calls until `roundMilliseconds` are spent.
 */
export function time(work: () => void, rounds = 7, roundMilliseconds = 60): Timing {
  for (let k = 0; k < WARM_CALLS; k += 1) work();
  const fastest: number[] = [];
  for (let round = 0; round < rounds; round += 1) {
    const end = performance.now() + roundMilliseconds;
    let best = Infinity;
    let now: number;
    do {
      const began = performance.now();
      work();
      now = performance.now();
      best = Math.min(best, now - began);
    } while (now < end);
    fastest.push(best);
  }
  return { median: median(fastest), fastest: Math.min(...fastest) };
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? Number.NaN;
  return sorted.length % 2 === 1 ? upper : (upper + (sorted[middle - 1] ?? Number.NaN)) / 2;
}

export function milliseconds(value: number): string {
  return `${Number(value.toPrecision(3))} ms`;
}

export function times(value: number): string {
  return `${Number(value.toPrecision(3))} x`;
}

export function absent(name: string, why: string, target = ''): Row {
  return { name, value: `absent: ${why}`, target, met: null };
}

/** A row whose value must not exceed a limit. */
export function atMost(name: string, value: number, limit: number, show: (value: number) => string): Row {
  return { name, value: show(value), target: `at most ${show(limit)}`, met: value <= limit };
}

/** A row whose value must reach a limit. */
export function atLeast(name: string, value: number, limit: number, show: (value: number) => string): Row {
  return { name, value: show(value), target: `at least ${show(limit)}`, met: value >= limit };
}

/** A row that is only told. */
export function told(name: string, value: string): Row {
  return { name, value, target: '', met: null };
}
