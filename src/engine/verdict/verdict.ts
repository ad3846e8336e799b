import type { SweepResult } from '../continuation/contract';
import type { EquilibriaResult } from '../equilibria/contract';
import { CAUTION, type TwinReport } from '../system/contract';
import { coexistenceOf, comparePair, type PairFinding } from './compare-equilibria';
import { compareSweeps, type SweepComparison } from './compare-sweeps';
import { OPEN_WITHOUT_CYCLES, type Verdict, type VerdictAnswer } from './contract';
import { equilibriumEvidence, sweepEvidence } from './evidence';
import type { EquilibriumPair } from './pair-by-continuation';
import { inWords, listed } from './wording';

/** All that a verdict may rest on; what is absent is said to be left open. */
export interface VerdictInput {
  readonly twin: TwinReport;
  /** Common spread now; the trait dials multiply it. */
  readonly spread: number;
  readonly autonomous: boolean;
  readonly harvested: boolean;
  readonly timeUnit: string;
  readonly split: EquilibriaResult | null;
  readonly pooled: EquilibriaResult | null;
  /** From `pairByContinuation`; without it a lone equilibrium on either side is paired as it stands. */
  readonly pairs?: readonly EquilibriumPair[];
  readonly splitSweep?: SweepResult | null;
  readonly pooledSweep?: SweepResult | null;
  /** Name and unit of the swept parameter, for sentences. */
  readonly parameterLabel?: string;
  readonly parameterUnit?: string;
  /** Answers under other means, where they were worked out: `harmonic mean of mortality`. */
  readonly underOtherMeans?: readonly { readonly mean: string; readonly answer: VerdictAnswer }[];
}

/** Answers "does the split stabilise?" from what was computed, and never claims more. */
export function judge(input: VerdictInput): Verdict {
  const refusal = refusalOf(input);
  if (refusal !== null) return { ...refusal, evidence: [], ...context(input, null, null) };
  const pairs = pairsOf(input);
  const findings = pairs.map((pair) => comparePair(pair, input.timeUnit));
  const comparison = sweepsOf(input);
  const here = findings.length === 0 ? missing(input) : together(findings);
  return {
    ...underMeans(input, here, alongTheSweep(input, here, comparison)),
    evidence: [...equilibriumEvidence(pairs, findings, input.timeUnit), ...sweepEvidence(input, comparison)],
    ...context(input, pairs, comparison),
  };
}

interface Answered {
  readonly answer: VerdictAnswer;
  readonly sentence: string;
}

/** Reasons to refuse before any number is looked at. */
function refusalOf(input: VerdictInput): Answered | null {
  const { twin } = input;
  if (twin.kind === 'no-split' || twin.kind === 'not-comparable')
    return { answer: 'not comparable', sentence: `Not comparable, because ${lowered(twin.reason)}` };
  if (!input.autonomous || input.split?.status === 'needs-period-map')
    return {
      answer: 'cannot say',
      sentence:
        'Cannot say: the formulas contain the time t, so that nothing rests and there is no equilibrium to judge. Compare the fixed points of the period map, pooled and split, instead.',
    };
  if (input.spread === 0)
    return {
      answer: 'cannot say',
      sentence:
        'Cannot say at spread 0: split and pooled are the same there. Move the spread dial to compare.',
    };
  if (twin.pooledTraits.every((trait) => trait.coefficientOfVariation === 0))
    return {
      answer: 'cannot say',
      sentence: 'Cannot say: the classes do not differ in any trait that the pooled twin averages.',
    };
  return null;
}

function pairsOf(input: VerdictInput): readonly EquilibriumPair[] {
  if (input.pairs !== undefined) return input.pairs;
  const split = coexistenceOf(input.split?.equilibria ?? []);
  const pooled = coexistenceOf(input.pooled?.equilibria ?? []);
  if (split.length !== 1 || pooled.length !== 1) return [];
  return [{ split: split[0], pooled: pooled[0], dynamicLeading: null, lostAt: null }];
}

