import { describe, expect, it } from 'vitest';

import { densityWarnings } from '../../../src/engine/integrators/density-warning';
import { integrateTo } from '../../../src/engine/integrators/driver';
import { textbook } from '../../support/equations';

const system = textbook(["x' = -x", "y' = -y"]);
const pair = { ...system, populations: [{ symbol: 'P', name: 'P', states: [0, 1] }] };
const times = Float64Array.from({ length: 21 }, (_, k) => k);
const decay = integrateTo(system, Float64Array.of(1, 3), times);

describe('a warning of too few individuals', () => {
  it('tells class and population, and when first', () => {
    const found = densityWarnings(pair, decay, 100);
    expect(found.map(({ symbol, of }) => [symbol, of])).toEqual([
      ['x', 'class'],
      ['y', 'class'],
      ['P', 'population'],
    ]);
    // u0 c exp(-t) = 1.
    [100, 300, 400].forEach((count, k) => {
      expect(found[k].firstTime).toBeCloseTo(Math.log(count), 7);
      expect(found[k].fewest).toBeCloseTo(count * Math.exp(-20), 10);
      expect(found[k].fewestTime).toBe(20);
    });
    expect(found[0].message).toMatch(
      /^x falls below one individual at t = 4\.61 and down to 2\.06e-7 at t = 20/,
    );
  });

  it('keeps to the threshold that is set', () => {
    expect(densityWarnings(pair, decay, 100, 50)[0].firstTime).toBeCloseTo(Math.log(2), 7);
    expect(densityWarnings(pair, decay, 100, 1e-9)).toEqual([]);
    expect(densityWarnings(pair, decay, 0.5)[0].firstTime).toBe(0);
  });

  it('is silent where nothing is known, and of what was never there', () => {
    expect(densityWarnings(pair, decay, null)).toEqual([]);
    const alone = integrateTo(system, Float64Array.of(0, 3), times);
    expect(densityWarnings(pair, alone, 100).map(({ symbol }) => symbol)).toEqual(['y', 'P']);
  });

  it('a density that reaches zero between two times is met halfway by a straight line', () => {
    const found = densityWarnings(system, { times: [0, 1], states: [1, 1, 0, 1] }, 2);
    expect(found).toHaveLength(1);
    expect(found[0].firstTime).toBeCloseTo(0.5, 12);
  });
});
