/**
 * Points that fill the unit cube evenly: the additive recurrence x_k = frac(seed shift + k alpha) with
 * alpha_i = 1/phi^(i+1), phi the positive root of phi^(m+1) = phi + 1 (a generalised golden ratio;
 * the one-dimensional case is Kronecker's sequence). Deterministic: the same seed gives the same points.
 */
export function lowDiscrepancyPoint(index: number, seed: number, out: Float64Array): void {
  const m = out.length;
  const phi = generalisedGoldenRatio(m);
  for (let i = 0; i < m; i += 1) {
    const alpha = phi ** -(i + 1);
    const shift = 0.5 + seed * Math.SQRT2 * (i + 1);
    const x = shift + (index + 1) * alpha;
    out[i] = x - Math.floor(x);
  }
}

/** Positive root of phi^(m+1) = phi + 1 by its fixed-point form phi = (1 + phi)^(1/(m+1)). */
function generalisedGoldenRatio(m: number): number {
  let phi = 1.5;
  for (let k = 0; k < 60; k += 1) phi = (1 + phi) ** (1 / (m + 1));
  return phi;
}
