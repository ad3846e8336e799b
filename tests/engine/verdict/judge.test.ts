import { describe, expect, it } from 'vitest';

import type { Branch, SpecialPoint, SweepResult } from '@/engine/continuation/contract';
import type { EquilibriaResult, Equilibrium } from '@/engine/equilibria/contract';
import { CAUTION, type TwinReport } from '@/engine/system/contract';
import { specialPointShifts } from '@/engine/verdict/special-point-shifts';
import { judge, type VerdictInput } from '@/engine/verdict/verdict';

const twin: TwinReport = {
  kind: 'lumped',
  reason: 'Pooled: mortality (arithmetic mean).',
  pooledTraits: [{ trait: 'm', mean: 'arithmetic', coefficientOfVariation: 0.3 }],
  leftTraits: [],
};

function equilibrium(re: number, type: Equilibrium['type'], attracts: Equilibrium['attracts']): Equilibrium {
  return {
    state: Float64Array.of(1, 1),
    residual: 0,
    eigenvalues: [
      { re, im: 1 },
      { re, im: -1 },
    ],
    type,
    attracts,
    margin: -re,
    feasible: true,
    absent: [],
    invasions: [],
    compositionModes: [],
    notes: [],
  };
}
const stable = (rate: number) => equilibrium(-rate, 'stable focus', 'yes');
const repelling = (rate: number) => equilibrium(rate, 'unstable focus', 'no');
const neutral = equilibrium(1e-17, 'neutral', 'neutral');
const undecided = equilibrium(1e-17, 'indistinguishable from neutral', 'unknown');

const found = (...equilibria: Equilibrium[]): EquilibriaResult => ({
  status: 'complete',
  message: '',
  equilibria,
  box: [],
  startsTried: 1,
});

const input = (
  pooled: EquilibriaResult | null,
  split: EquilibriaResult | null,
  more: Partial<VerdictInput> = {},
): VerdictInput => ({
  twin,
  spread: 1,
  autonomous: true,
  harvested: false,
  timeUnit: 'week',
  split,
  pooled,
  ...more,
});

describe('one equilibrium, pooled beside split', () => {
  it.each([
    [
      'neutral to stable',
      neutral,
      stable(0.02),
      'stabilises',
      /neutral when pooled, attracts, disturbances dying at 0\.02 per week/,
    ],
    ['neutral to repelling', neutral, repelling(0.02), 'destabilises', /neutral when pooled, repels/],
    ['neutral in both', neutral, neutral, 'no effect found', /neutral pooled and split/],
    ['repelling to stable', repelling(0.1), stable(0.02), 'stabilises', /repels when pooled, attracts/],
    [
      'repelling more slowly',
      repelling(0.1),
      repelling(0.05),
      'stabilises partly',
      /grow at 0\.05 per week instead of 0\.1/,
    ],
    [
      'repelling faster',
      repelling(0.1),
      repelling(0.2),
      'destabilises',
      /grow at 0\.2 per week instead of 0\.1/,
    ],
    ['repelling to neutral', repelling(0.1), neutral, 'stabilises partly', /becomes neutral/],
    ['stable to repelling', stable(0.1), repelling(0.05), 'destabilises', /attracts when pooled, repels/],
    ['stable to neutral', stable(0.1), neutral, 'destabilises', /is neutral with the split/],
    ['held more strongly', stable(0.1), stable(0.2), 'stabilises partly', /held more strongly/],
    ['held less strongly', stable(0.2), stable(0.1), 'destabilises', /held less strongly/],
    ['equal within accuracy', stable(0.2), stable(0.2 + 1e-13), 'no effect found', /same rate of 0\.2/],
    ['undecided when split', stable(0.2), undecided, 'cannot say', /indistinguishable from neutral/],
    ['undecided in both', undecided, undecided, 'cannot say', /indistinguishable from neutral/],
    ['undecided to stable', undecided, stable(0.2), 'stabilises partly', /as far as the linear part tells/],
    ['undecided to repelling', undecided, repelling(0.2), 'destabilises', /as far as the linear part tells/],
  ] as const)('%s', (_name, pooled, split, answer, sentence) => {
    const verdict = judge(input(found(pooled), found(split)));
    expect(verdict.answer).toBe(answer);
    expect(verdict.sentence).toMatch(sentence);
    expect(verdict.evidence[0].label).toBe('stability margin');
    expect(verdict.leavesOpen.join(' ')).toMatch(/extinction by chance/);
  });

  it('does not take a slow change of composition for a margin', () => {
    const split = {
      ...stable(0.01),
      eigenvalues: [
        { re: -0.01, im: 0 },
        { re: -0.2, im: 1 },
        { re: -0.2, im: -1 },
      ],
    };
    const pooled = stable(0.1);
    const verdict = judge(
      input(found(pooled), found(split), { pairs: [{ split, pooled, dynamicLeading: -0.2, lostAt: null }] }),
    );
    expect(verdict.answer).toBe('stabilises partly');
    expect(verdict.evidence[0]).toMatchObject({
      pooled: 0.1,
      split: 0.2,
      note: expect.stringMatching(/composition alone/),
    });
  });
});

