import type { CycleSpecialKind, CycleSpecialPoint } from './contract';
import type { CyclePoint } from './cycle-curve';
import type { CycleExtremes } from './cycle-extremes';
import type { CycleSystem } from './cycle-system';
import { isUpright } from './locate-cycle';

/** Modulus beyond which a multiplier besides the crossing one counts as growing. */
const CLEARLY = 1e-4;

interface Described {
  readonly id: string;
  readonly branch: number;
  readonly index: number;
  readonly accuracy: number;
  readonly extremes: CycleExtremes;
  readonly feasible: boolean;
  /** Why the point is what it is, where the branch knows more than the multipliers. */
  readonly note: string | null;
}

/** A special point of a branch of cycles with its meaning in a sentence. */
export function describeCyclePoint(
  cycles: CycleSystem,
  kind: CycleSpecialKind,
  point: CyclePoint,
  { extremes, note, ...rest }: Described,
): CycleSpecialPoint {
  const angle = kind === 'torus' ? angleOf(point) : null;
  return {
    ...rest,
    kind,
    parameter: point.orbit.parameter,
    period: point.period,
    multipliers: allMultipliers(point),
    lowest: extremes.lowest,
    highest: extremes.highest,
    angle,
    meaning: [note ?? MEANING[kind](point, angle, cycles.forced), kinkNote(cycles)].filter(Boolean).join(' '),
  };
}

/** All multipliers, the trivial one first where there is one. */
export function allMultipliers({ floquet }: CyclePoint): CycleSpecialPoint['multipliers'] {
  return floquet.trivial === null
    ? floquet.nontrivial
    : [{ re: floquet.trivial, im: 0 }, ...floquet.nontrivial];
}

/** Angle of the pair nearest to the unit circle. */
function angleOf({ floquet }: CyclePoint): number | null {
  let least = Infinity;
  let angle: number | null = null;
  floquet.nontrivial.forEach(({ re, im }, k) => {
    const size = Math.abs(floquet.logModuli[k]);
    if (im > 0 && size < least) [least, angle] = [size, Math.atan2(im, re)];
  });
  return angle;
}

/** Whether other multipliers than the one (or the pair) that crosses lie outside the unit circle. */
function othersGrow({ floquet }: CyclePoint, crossing: number): boolean {
  const sizes = floquet.logModuli.map(Math.abs).sort((a, b) => a - b);
  const limit = sizes[crossing - 1] ?? 0;
  return floquet.logModuli.some((log) => log > Math.max(CLEARLY, limit));
}

type Meaning = (point: CyclePoint, angle: number | null, forced: boolean) => string;

const MEANING: Readonly<Record<CycleSpecialKind, Meaning>> = {
  'fold of cycles': (point) =>
    othersGrow(point, 1)
      ? `Two repelling cycles of period ${digits(point.period)} meet here and vanish.`
      : `An attracting and a repelling cycle of period ${digits(point.period)} meet here and vanish; past this point the run jumps to another attractor.`,
  'period doubling': (point) =>
    `A multiplier passes -1: a cycle of twice the period, near ${digits(2 * point.period)}, branches off${
      othersGrow(point, 1) ? ', from a cycle that repels in another direction on both sides.' : '.'
    }`,
  torus: (point, angle) => {
    const second = angle === null ? '' : ` of about ${digits((2 * Math.PI * point.period) / angle)}`;
    return `A pair of multipliers leaves the unit circle: a second period${second} joins that of the cycle, and the run winds around a torus${
      othersGrow(point, 2) ? ', though the cycle repels in another direction on both sides.' : '.'
    }`;
  },
  'branch point of cycles': (point) =>
    isUpright(point)
      ? `Cycles of all sizes lie at this one value; at period ${digits(point.period)} a branch leaves the family.`
      : `A multiplier passes 1 where the branch does not turn: another branch of cycles crosses this one at period ${digits(point.period)}.`,
};

function kinkNote({ system }: CycleSystem): string {
  return system.smooth
    ? ''
    : 'The model has a kink (min, max, abs or a conditional): where the cycle crosses it, normal forms do not exist and are withheld.';
}

function digits(value: number): string {
  return Number(value.toPrecision(5)).toString();
}
