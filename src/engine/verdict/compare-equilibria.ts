import type { Equilibrium } from '../equilibria/contract';
import type { VerdictAnswer } from './contract';
import type { EquilibriumPair } from './pair-by-continuation';
import { inWords, ratePer } from './wording';

/** What one pair of coexistence equilibria says of the split. */
export interface PairFinding {
  readonly answer: VerdictAnswer;
  readonly sentence: string;
  /** Margins compared: without pure changes of composition, where these are known apart. */
  readonly pooledMargin: number | null;
  readonly splitMargin: number | null;
}

/** Margins that differ by less than this share of the larger, or this much in all, count as equal. */
export const EQUAL_MARGINS = { relative: 1e-7, absolute: 1e-11 } as const;

/** Compares stability at one equilibrium, pooled and split. Rates are per `timeUnit`. */
export function comparePair(pair: EquilibriumPair, timeUnit: string): PairFinding {
  const { split, pooled } = pair;
  const counted = pair.dynamicLeading === null ? split.margin : -pair.dynamicLeading;
  const splitMargin = split.attracts === 'neutral' ? 0 : counted;
  const pooledMargin = pooled?.attracts === 'neutral' ? 0 : (pooled?.margin ?? null);
  const say = (answer: VerdictAnswer, sentence: string): PairFinding => ({
    answer,
    sentence,
    pooledMargin,
    splitMargin,
  });
  const per = (rate: number): string => ratePer(rate, timeUnit);
  if (pooled === null)
    return say(
      'cannot say',
      pair.lostAt === null
        ? 'Cannot say: the coexistence equilibrium of the split model leads to none that was found for the pooled twin.'
        : `Cannot say: on the way to spread 0 the coexistence equilibrium is lost near spread ${inWords(pair.lostAt)}, so the pooled twin has no counterpart of it.`,
    );
  if (split.type === 'not differentiable' || pooled.type === 'not differentiable')
    return say(
      'cannot say',
      'Cannot say: the rates have a kink at the coexistence equilibrium, so that no eigenvalues exist there.',
    );
  const s = split.attracts;
  const q = pooled.attracts;
  if (split.margin === null || splitMargin === null || pooledMargin === null)
    return say('cannot say', 'Cannot say: the eigenvalues at coexistence could not be computed.');
  if (s === 'unknown')
    return say(
      'cannot say',
      `Cannot say: with the split the coexistence equilibrium is ${split.type} at the accuracy reached.`,
    );
  const held = s === 'yes' ? `attracts, disturbances dying at ${per(split.margin)}` : '';
  const driven = s === 'no' ? `repels, disturbances growing at ${per(-split.margin)}` : '';
  if (q === 'unknown')
    return s === 'neutral'
      ? say('cannot say', `Cannot say: the pooled equilibrium is ${pooled.type} at the accuracy reached.`)
      : say(
          s === 'yes' ? 'stabilises partly' : 'destabilises',
          `${s === 'yes' ? 'It stabilises, as far as the linear part tells' : 'It destabilises, as far as the linear part tells'}: with the split the coexistence equilibrium ${held}${driven}; pooled it is ${pooled.type}.`,
        );
  if (q === 'neutral') {
    if (s === 'neutral')
      return say(
        'no effect found',
        'No effect found: the coexistence equilibrium is neutral pooled and split.',
      );
    return s === 'yes'
      ? say('stabilises', `The split stabilises: coexistence, neutral when pooled, ${held}.`)
      : say('destabilises', `The split destabilises: coexistence, neutral when pooled, ${driven}.`);
  }
  if (q === 'no') {
    if (s === 'yes')
      return say('stabilises', `The split stabilises: coexistence, which repels when pooled, ${held}.`);
    if (s === 'neutral')
      return say(
        'stabilises partly',
        'The split stabilises partly: coexistence, which repels when pooled, becomes neutral.',
      );
    return compareSizes(
      splitMargin,
      pooledMargin,
      {
        equal: `No effect found: coexistence repels pooled and split, at the same rate of ${per(-pooledMargin)}.`,
        larger: `The split stabilises only partly: coexistence still repels, but disturbances grow at ${per(-splitMargin)} instead of ${per(-pooledMargin)}.`,
        smaller: `The split destabilises: coexistence repels either way, and disturbances grow at ${per(-splitMargin)} instead of ${per(-pooledMargin)}.`,
      },
      say,
    );
  }
  if (s === 'no')
    return say('destabilises', `The split destabilises: coexistence, which attracts when pooled, ${driven}.`);
  if (s === 'neutral')
    return say(
      'destabilises',
      'The split destabilises: coexistence attracts when pooled and is neutral with the split.',
    );
  return compareSizes(
    splitMargin,
    pooledMargin,
    {
      equal: `No effect found: coexistence attracts pooled and split, disturbances dying at the same rate of ${per(pooledMargin)}.`,
      larger: `The split stabilises partly: coexistence attracts either way and is held more strongly, disturbances dying at ${per(splitMargin)} instead of ${per(pooledMargin)}.`,
      smaller: `The split destabilises in part: coexistence attracts either way but is held less strongly, disturbances dying at ${per(splitMargin)} instead of ${per(pooledMargin)}.`,
    },
    say,
  );
}

function compareSizes(
  split: number,
  pooled: number,
  sentences: { equal: string; larger: string; smaller: string },
  say: (answer: VerdictAnswer, sentence: string) => PairFinding,
): PairFinding {
  const limit = EQUAL_MARGINS.absolute + EQUAL_MARGINS.relative * Math.max(Math.abs(split), Math.abs(pooled));
  if (Math.abs(split - pooled) <= limit) return say('no effect found', sentences.equal);
  return split > pooled ? say('stabilises partly', sentences.larger) : say('destabilises', sentences.smaller);
}

/** Coexistence: feasible, and no population absent. */
export function coexistenceOf(equilibria: readonly Equilibrium[]): Equilibrium[] {
  return equilibria.filter((one) => one.feasible && one.absent.length === 0);
}