describe('refusals', () => {
  const pair = [found(stable(0.1)), found(stable(0.2))] as const;
  it.each([
    [
      'no split',
      { twin: { ...twin, kind: 'no-split', reason: 'No population is split.' } },
      'not comparable',
      /because no population is split/,
    ],
    [
      'not comparable',
      { twin: { ...twin, kind: 'not-comparable', reason: 'Maturation is one class’s own.' } },
      'not comparable',
      /because maturation/,
    ],
    ['explicit time', { autonomous: false }, 'cannot say', /period map/],
    ['spread 0', { spread: 0 }, 'cannot say', /at spread 0/],
    ['classes alike', { twin: { ...twin, pooledTraits: [] } }, 'cannot say', /do not differ/],
  ] as const)('%s', (_name, more, answer, sentence) => {
    const verdict = judge(input(...pair, more as Partial<VerdictInput>));
    expect(verdict.answer).toBe(answer);
    expect(verdict.sentence).toMatch(sentence);
    expect(verdict.evidence).toEqual([]);
  });

  it.each([
    ['nothing computed', null, null, /not both been computed/],
    ['no coexistence', found(), found(), /no equilibrium with all populations present/],
    ['only pooled', found(stable(0.1)), found(), /with the split none was/],
    ['only split', found(), found(stable(0.1)), /pooled none was/],
    ['several, unpaired', found(stable(0.1), stable(0.3)), found(stable(0.1)), /several equilibria/],
  ] as const)('%s', (_name, pooled, split, sentence) => {
    const verdict = judge(input(pooled, split));
    expect(verdict.answer).toBe('cannot say');
    expect(verdict.sentence).toMatch(sentence);
  });

  it('names the spread at which a counterpart is lost', () => {
    const split = stable(0.1);
    const pairs = [{ split, pooled: null, dynamicLeading: null, lostAt: 0.4 }];
    expect(judge(input(found(stable(1)), found(split), { pairs })).sentence).toMatch(/lost near spread 0\.4/);
  });

  it('depends on the equilibrium where several disagree', () => {
    const [a, b] = [stable(0.1), stable(0.3)];
    const pairs = [
      { split: a, pooled: stable(0.05), dynamicLeading: null, lostAt: null },
      { split: b, pooled: stable(0.5), dynamicLeading: null, lostAt: null },
    ];
    expect(judge(input(found(), found(), { pairs })).answer).toBe('depends');
  });
});

/** One branch whose leading real part is slope * (value - crossing) over 0..10, with a Hopf point there. */
function swept(crossing: number, slope = 0.1, absent: readonly string[] = []): SweepResult {
  const parameters = Float64Array.from({ length: 101 }, (_, k) => k / 10);
  const end = { reason: 'left the range', message: '' } as const;
  const branch: Branch = {
    parameters,
    states: new Float64Array(202).fill(1),
    dimension: 2,
    leading: parameters.map((value) => slope * (value - crossing)),
    attracts: new Uint8Array(101),
    feasible: new Uint8Array(101).fill(1),
    typeIndex: new Uint8Array(101),
    types: ['stable focus'],
    absent,
    startEnd: end,
    endEnd: end,
  };
  const hopf: SpecialPoint = {
    id: 'Hopf-1',
    kind: 'Hopf',
    parameter: crossing,
    state: Float64Array.of(1, 1),
    eigenvalues: [],
    branch: 0,
    index: 0,
    accuracy: 0,
    feasible: true,
    hopf: { omega: 1, l1: -1, criticality: 'supercritical', meaning: '', crossingSpeed: slope },
    invades: [],
    foldCoefficient: null,
    meaning: '',
  };
  return {
    status: 'complete',
    message: '',
    parameterKey: 'K',
    from: 0,
    to: 10,
    stateSymbols: ['x', 'y'],
    branches: [branch],
    specialPoints: [hopf],
    bands: [],
    points: 101,
    milliseconds: 0,
  };
}

