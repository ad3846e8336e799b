import { describe, expect, it } from 'vitest';

import { allowance, proposeJudgement } from '@/contract/agreement';
import type { GivenFinding, ReferenceFinding, WantedFinding } from '@/contract/assigned-sweeps';
import { changedNumbers, lockBreaches, withoutAnswers, type SetWork } from '@/contract/locks';

import { documentWithAnswer, SECRET_VALUE, SECRET_WORDS } from '../support/assigned';
import { sampleDocument } from '../support/test-server';

const fold: WantedFinding = {
  ...{ id: 'f', label: 'Fold', kind: 'special point', point: 'fold', of: 'split' },
  tolerance: { kind: 'absolute', amount: 0.1 },
};
const reference: ReferenceFinding = { id: 'f', value: 2, text: '', confirmed: true };
const given = (value: number | null, more: Partial<GivenFinding> = {}): GivenFinding => ({
  ...{ id: 'f', value, text: '', pin: null },
  ...more,
});
const judge = (answer: GivenFinding | undefined, wanted: WantedFinding = fold, expected = reference) =>
  proposeJudgement(wanted, expected, answer);

describe('a proposal', () => {
  it('agrees up to the very edge of an absolute tolerance', () => {
    expect([2.1, 1.9, 2.1001].map((value) => judge(given(value)).judgement)).toEqual([
      'agrees',
      'agrees',
      'differs',
    ]);
    expect(judge(given(2.3)).reason).toBe('2.3 against 2: 0.3 apart, 0.1 allowed.');
  });

  it('takes a relative tolerance as a share of the reference, whatever its sign', () => {
    expect(allowance({ kind: 'relative', amount: 0.1 }, -50)).toBe(5);
    const number: WantedFinding = {
      ...{ id: 'f', label: 'N', kind: 'number', unit: '1' },
      tolerance: { kind: 'relative', amount: 0.1 },
    };
    const expected = { ...reference, value: -50 };
    expect(judge(given(-55), number, expected).judgement).toBe('agrees');
    expect(judge(given(-55.1), number, expected).judgement).toBe('differs');
    expect(judge(given(0), number, { ...reference, value: 0 }).judgement).toBe('agrees');
  });

  it('differs for a point of another kind or model, however near', () => {
    const pin = (kind: 'fold' | 'Hopf', of: 'split' | 'twin') =>
      given(2, { pin: { kind, of, parameter: 2 } });
    expect(judge(pin('fold', 'split')).judgement).toBe('agrees');
    expect(judge(pin('Hopf', 'split')).reason).toContain('A Hopf was pinned');
    expect(judge(pin('fold', 'twin')).judgement).toBe('differs');
  });

  it('leaves words, and what has nothing to be compared with, to people', () => {
    const reading: WantedFinding = { id: 'f', label: 'R', kind: 'reading' };
    for (const proposal of [
      judge(given(null, { text: 'They fall.' }), reading),
      judge(undefined),
      judge(given(null, { text: 'about two' })),
      judge(given(2), fold, { ...reference, value: null }),
    ])
      expect(proposal.judgement).toBeNull();
  });
});

describe('locks', () => {
  const document = sampleDocument();
  const second = { ...document.parameters[0], symbol: 's', value: 3 } as (typeof document.parameters)[number];
  const two = { ...document, parameters: [...document.parameters, second] };
  const range = { parameter: 'r', from: 0, to: 2 };
  const locked: SetWork = { document: two, range, freedom: { parameters: [], range: false, model: false } };
  const moved = { ...two, parameters: two.parameters.map((one) => ({ ...one, value: one.value + 1 })) };

  it('name every number that was moved, but for the swept one', () => {
    expect(changedNumbers(two, moved)).toEqual(['r', 's']);
    expect(lockBreaches(locked, { document: moved, range })).toEqual(['s is locked.']);
    for (const parameters of ['all' as const, ['s']])
      expect(
        lockBreaches({ ...locked, freedom: { ...locked.freedom, parameters } }, { document: moved, range }),
      ).toEqual([]);
  });

  it('keep range and model, unless they are open', () => {
    const other = { document: two, range: { ...range, to: 3 } };
    expect(lockBreaches(locked, other)).toEqual(['The sweep is locked to r from 0 to 2.']);
    expect(lockBreaches({ ...locked, freedom: { ...locked.freedom, range: true } }, other)).toEqual([]);
    const [process] = document.processes;
    const rewritten = { ...two, processes: [{ ...process, rate: 'r*x*x' }] } as typeof two;
    expect(lockBreaches(locked, { document: rewritten, range })[0]).toContain('formulas');
    const open = { parameters: [], range: false, model: true };
    expect(lockBreaches({ ...locked, freedom: open }, { document: rewritten, range })).toEqual([]);
  });

  it('mind neither start values nor words', () => {
    const [population] = two.populations;
    const classes = population?.classes.map((one) => ({ ...one, start: 7, name: 'others' })) ?? [];
    const other = {
      ...two,
      title: 'Another',
      horizon: 5,
      populations: [{ ...population, classes }],
    } as typeof two;
    expect(lockBreaches(locked, { document: other, range })).toEqual([]);
  });
});

it('leaves nothing in a document that tells what is expected', () => {
  const text = JSON.stringify(withoutAnswers(documentWithAnswer()));
  for (const secret of [String(SECRET_VALUE), SECRET_WORDS]) expect(text).not.toContain(secret);
});