/** What is said where nothing could be paired. */
function missing(input: VerdictInput): Answered {
  const cannot = (sentence: string): Answered => ({
    answer: 'cannot say',
    sentence: `Cannot say: ${sentence}`,
  });
  if (input.split === null || input.pooled === null)
    return cannot('the equilibria of the split model and of its pooled twin have not both been computed.');
  const split = coexistenceOf(input.split.equilibria).length;
  const pooled = coexistenceOf(input.pooled.equilibria).length;
  if (split === 0 && pooled === 0)
    return cannot('no equilibrium with all populations present was found, pooled or split.');
  if (split === 0)
    return cannot(
      'pooled, an equilibrium with all populations present was found; with the split none was, and a search is no proof that there is none.',
    );
  if (pooled === 0)
    return cannot(
      'with the split an equilibrium with all populations present was found; pooled none was, and a search is no proof that there is none.',
    );
  return cannot(
    'there are several equilibria of coexistence, and they were not paired between split and pooled.',
  );
}

/** One answer from several pairs: theirs where they agree, else it depends. */
function together(findings: readonly PairFinding[]): Answered {
  const answers = [...new Set(findings.map((one) => one.answer))];
  const [first] = findings;
  if (answers.length === 1)
    return findings.length === 1
      ? first
      : {
          answer: first.answer,
          sentence: `${first.sentence} So do the other ${findings.length - 1} equilibria of coexistence.`,
        };
  const decided = answers.filter((answer) => answer !== 'cannot say');
  if (decided.length === 1 && answers.length === 2)
    return {
      answer: 'cannot say',
      sentence: `Cannot say for all equilibria of coexistence: for some ${phrase(decided[0])}, for others the comparison fails.`,
    };
  return {
    answer: 'depends',
    sentence: `It depends on the equilibrium: of ${findings.length} with all populations present, ${listed(
      decided.map(
        (answer) => `for ${findings.filter((one) => one.answer === answer).length} ${phrase(answer)}`,
      ),
    )}.`,
  };
}

function phrase(answer: VerdictAnswer): string {
  const words: Record<VerdictAnswer, string> = {
    stabilises: 'the split stabilises',
    'stabilises partly': 'it stabilises partly',
    destabilises: 'it destabilises',
    'no effect found': 'no effect was found',
    depends: 'it depends',
    'not comparable': 'there is no comparison',
    'cannot say': 'nothing can be said',
  };
  return words[answer];
}

function sweepsOf(input: VerdictInput): SweepComparison | null {
  const { splitSweep, pooledSweep } = input;
  if (!splitSweep || !pooledSweep) return null;
  if (splitSweep.branches.length === 0 || pooledSweep.branches.length === 0) return null;
  return compareSweeps(splitSweep, pooledSweep);
}

/** Joins the answer at the present numbers with what the sweep shows along its range. */
function alongTheSweep(input: VerdictInput, here: Answered, comparison: SweepComparison | null): Answered {
  if (comparison === null || !comparison.comparable) return here;
  const { gained, lost } = comparison;
  if (gained.length === 0 && lost.length === 0) return here;
  const name = sweptName(input);
  const range = input.splitSweep ?? { from: 0, to: 0 };
  const gain = `for ${name} ${inStretches(gained, range)} coexistence attracts only with the split`;
  const loss = `for ${name} ${inStretches(lost, range)} coexistence attracts only when pooled`;
  if (gained.length > 0 && lost.length > 0)
    return { answer: 'depends', sentence: `It depends on ${name}: ${gain}, ${loss}.` };
  const added = `${capitalised(gained.length > 0 ? gain : loss)}.`;
  const along = gained.length > 0 ? 1 : -1;
  const now = directionOf(here.answer);
  if (now === along) return { answer: here.answer, sentence: `${here.sentence} ${added}` };
  if (now === null && here.answer !== 'depends')
    return { answer: here.answer, sentence: `${here.sentence} Along the sweep: ${lowered(added)}` };
  return {
    answer: 'depends',
    sentence: `It depends on ${name}. At the present numbers: ${lowered(here.sentence)} ${added}`,
  };
}

/** 1 towards stability, -1 away from it, 0 neither; null where nothing was decided. */
function directionOf(answer: VerdictAnswer): 1 | -1 | 0 | null {
  if (answer === 'stabilises' || answer === 'stabilises partly') return 1;
  if (answer === 'destabilises') return -1;
  return answer === 'no effect found' ? 0 : null;
}

