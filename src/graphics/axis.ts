/** Scales and ticks of one axis. */
import { scaleLinear, scaleLog } from 'd3-scale';

import { formatShort } from './numbers';

export interface AxisSpec {
  readonly name: string;
  readonly unit: string;
  readonly logarithm: boolean;
  readonly domain: readonly [number, number];
}

export interface AxisScale {
  (value: number): number;
  invert(pixel: number): number;
}

export function axisLabel(axis: { readonly name: string; readonly unit: string }): string {
  return axis.unit && axis.unit !== '1' ? `${axis.name} (${axis.unit})` : axis.name;
}

/** Maps the domain to pixels; values without a logarithm become NaN. */
export function createScale(axis: AxisSpec, range: readonly [number, number]): AxisScale {
  const [from, to] = axis.domain;
  if (axis.logarithm && from > 0 && to > 0) {
    const scale = scaleLog([from, to], [...range]);
    return Object.assign((value: number) => (value > 0 ? scale(value) : NaN), {
      invert: (pixel: number) => scale.invert(pixel),
    });
  }
  const scale = scaleLinear([from, to], [...range]);
  return Object.assign((value: number) => scale(value), { invert: (pixel: number) => scale.invert(pixel) });
}

export interface Tick {
  readonly value: number;
  readonly label: string;
}

/** Powers of ten within a range whose exponents are multiples of `every`. */
function powersOfTen(from: number, to: number, every: number): readonly number[] {
  const first = Math.ceil(Math.log10(from) / every - 1e-9);
  const last = Math.floor(Math.log10(to) / every + 1e-9);
  return Array.from({ length: Math.max(0, last - first + 1) }, (_value, k) =>
    Number(`1e${(first + k) * every}`),
  );
}

/** About `count` round values; on a logarithmic axis whole powers of ten where there are enough. */
export function axisTicks(axis: AxisSpec, count: number): readonly Tick[] {
  const [from, to] = axis.domain;
  if (axis.logarithm && from > 0 && to > 0) {
    const decades = Math.log10(to / from);
    const kept =
      decades >= 2
        ? powersOfTen(from, to, Math.max(1, Math.ceil(decades / Math.max(2, count))))
        : scaleLog([from, to], [0, 1]).ticks(Math.max(2, count));
    return kept.map((value) => ({ value, label: formatShort(value, 3) }));
  }
  const values = scaleLinear([from, to], [0, 1]).ticks(Math.max(2, count));
  return values.map((value) => ({ value, label: formatShort(value, 6) }));
}

/** Decades that a logarithmic axis reaches down from its highest value, unless told. */
const DECADES = 14;

/** Widens an empty or degenerate extent, and leaves room at its ends. */
export function paddedDomain(
  low: number,
  high: number,
  options: {
    readonly logarithm: boolean;
    readonly fromZero?: boolean;
    readonly pad?: number;
    readonly decades?: number;
  },
): [number, number] {
  const pad = options.pad ?? 0.05;
  if (!Number.isFinite(low) || !Number.isFinite(high)) return options.logarithm ? [0.1, 10] : [0, 1];
  if (options.logarithm) {
    const floor = Math.max(low, high * 10 ** -(options.decades ?? DECADES), Number.MIN_VALUE * 1e16);
    if (!(high > 0)) return [0.1, 10];
    const room = high / floor > 1.0001 ? (high / floor) ** pad : 2;
    return [floor / room, high * room];
  }
  const start = options.fromZero && low >= 0 ? 0 : low;
  const size = high - start || Math.abs(high) || 1;
  return [start === 0 && low >= 0 ? 0 : start - size * pad, high + size * pad];
}
