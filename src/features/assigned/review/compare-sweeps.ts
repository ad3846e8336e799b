import type { KeptModel, KeptPoint, KeptSweep } from '@/contract/kept-sweep';
import { formatNumber } from '@/graphics/numbers';
import { plural } from '@/lib/format';

/** A special point that a replay gave again counts as the same within this share of its value. */
const SAME = 1e-4;

export interface Comparison {
  /** Special points of the one that came out again, and their largest difference as a share of the value. */
  readonly matched: number;
  readonly largest: number;
  readonly missing: readonly string[];
  readonly added: readonly string[];
}

const MODELS = { split: 'split model', twin: 'pooled twin' } as const;

function nameOf(point: KeptPoint, of: keyof typeof MODELS): string {
  return `${point.kind} at ${formatNumber(point.parameter, 6)} of the ${MODELS[of]}`;
}

/** Pairs the points of two runs of one model, nearest first, each at most once. */
function pairPoints(before: KeptModel, after: KeptModel, width: number) {
  const pairs = before.points
    .flatMap((one, i) =>
      after.points.map((other, j) => ({
        i,
        j,
        difference:
          one.kind === other.kind
            ? Math.abs(one.parameter - other.parameter) / Math.max(Math.abs(one.parameter), SAME * width)
            : Infinity,
      })),
    )
    .filter(({ difference }) => difference <= SAME)
    .sort((a, b) => a.difference - b.difference);
  const [left, right] = [new Set<number>(), new Set<number>()];
  let largest = 0;
  for (const { i, j, difference } of pairs) {
    if (left.has(i) || right.has(j)) continue;
    left.add(i);
    right.add(j);
    largest = Math.max(largest, difference);
  }
  return { left, right, largest };
}

/** Whether the special points of a kept sweep come out of another run of it. */
export function compareSweeps(before: KeptSweep, after: KeptSweep): Comparison {
  let [matched, largest] = [0, 0];
  const missing: string[] = [];
  const added: string[] = [];
  for (const of of ['split', 'twin'] as const) {
    const [one, other] = [before[of], after[of]];
    if (!one || !other) continue;
    const pairs = pairPoints(one, other, before.range.to - before.range.from);
    matched += pairs.left.size;
    largest = Math.max(largest, pairs.largest);
    missing.push(...one.points.filter((_, i) => !pairs.left.has(i)).map((point) => nameOf(point, of)));
    added.push(...other.points.filter((_, j) => !pairs.right.has(j)).map((point) => nameOf(point, of)));
  }
  return { matched, largest, missing, added };
}

/** What a replay says of a sweep that was handed in. */
export function compareWords({ matched, largest, missing, added }: Comparison): readonly string[] {
  const total = matched + missing.length;
  if (total + added.length === 0) return ['Neither run has a special point.'];
  const apart = matched === 0 ? '' : ` The largest relative difference is ${formatNumber(largest, 2)}.`;
  const first =
    missing.length === 0
      ? total === 0
        ? 'No special point was handed in.'
        : `${total === 1 ? 'The special point comes' : `All ${total} special points come`} out again.${apart}`
      : `${matched} of ${plural(total, 'special point')} ${matched === 1 ? 'comes' : 'come'} out again.${apart}`;
  return [
    first,
    ...(missing.length > 0 ? [`Not found again: ${missing.join('; ')}.`] : []),
    ...(added.length > 0 ? [`Found now and not handed in: ${added.join('; ')}.`] : []),
  ];
}