describe('along a sweep', () => {
  const at = (
    pooled: Equilibrium,
    split: Equilibrium,
    pooledSweep: SweepResult,
    splitSweep: SweepResult,
    more: Partial<VerdictInput> = {},
  ) =>
    judge(
      input(found(pooled), found(split), { pooledSweep, splitSweep, parameterLabel: 'ceiling', ...more }),
    );

  it('adds where only the split attracts, when that agrees', () => {
    const verdict = at(stable(0.1), stable(0.2), swept(4), swept(6));
    expect(verdict.answer).toBe('stabilises partly');
    expect(verdict.sentence).toMatch(
      /For the ceiling between 4 and 6 coexistence attracts only with the split/,
    );
    expect(verdict.evidence[1]).toMatchObject({
      label: 'onset of cycles (Hopf)',
      pooled: 4,
      split: 6,
      note: 'Supercritical in both.',
    });
  });

  it('depends on the parameter when the sweep disagrees with the present numbers', () => {
    const verdict = at(stable(0.1), stable(0.2), swept(6), swept(4));
    expect(verdict.answer).toBe('depends');
    expect(verdict.sentence).toMatch(/depends on the ceiling.*only when pooled/);
  });

  it('depends on the parameter when it gains here and loses there', () => {
    const pooled = swept(2);
    const split = { ...swept(8, -0.1), specialPoints: [] };
    const verdict = at(stable(0.1), repelling(0.1), pooled, split);
    expect(verdict.answer).toBe('depends');
    expect(verdict.sentence).toMatch(
      /between 8 and 10 .* only with the split, .*between 0 and 2 .* only when pooled/,
    );
  });

  it('finds a shift narrower than its sampling', () => {
    const verdict = at(stable(0.1), stable(0.2), swept(5), swept(5.001));
    expect(verdict.sentence).toMatch(/only with the split/);
  });

  it('says that a stopped sweep counts only as far as it went', () => {
    const verdict = at(stable(0.1), stable(0.2), swept(4), { ...swept(6), status: 'cancelled' });
    expect(verdict.leavesOpen.join(' ')).toMatch(/stopped before its end/);
  });

  it('pairs special points by kind and by who is absent', () => {
    const [alone] = specialPointShifts(swept(4), swept(4.5, 0.1, ['y']));
    expect(alone.moved).toBeNull();
    expect(specialPointShifts(swept(4), swept(4.5))).toMatchObject([{ kind: 'Hopf', moved: -0.5 }]);
  });
});

describe('means and cautions', () => {
  it('depends on the mean only where the direction turns', () => {
    const turned = judge(
      input(found(stable(0.1)), found(stable(0.2)), {
        underOtherMeans: [{ mean: 'harmonic mean of m', answer: 'destabilises' }],
      }),
    );
    expect(turned.answer).toBe('depends');
    expect(turned.sentence).toMatch(/with the harmonic mean of m held it destabilises/);
    const same = judge(
      input(found(stable(0.1)), found(stable(0.2)), {
        underOtherMeans: [{ mean: 'harmonic mean of m', answer: 'stabilises' }],
      }),
    );
    expect(same.answer).toBe('stabilises partly');
    expect(same.restsOn.join(' ')).toMatch(/harmonic mean of m held/);
  });

  it('carries the caution wherever harvest occurs, refusals included', () => {
    expect(judge(input(found(stable(0.1)), found(stable(0.2)), { harvested: true })).cautions).toEqual([
      CAUTION,
    ]);
    expect(judge(input(null, null, { harvested: true, spread: 0 })).cautions).toEqual([CAUTION]);
    expect(judge(input(null, null)).cautions).toEqual([]);
  });
});
