import type { CompiledSystem } from '../system/contract';
import type { StateBox } from './box';
import { faceProblem, type Face } from './face-system';

/**
 * Equilibria on a face with one free state: the rate is sampled along the line, each change of sign is
 * bisected, and where the rate turns back just before zero (two equilibria about to meet) the turning
 * point is found, with an equilibrium on either side of it or, as a start, itself. Finer than any multi-start: pairs are missed only when closer than
 * the sampling. Returns start points, not yet polished.
 */
export const LINE_SCAN_DEFAULTS = { linear: 400, byMagnitude: 400, decadesDown: 6, decadesUp: 3 } as const;

export function scanLine(system: CompiledSystem, face: Face, box: StateBox): Float64Array[] {
  const problem = faceProblem(system, face, face.ownZero[0]);
  const point = new Float64Array(1);
  const value = new Float64Array(1);
  const rate = (x: number): number => {
    point[0] = x;
    problem.residual(point, value);
    return value[0];
  };
  const xs = samples(system, face, box);
  const fs = xs.map(rate);
  const starts: Float64Array[] = [];
  for (let k = 0; k < xs.length; k += 1) {
    if (fs[k] === 0) starts.push(Float64Array.of(xs[k]));
    if (k === 0) continue;
    if (fs[k - 1] * fs[k] < 0) starts.push(Float64Array.of(bisect(rate, xs[k - 1], xs[k], fs[k - 1])));
    const after = fs[k + 1];
    const isLowest = Math.abs(fs[k]) < Math.abs(fs[k - 1]) && Math.abs(fs[k]) <= Math.abs(after ?? Infinity);
    if (!isLowest || fs[k - 1] * fs[k] <= 0 || (after !== undefined && fs[k] * after <= 0)) continue;
    const low = xs[k - 1];
    const high = xs[Math.min(k + 1, xs.length - 1)];
    const turn = turningPoint(rate, low, high, Math.sign(fs[k]));
    if (rate(turn) * fs[k] < 0) {
      starts.push(Float64Array.of(bisect(rate, low, turn, fs[k])));
      starts.push(Float64Array.of(bisect(rate, turn, high, -fs[k])));
    } else starts.push(Float64Array.of(turn));
  }
  return starts;
}

function samples(system: CompiledSystem, face: Face, box: StateBox): number[] {
  const i = face.free[0];
  const { linear, byMagnitude, decadesDown, decadesUp } = LINE_SCAN_DEFAULTS;
  const from = box.from[i];
  const to = box.to[i];
  const xs: number[] = [];
  // Off the round numbers, so that a zero at the middle or an end is bracketed rather than hit.
  for (let k = 0; k <= linear; k += 1) xs.push(from + ((k + 0.0137) / (linear + 0.0274)) * (to - from));
  if (!box.open[i]) xs.push(from, to);
  const up = box.open[i] ? decadesUp : 0;
  for (let k = 0; k <= byMagnitude; k += 1) {
    const size = 10 ** (-decadesDown + (k / byMagnitude) * (decadesDown + up));
    const above = size * Math.abs(to);
    if (above >= from && (box.open[i] || above <= to)) xs.push(above);
    const below = -size * Math.abs(from);
    if (!system.nonnegative[i] && (box.open[i] || (below >= from && below <= to))) xs.push(below);
  }
  return [...new Set(xs)].sort((a, b) => a - b);
}

function bisect(rate: (x: number) => number, low: number, high: number, atLow: number): number {
  let a = low;
  let b = high;
  for (let k = 0; k < 80; k += 1) {
    const middle = (a + b) / 2;
    if (middle === a || middle === b) break;
    const f = rate(middle);
    if (f === 0) return middle;
    if (f * atLow > 0) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

/** Where sign * rate is smallest in an interval, by golden section; stops once it has changed sign. */
function turningPoint(rate: (x: number) => number, low: number, high: number, sign: number): number {
  const golden = (Math.sqrt(5) - 1) / 2;
  let a = low;
  let b = high;
  for (let k = 0; k < 70 && b - a > 1e-15 * Math.abs(b); k += 1) {
    const left = b - golden * (b - a);
    const right = a + golden * (b - a);
    const atLeft = sign * rate(left);
    const atRight = sign * rate(right);
    if (atLeft < 0) return left;
    if (atRight < 0) return right;
    if (atLeft < atRight) b = right;
    else a = left;
  }
  return (a + b) / 2;
}
