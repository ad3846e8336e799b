import { describe, expect, it } from 'vitest';

import { nearestSymbol } from '@/engine/expression';
import { editDistance } from '@/engine/expression/nearest-symbol';

describe('editDistance', () => {
  // kitten/sitting is the usual textbook example (Levenshtein distance 3).
  it.each([
    ['kitten', 'sitting', 3],
    ['ab', 'ba', 1],
    ['', 'abc', 3],
    ['abc', 'abc', 0],
  ])('%s to %s is %i', (a, b, distance) => {
    expect(editDistance(a, b)).toBe(distance);
    expect(editDistance(b, a)).toBe(distance);
  });
});

describe('nearestSymbol', () => {
  const known = ['mortality', 'm_y1', 'm_y2', 'x', 'K'];
  it.each([
    ['mortalty', 'mortality'],
    ['m_y', 'm_y1'],
    ['my1', 'm_y1'],
    ['k', 'K'],
    ['X', 'x'],
    ['z', null],
    ['harvest', null],
  ])('%s gives %s', (name, expected) => {
    expect(nearestSymbol(name, known)).toBe(expected);
  });
});
