import { listSymbols } from '../schema/document-symbols';
import type { PresetDocument, Trait } from '../schema/preset';
import { SPREAD_KEY, traitDialKey, traitEntrySymbol } from '../schema/symbols';
import type { SpreadLimit } from './contract';
import { effectiveTraitValues, spreadGroups } from './spread';

/** Ends of a dial that nothing else limits, and how far out an end with a reason is still shown as it is. */
export const DIAL_REACH = { lowest: -3, highest: 3, farthest: 10 } as const;
/** A dial stops this far short (relative) of a pole, where the trait would be infinite or zero. */
const SHORT_OF_POLE = 1e-3;
const UNLIMITED = 'No trait ends here; the dial stops at a round number.';
const NO_REVERSAL =
  'At 0 the classes share their mean; to reverse a single trait, turn its own dial below 0.';

interface End {
  readonly at: number;
  readonly reason: string;
}
interface Range {
  readonly from: End;
  readonly to: End;
}

/**
 * How far each dial can go before a trait leaves its domain or the reach of g^-1, with the reason in
 * words. On the scale g a value moves in a straight line, G + s (g(v) - G), so each end is one division.
 */
export function spreadLimits(
  document: PresetDocument,
  values: Readonly<Record<string, number>> = {},
): readonly SpreadLimit[] {
  const groups = spreadGroups(document);
  if (groups.length === 0) return [];
  const limits: SpreadLimit[] = [];
  const common = values[SPREAD_KEY] ?? document.spread;
  let shared: Range = { from: { at: 0, reason: NO_REVERSAL }, to: { at: Infinity, reason: UNLIMITED } };
  document.traits.forEach((trait, index) => {
    if (!groups.some((group) => group.trait === index)) return;
    const range = traitRange(document, index, values);
    const own = values[traitDialKey(trait.symbol)] ?? trait.dial;
    if (trait.followsSpread) shared = narrow(shared, divide(range, own));
    limits.push(toLimit(traitDialKey(trait.symbol), trait.followsSpread ? divide(range, common) : range));
  });
  return [toLimit(SPREAD_KEY, shared), ...limits];
}

/** Spreads that a trait allows in all its groups. */
function traitRange(
  document: PresetDocument,
  index: number,
  values: Readonly<Record<string, number>>,
): Range {
  const trait = document.traits[index] as Trait;
  const labels = new Map(listSymbols(document).map((entry) => [entry.symbol, entry.label]));
  const traits = effectiveTraitValues(document, values);
  let range: Range = { from: { at: -Infinity, reason: UNLIMITED }, to: { at: Infinity, reason: UNLIMITED } };
  for (const value of traits.values) {
    if (value.trait !== trait.symbol || value.mean === null) continue;
    const label = labels.get(traitEntrySymbol(trait.symbol, value.of)) ?? value.symbol;
    for (const wall of wallsOf(trait)) {
      range = narrow(range, crossing(trait, value.mean, value.entered, wall, label));
    }
  }
  return range;
}

interface Wall {
  /** Position on the scale g. */
  readonly at: number;
  readonly words: string;
  /** The wall itself is not allowed. */
  readonly open: boolean;
}

function wallsOf(trait: Trait): readonly Wall[] {
  const walls: Wall[] = [];
  if (trait.mean === 'arithmetic' && trait.domain !== 'any') {
    walls.push({
      at: 0,
      words: trait.domain === 'positive' ? 'fall to zero' : 'become negative',
      open: trait.domain === 'positive',
    });
  }
  if (trait.mean === 'harmonic') walls.push({ at: 0, words: 'become infinite', open: true });
  if (trait.domain === 'share') {
    walls.push({ at: trait.mean === 'geometric' ? 0 : 1, words: 'exceed 1', open: false });
  }
  return walls;
}

/** Spreads at which one value meets one wall: above its mean on one side of s = 0, below on the other. */
function crossing(trait: Trait, mean: number, entered: number, wall: Wall, label: string): Range {
  const g = (v: number): number =>
    trait.mean === 'arithmetic' ? v : trait.mean === 'geometric' ? Math.log(v) : 1 / v;
  const slope = g(entered) - g(mean);
  const free: Range = { from: { at: -Infinity, reason: UNLIMITED }, to: { at: Infinity, reason: UNLIMITED } };
  if (!Number.isFinite(slope) || slope === 0) return free;
  const s = (wall.at - g(mean)) / slope;
  const end = {
    at: wall.open ? s * (1 - SHORT_OF_POLE) : s,
    reason: `Beyond it, ${label} would ${wall.words}.`,
  };
  return s > 0 ? { ...free, to: end } : { ...free, from: end };
}

function narrow(a: Range, b: Range): Range {
  return { from: b.from.at > a.from.at ? b.from : a.from, to: b.to.at < a.to.at ? b.to : a.to };
}

/** Range of one dial where the spread in force is that dial times `factor`. */
function divide(range: Range, factor: number): Range {
  if (factor === 0) {
    return { from: { at: -Infinity, reason: UNLIMITED }, to: { at: Infinity, reason: UNLIMITED } };
  }
  const scaled = (end: End): End => ({ ...end, at: end.at / factor });
  const [from, to] = [scaled(range.from), scaled(range.to)];
  return factor > 0 ? { from, to } : { from: to, to: from };
}

function toLimit(key: string, range: Range): SpreadLimit {
  const from =
    range.from.at < -DIAL_REACH.farthest ? { at: DIAL_REACH.lowest, reason: UNLIMITED } : range.from;
  const to = range.to.at > DIAL_REACH.farthest ? { at: DIAL_REACH.highest, reason: UNLIMITED } : range.to;
  return { key, from: tidy(from.at), to: tidy(to.at), fromReason: from.reason, toReason: to.reason };
}

/** Takes off what is rounding alone, so that an end at 3 does not read 3.0000000000000004. */
function tidy(value: number): number {
  const short = Number(value.toPrecision(14));
  return Math.abs(short - value) <= 4 * Number.EPSILON * Math.abs(value) ? short : value;
}
