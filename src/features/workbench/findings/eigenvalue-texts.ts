import type { Eigenvalue } from '@/engine/equilibria/contract';
import { formatComplex } from '@/graphics/numbers';

/** Conjugates are written once, as a pair. */
export function eigenvalueTexts(values: readonly Eigenvalue[]): readonly string[] {
  const texts: string[] = [];
  for (let k = 0; k < values.length; k++) {
    const one = values[k];
    const next = values[k + 1];
    if (!one) continue;
    const scale = Math.hypot(one.re, one.im) || 1;
    const pair =
      one.im !== 0 &&
      next &&
      Math.abs(next.re - one.re) < 1e-9 * scale &&
      Math.abs(next.im + one.im) < 1e-9 * scale;
    texts.push(formatComplex(one.re, one.im, Boolean(pair), 3));
    if (pair) k++;
  }
  return texts;
}
