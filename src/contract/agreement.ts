import type { GivenFinding, Proposal, ReferenceFinding, Tolerance, WantedFinding } from './assigned-sweeps';

const shown = (value: number) => String(Number(value.toPrecision(6)));

/** Largest difference that still agrees; a relative one is a share of the reference, whatever its sign. */
export function allowance(tolerance: Tolerance, reference: number): number {
  return tolerance.kind === 'absolute' ? tolerance.amount : tolerance.amount * Math.abs(reference);
}

/** Room for the rounding of a decimal that lies on the very edge of its tolerance. */
const ROUNDING = 1e-12;

/**
 * What the tool proposes for one finding: `agrees` when |given - reference| is within the tolerance and, for a
 * point pinned from a sweep, when its kind and its model are those asked for. Readings in words are left to people.
 */
export function proposeJudgement(
  wanted: WantedFinding,
  reference: ReferenceFinding | undefined,
  given: GivenFinding | undefined,
): Proposal {
  if (wanted.kind === 'reading')
    return {
      judgement: null,
      reason: given?.text.trim() ? 'A reading is judged by a person.' : 'Nothing was given.',
    };
  if (!given || given.value === null)
    return given?.text.trim()
      ? { judgement: null, reason: 'Words were given instead of a number; they are judged by a person.' }
      : { judgement: null, reason: 'Nothing was given.' };
  if (!reference || reference.value === null)
    return { judgement: null, reason: 'There is no reference value to compare with.' };
  if (wanted.kind === 'special point' && given.pin) {
    if (given.pin.kind !== wanted.point)
      return {
        judgement: 'differs',
        reason: `A ${given.pin.kind} was pinned where a ${wanted.point} is wanted.`,
      };
    if (given.pin.of !== wanted.of)
      return {
        judgement: 'differs',
        reason:
          wanted.of === 'split' ? 'It was pinned on the pooled twin.' : 'It was pinned on the split model.',
      };
  }
  const difference = Math.abs(given.value - reference.value);
  const allowed = allowance(wanted.tolerance, reference.value);
  const scale = Math.max(Math.abs(given.value), Math.abs(reference.value));
  const within = difference <= allowed + ROUNDING * scale;
  return {
    judgement: within ? 'agrees' : 'differs',
    reason: `${shown(given.value)} against ${shown(reference.value)}: ${shown(difference)} apart, ${shown(allowed)} allowed.`,
  };
}