function sweptName(input: VerdictInput): string {
  const label = input.parameterLabel ?? input.splitSweep?.parameterKey ?? 'parameter';
  if (label.length <= 3 || label.includes(':')) return label;
  return `the ${/^[A-Z][a-z]/.test(label) ? lowered(label) : label}`;
}

/** An end of a stretch this near to the end of the range, as a share of it, is called that end. */
const NEAR_END = 1e-3;

function inStretches(list: SweepComparison['gained'], range: { from: number; to: number }): string {
  const near = NEAR_END * Math.abs(range.to - range.from);
  const end = (value: number): string =>
    inWords([range.from, range.to].find((side) => Math.abs(side - value) <= near) ?? value);
  return listed(
    list.map(({ from, to }) =>
      end(from) === end(to) ? `near ${end(from)}` : `between ${end(from)} and ${end(to)}`,
    ),
  );
}

/** Turns the answer to `depends` where another mean would point the other way at the present numbers. */
function underMeans(input: VerdictInput, here: Answered, whole: Answered): Answered {
  const now = directionOf(here.answer);
  const others = (input.underOtherMeans ?? []).filter((other) => {
    const direction = directionOf(other.answer);
    return now !== null && direction !== null && direction !== now;
  });
  if (others.length === 0) return whole;
  const against = listed(others.map((other) => `with the ${other.mean} held ${phrase(other.answer)}`));
  return {
    answer: 'depends',
    sentence: `It depends on which mean is held: ${against}. With the means held now: ${lowered(whole.sentence)}`,
  };
}

function context(
  input: VerdictInput,
  pairs: readonly EquilibriumPair[] | null,
  comparison: SweepComparison | null,
): Pick<Verdict, 'restsOn' | 'leavesOpen' | 'cautions'> {
  const cautions = input.harvested ? [CAUTION] : [];
  if (pairs === null) return { restsOn: [], leavesOpen: [], cautions };
  const held = listed(input.twin.pooledTraits.map((trait) => `the ${trait.mean} mean of ${trait.trait}`));
  const others = input.underOtherMeans ?? [];
  const restsOn = [
    input.twin.reason,
    ...(pairs.length > 0
      ? ['Eigenvalues at the coexistence equilibrium, each with a bound on its error.']
      : []),
    ...(input.pairs ? ['Split and pooled equilibria paired by following each along the spread dial.'] : []),
    ...(others.length > 0
      ? [`The same comparison with the ${listed(others.map((one) => one.mean))} held.`]
      : []),
    ...(comparison
      ? [
          `Both sweeps of ${input.parameterLabel ?? input.splitSweep?.parameterKey ?? 'the parameter'}; special points paired by kind and place.`,
        ]
      : []),
  ];
  const leavesOpen = [
    ...(others.length > 0 || held === ''
      ? []
      : [
          `Whether the answer holds under another mean: now ${held} is held, and in saturating models the choice can turn the answer.`,
        ]),
    ...(comparison ? [] : ['How onsets of cycles and collapses move: sweep a parameter to see.']),
    OPEN_WITHOUT_CYCLES,
    'The risk of extinction by chance.',
    ...(Math.abs(input.spread) < 0.3
      ? ['Small spreads act at second order, so effects at this spread are small by nature.']
      : []),
    ...([input.split, input.pooled].some((one) => one?.status === 'cancelled')
      ? ['The search for equilibria was stopped before its end; others may exist.']
      : []),
    ...(partialSweep(input)
      ? ['The sweep was stopped before its end; the rest of its range is not counted.']
      : []),
  ];
  return { restsOn, leavesOpen, cautions };
}

function partialSweep({ splitSweep, pooledSweep }: VerdictInput): boolean {
  return [splitSweep, pooledSweep].some(
    (one) => one !== null && one !== undefined && one.status !== 'complete',
  );
}

function capitalised(sentence: string): string {
  return sentence.charAt(0).toUpperCase() + sentence.slice(1);
}

function lowered(sentence: string): string {
  return sentence.charAt(0).toLowerCase() + sentence.slice(1);
}
