import type { KeptModel, KeptPoint, KeptSweep } from '@/contract/kept-sweep';
import { formatNumber } from '@/graphics/numbers';
import { plural } from '@/lib/format';

/** A special point comes out again where it differs by no more than this share of its value. */
const SAME = 1e-6;
/** Points of a kind that lie farther apart than this share of the range are not the same one moved. */
const NEAR = 0.1;

export interface Comparison {
  /** Special points of the one that came out again. */
  readonly same: number;
  /** Those that came out elsewhere, in words. */
  readonly moved: readonly string[];
  /** Largest difference of all that came out, as a share of the value. */
  readonly largest: number;
  readonly missing: readonly string[];
  readonly added: readonly string[];
}

interface Pair {
  readonly before: KeptPoint;
  readonly after: KeptPoint;
  readonly distance: number;
}

const MODELS = { split: 'split model', twin: 'pooled twin' } as const;

const nameOf = ({ kind, parameter }: KeptPoint, of: keyof typeof MODELS) =>
  `${kind} at ${formatNumber(parameter, 6)} of the ${MODELS[of]}`;

/** Pairs points of one kind, nearest first, each at most once. */
function pairPoints(before: KeptModel, after: KeptModel, width: number): readonly Pair[] {
  const candidates = before.points
    .flatMap((one) =>
      after.points
        .filter(({ kind }) => kind === one.kind)
        .map((other) => ({
          before: one,
          after: other,
          distance: Math.abs(one.parameter - other.parameter),
        })),
    )
    .filter(({ distance }) => distance <= NEAR * width)
    .sort((a, b) => a.distance - b.distance);
  const taken = new Set<KeptPoint>();
  return candidates.filter((pair) => {
    if (taken.has(pair.before) || taken.has(pair.after)) return false;
    taken.add(pair.before).add(pair.after);
    return true;
  });
}

/** Whether the special points of a kept sweep come out of another run of it. */
export function compareSweeps(before: KeptSweep, after: KeptSweep): Comparison {
  const width = before.range.to - before.range.from;
  let [same, largest] = [0, 0];
  const moved: string[] = [];
  const missing: string[] = [];
  const added: string[] = [];
  for (const of of ['split', 'twin'] as const) {
    const [one, other] = [before[of], after[of]];
    if (!one || !other) continue;
    const pairs = pairPoints(one, other, width);
    for (const pair of pairs) {
      // Near zero a share of the value means nothing; there it is one of the range.
      const share = pair.distance / Math.max(Math.abs(pair.before.parameter), SAME * width);
      largest = Math.max(largest, share);
      if (share <= SAME) same += 1;
      else moved.push(`${nameOf(pair.before, of)}, now at ${formatNumber(pair.after.parameter, 6)}`);
    }
    const left = new Set(pairs.flatMap((pair) => [pair.before, pair.after]));
    missing.push(...one.points.filter((point) => !left.has(point)).map((point) => nameOf(point, of)));
    added.push(...other.points.filter((point) => !left.has(point)).map((point) => nameOf(point, of)));
  }
  return { same, largest, moved, missing, added };
}

/** What a replay says of a sweep that was handed in. */
export function compareWords({ same, largest, moved, missing, added }: Comparison): readonly string[] {
  const total = same + moved.length + missing.length;
  const apart =
    same + moved.length === 0
      ? ''
      : largest === 0
        ? ' They are equal to the last digit that is kept.'
        : ` The largest relative difference is ${formatNumber(largest, 2)}.`;
  const first =
    total === 0
      ? 'No special point was handed in.'
      : same === total
        ? `${total === 1 ? 'The special point comes' : `All ${total} special points come`} out again.${apart}`
        : `${same} of ${plural(total, 'special point')} ${same === 1 ? 'comes' : 'come'} out again.${apart}`;
  return [
    first,
    ...(moved.length > 0 ? [`Elsewhere: ${moved.join('; ')}.`] : []),
    ...(missing.length > 0 ? [`Not found again: ${missing.join('; ')}.`] : []),
    ...(added.length > 0 ? [`Found now and not handed in: ${added.join('; ')}.`] : []),
  ];
}
