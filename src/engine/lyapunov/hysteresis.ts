import type { ExtremesResult, ExtremesSweep } from './contract';

/** Extremes differ where they are apart by more than this share of the range over the whole sweep. */
const APART = 0.02;

/**
 * Stretches of the parameter where the long run upward and downward differ: from the first to the last value in
 * a row at which an extreme of any quantity is elsewhere. Values at which either had not settled neither begin
 * nor end a stretch. Empty unless both directions are whole.
 */
export function findHysteresis(sweeps: readonly ExtremesSweep[]): ExtremesResult['hysteresis'] {
  const upward = sweeps.find(({ direction }) => direction === 'upward');
  const downward = sweeps.find(({ direction }) => direction === 'downward');
  if (!upward || upward.parameters.length !== downward?.parameters.length) return [];
  const count = upward.parameters.length;
  const scale = scaleOf([upward, downward]);
  const stretches: { from: number; to: number }[] = [];
  let open = false;
  for (let k = 0; k < count; k += 1) {
    // Downward rows run the other way.
    const back = count - 1 - k;
    if (upward.settled[k] !== 1 || downward.settled[back] !== 1) continue;
    if (!differ(upward, k, downward, back, scale)) {
      open = false;
      continue;
    }
    const value = upward.parameters[k];
    if (open) stretches[stretches.length - 1].to = value;
    else stretches.push({ from: value, to: value });
    open = true;
  }
  return stretches;
}

function differ(a: ExtremesSweep, k: number, b: ExtremesSweep, l: number, scale: Float64Array): boolean {
  const m = a.quantities.length;
  for (let q = 0; q < m; q += 1) {
    const slack = APART * scale[q];
    if (Math.abs(a.lowest[k * m + q] - b.lowest[l * m + q]) > slack) return true;
    if (Math.abs(a.highest[k * m + q] - b.highest[l * m + q]) > slack) return true;
  }
  return false;
}

/** Range of each quantity over all values of both directions. */
function scaleOf(sweeps: readonly ExtremesSweep[]): Float64Array {
  const m = sweeps[0].quantities.length;
  return Float64Array.from({ length: m }, (_, q) => {
    let low = Infinity;
    let high = -Infinity;
    for (const { lowest, highest, parameters } of sweeps)
      for (let k = 0; k < parameters.length; k += 1) {
        if (Number.isNaN(lowest[k * m + q])) continue;
        low = Math.min(low, lowest[k * m + q]);
        high = Math.max(high, highest[k * m + q]);
      }
    return Math.max(high - low, Number.MIN_VALUE);
  });
}
