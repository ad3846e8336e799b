import { describe, expect, it } from 'vitest';

import type { KeptSweep } from '@/contract/kept-sweep';
import { compareSweeps, compareWords } from '@/features/assigned/review/compare-sweeps';

import { keptModel, keptSweep } from './support';

const withPoints = (points: Parameters<typeof keptModel>[0]): KeptSweep => ({
  ...keptSweep(),
  split: keptModel(points),
});
const words = (before: KeptSweep, after: KeptSweep) => compareWords(compareSweeps(before, after));

describe('a replayed sweep', () => {
  it('that is the same says so', () => {
    expect(words(keptSweep(), keptSweep())).toEqual([
      'The special point comes out again. They are equal to the last digit that is kept.',
    ]);
  });

  it('names the largest relative difference', () => {
    const before = withPoints([
      ['Hopf', 1],
      ['fold', 2],
    ]);
    const after = withPoints([
      ['Hopf', 1 + 2e-7],
      ['fold', 2 + 2e-8],
    ]);
    const compared = compareSweeps(before, after);
    expect(compared).toMatchObject({ same: 2, moved: [], missing: [], added: [] });
    expect(compared.largest).toBeCloseTo(2e-7, 12);
    expect(compareWords(compared)[0]).toMatch(/^All 2 special points come out again\. .* 2\.0 × 10⁻⁷\.$/);
  });

  it('tells what moved from what is gone and what is new', () => {
    const before = withPoints([
      ['Hopf', 1],
      ['fold', 0.6],
    ]);
    const after = withPoints([
      ['Hopf', 1.01],
      ['fold', 1.9],
    ]);
    expect(words(before, after)).toEqual([
      '0 of 2 special points come out again. The largest relative difference is 0.010.',
      'Elsewhere: Hopf at 1.00000 of the split model, now at 1.01000.',
      'Not found again: fold at 0.600000 of the split model.',
      'Found now and not handed in: fold at 1.90000 of the split model.',
    ]);
  });

  it('pairs each point once, the nearest first', () => {
    const before = withPoints([
      ['Hopf', 1],
      ['Hopf', 1.1],
    ]);
    const after = withPoints([['Hopf', 1.1]]);
    expect(compareSweeps(before, after)).toMatchObject({
      same: 1,
      missing: ['Hopf at 1.00000 of the split model'],
    });
  });

  it('does not take a point of another kind for one', () => {
    expect(compareSweeps(withPoints([['Hopf', 1]]), withPoints([['fold', 1]]))).toMatchObject({
      same: 0,
      moved: [],
    });
  });

  it('says where nothing was handed in', () => {
    expect(words(withPoints([]), withPoints([]))).toEqual(['No special point was handed in.']);
  });
});
