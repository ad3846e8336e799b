import { describe, expect, it } from 'vitest';

import { extentOf, whereItAttracts, type Between } from '@/engine/analyses/stretches';

const branch = (parameters: number[], attracts: number[], feasible = attracts.map(() => 1)) => ({
  parameters: Float64Array.from(parameters),
  attracts: Uint8Array.from(attracts),
  feasible: Uint8Array.from(feasible),
});
const special = (index: number, parameter: number, on = 0): Between => ({ index, parameter, branch: on });

describe('where a branch attracts', () => {
  it('is said in a word where it does so all along, or nowhere', () => {
    expect(whereItAttracts(branch([1, 2, 3], [1, 1, 1]), 0, [])).toBe('Attracts throughout.');
    expect(whereItAttracts(branch([1, 2, 3], [0, 0, 0]), 0, [])).toBe('Repels throughout.');
    expect(whereItAttracts(branch([1, 2, 3], [2, 2, 2]), 0, [])).toBe(
      'Undecided at this accuracy throughout.',
    );
  });

  it('reaches to the special points between which it does', () => {
    const points = [special(0, 1.4), special(2, 3.7), special(2, 3.1, 1)];
    expect(whereItAttracts(branch([1, 2, 3, 4], [0, 1, 1, 0]), 0, points)).toBe('Attracts from 1.4 to 3.7.');
  });

  it('reaches around a fold, where the special point lies beyond both neighbours', () => {
    expect(whereItAttracts(branch([1, 2, 1.8, 1], [1, 1, 0, 0]), 0, [special(1, 2.2)])).toBe(
      'Attracts from 1 to 2.2.',
    );
  });

  it('reaches to where another branch crosses, and takes a lone undecided point for the crossing', () => {
    expect(whereItAttracts(branch([1, 2, 3, 4], [1, 1, 0, 0]), 0, [special(0, 2.5, 1)])).toBe(
      'Attracts from 1 to 2.5.',
    );
    expect(whereItAttracts(branch([1, 2, 3, 4], [1, 2, 0, 0]), 0, [])).toBe('Attracts from 1 to 2.');
  });

  it('does not count points that are not feasible, and tells stretches in order', () => {
    const turned = branch([5, 4, 3, 2, 1], [1, 0, 2, 2, 1], [1, 1, 1, 1, 0]);
    expect(whereItAttracts(turned, 0, [])).toBe('Attracts at 5; undecided at this accuracy from 2 to 3.');
    const two = branch([6, 5, 4, 3, 2, 1], [1, 1, 0, 0, 1, 1]);
    expect(whereItAttracts(two, 0, [])).toBe('Attracts from 1 to 2 and from 5 to 6.');
  });

  it('knows the extent of values in any order', () => {
    expect(extentOf(Float64Array.from([2, -1, 7, 3]))).toEqual([-1, 7]);
  });
});
