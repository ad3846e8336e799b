import type { Eigenvalue, Equilibrium, EquilibriumType } from './contract';
import type { Spectrum } from './spectrum';

/** What eigenvalues with error bounds say of an equilibrium. */
export interface Classification {
  readonly type: EquilibriumType;
  readonly attracts: Equilibrium['attracts'];
  readonly notes: readonly string[];
}

export interface ClassifyEvidence {
  /** Formula of a proven constant of motion that makes this pair of eigenvalues a centre; null without one. */
  readonly provesNeutral: (re: number, im: number) => string | null;
  /** Asked only where a real eigenvalue cannot be told from zero: whether equilibria continue on a curve. */
  readonly isOnCurve: () => boolean;
}

/**
 * Type in words from the signs of the real parts. A sign counts only beyond the bound on the
 * error of its eigenvalue; rounding decides nothing. A pair on the imaginary axis within its bound is
 * `neutral` where a proven constant of motion has an extremum on its plane and nothing else repels, else `indistinguishable
 * from neutral`; one positive real part beyond its bound repels whatever the others are.
 */
export function classify(spectrum: Spectrum, evidence: ClassifyEvidence): Classification {
  const n = spectrum.re.length;
  let positive = 0;
  let negative = 0;
  let pairs = 0;
  let zeros = 0;
  let bound = 0;
  let rotating = false;
  for (let k = 0; k < n; k += 1) {
    const { re, im, error } = spectrum;
    if (Math.abs(im[k]) > error[k]) rotating = true;
    if (re[k] > error[k]) positive += 1;
    else if (re[k] < -error[k]) negative += 1;
    else {
      if (Math.abs(im[k]) > error[k]) pairs += 1;
      else zeros += 1;
      bound = Math.max(bound, error[k]);
    }
  }
  const undecided = pairs + zeros;
  if (undecided === 0) {
    if (positive === 0) return plain(rotating ? 'stable focus' : 'stable node', 'yes');
    if (negative === 0) return plain(rotating ? 'unstable focus' : 'unstable node', 'no');
    return plain(rotating ? 'saddle focus' : 'saddle', 'no');
  }
  const within = `within ${bound.toExponential(1)}, the accuracy reached here`;
  if (zeros > 0 && evidence.isOnCurve())
    return {
      type: 'not isolated',
      attracts: positive > 0 ? 'no' : 'neutral',
      notes: ['One of a whole curve of equilibria: along it nothing pulls back.'],
    };
  if (positive > 0)
    return {
      type:
        negative > 0 ? (rotating ? 'saddle focus' : 'saddle') : rotating ? 'unstable focus' : 'unstable node',
      attracts: 'no',
      notes: [
        `Another eigenvalue cannot be told from the imaginary axis (${within}); it repels all the same.`,
      ],
    };
  const proof = zeros === 0 && pairs === 2 ? provenCentre(spectrum, evidence) : null;
  if (proof !== null)
    return {
      type: 'neutral',
      attracts: 'neutral',
      notes: [
        `Orbits near it close and keep the size they start with, since ${proof} never changes along them.`,
      ],
    };
  return {
    type: 'indistinguishable from neutral',
    attracts: 'unknown',
    notes: [
      zeros > 0
        ? `An eigenvalue is zero ${within}: the linear part does not decide. A fold or a branch point lies here or very near.`
        : `The real part of a pair of eigenvalues is zero ${within}: the linear part does not decide, and no constant of motion is proven.`,
    ],
  };
}

function provenCentre(spectrum: Spectrum, evidence: ClassifyEvidence): string | null {
  const k = spectrum.re.findIndex(
    (re, j) => Math.abs(re) <= spectrum.error[j] && spectrum.im[j] > spectrum.error[j],
  );
  return k < 0 ? null : evidence.provesNeutral(spectrum.re[k], spectrum.im[k]);
}

function plain(type: EquilibriumType, attracts: 'yes' | 'no'): Classification {
  return { type, attracts, notes: [] };
}

export function eigenvalueList(spectrum: { re: Float64Array; im: Float64Array }): Eigenvalue[] {
  return Array.from(spectrum.re, (re, k) => ({ re, im: spectrum.im[k] }));
}
