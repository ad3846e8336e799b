/** What the exponents of a solution, with their uncertainty, say of what it is. */
export interface ExponentEvidence {
  /** Falling. */
  readonly exponents: ArrayLike<number>;
  /** Half-width of a 95 % interval of each. */
  readonly uncertainty: ArrayLike<number>;
  /** Whether every exponent of the system is there, not the leading ones alone. */
  readonly all: boolean;
  /** Mean divergence over the number of states: a rate to measure zeros by where only zeros are given. */
  readonly meanRate: number;
  /** Time over which they were averaged. */
  readonly span: number;
  /** Whether the formulas contain the time; then no exponent stands for the direction of the solution. */
  readonly forced: boolean;
  /** Whether the states moved at all in the last part of the run. */
  readonly moves: boolean;
  /** Populations that went on falling from turn to turn while others moved. */
  readonly fading: readonly string[];
}

export const READING_DEFAULTS = {
  /** An exponent of which less than so many e-foldings were seen is not told from zero. */
  resolvedFoldings: 6,
  /** A zero exponent counts as zero only where it is known this well, relative to the largest rate of all. */
  sharpness: 0.02,
} as const;

export type Sign = 'positive' | 'zero' | 'negative' | 'open';

/**
 * Sign of each exponent as far as it is known: beyond its uncertainty and beyond what the time observed can
 * resolve. `zero` where it is near zero and sharply known, `open` where it is not known well enough.
 */
export function signsOf(evidence: ExponentEvidence): Sign[] {
  const { exponents, uncertainty, span } = evidence;
  let largest = Math.abs(evidence.meanRate);
  for (let j = 0; j < exponents.length; j += 1) largest = Math.max(largest, Math.abs(exponents[j]));
  return Array.from(exponents, (value, j) => {
    const known = Math.max(uncertainty[j], READING_DEFAULTS.resolvedFoldings / span);
    if (value > known) return 'positive';
    if (value < -known) return 'negative';
    return known <= READING_DEFAULTS.sharpness * largest ? 'zero' : 'open';
  });
}

/** The long run in words: rest, cycle, torus, chaos, hyperchaos, or undecided with the reason. */
export function readExponents(evidence: ExponentEvidence): string {
  const signs = signsOf(evidence);
  if (evidence.fading.length > 0)
    return `undecided: ${evidence.fading.join(', ')} fell lower from turn to turn, as near a cycle through saddles, so that no average settles`;
  const positive = signs.filter((one) => one === 'positive').length;
  if (positive > 1) return 'hyperchaos';
  if (positive === 1) return 'chaos';
  if (!evidence.moves && signs[0] === 'negative' && !evidence.forced) return 'rest';
  const open = signs.findIndex((one) => one === 'open');
  if (open >= 0)
    return `undecided: exponent ${open + 1} is not told from zero well enough; a longer run decides`;
  const zeros = signs.filter((one) => one === 'zero').length;
  if (zeros === evidence.exponents.length && evidence.all && (zeros > 1 || evidence.forced))
    return 'undecided: neutral, nothing attracts or repels';
  return evidence.forced ? readForced(zeros) : readFree(zeros, evidence);
}

function readForced(zeros: number): string {
  if (zeros === 0) return 'cycle';
  return zeros === 1 ? 'torus' : `torus of dimension ${zeros + 1}`;
}

function readFree(zeros: number, { moves, all, exponents }: ExponentEvidence): string {
  if (zeros === 0) return 'undecided: still on its way to where it rests; a longer transient decides';
  if (!moves) return 'rest';
  if (zeros === exponents.length && !all) return 'undecided: more exponents are needed';
  if (zeros === 1) return 'cycle';
  return zeros === 2 ? 'torus' : `torus of dimension ${zeros}`;
}

/**
 * Dimension of Kaplan and Yorke: k + (l_1 + ... + l_k) / |l_(k+1)|, k the most leading exponents whose sum is
 * not negative. Exponents read as zero count as zero. Null where one of them is
 * not known well enough, and where those given do not reach so far, as where volumes grow. Source: Kaplan & Yorke, Lecture Notes in Mathematics 730 (1979) 204 (from memory).
 */
export function kaplanYorkeDimension(exponents: ArrayLike<number>, signs: readonly Sign[]): number | null {
  let sum = 0;
  for (let k = 0; k < exponents.length; k += 1) {
    if (Number.isNaN(exponents[k]) || signs[k] === 'open') return null;
    const value = signs[k] === 'zero' ? 0 : exponents[k];
    if (sum + value < 0) return k + sum / -value;
    sum += value;
  }
  return null;
}
