import { describe, expect, it } from 'vitest';

import { quantityNamed } from '../../../src/engine/lyapunov/quantities';
import { recordSection, type SectionRequest } from '../../../src/engine/lyapunov/record-section';
import type { SectionResult } from '../../../src/engine/lyapunov/contract';
import type { CompiledSystem } from '../../../src/engine/system/contract';
import { finish, textbook } from '../../support/equations';

function section(
  system: CompiledSystem,
  start: readonly number[],
  symbol: string,
  request: Partial<SectionRequest>,
): SectionResult {
  const quantity = quantityNamed(system, symbol);
  if (!quantity) throw new Error(symbol);
  return finish(
    recordSection(system, Float64Array.from(start), {
      quantity,
      value: 0,
      direction: 'rising',
      transient: 0,
      crossings: 10,
      maximumTime: 1000,
      ...request,
    }),
  );
}

describe('a section', () => {
  const oscillator = textbook(["x' = y", "y' = -4*x"], {}, false);

  it.each([
    // x = -cos 2t crosses 0.5 rising at 2t = 2 pi/3, falling at 2t = 4 pi/3.
    ['rising', [Math.PI / 3]],
    ['falling', [(2 * Math.PI) / 3]],
    ['both', [Math.PI / 3, (2 * Math.PI) / 3]],
  ] as const)('has the exact times of a linear oscillator, %s', (direction, firsts) => {
    const found = section(oscillator, [-1, 0], 'x', { value: 0.5, direction });
    expect(found.status).toBe('complete');
    expect(found.times).toHaveLength(10);
    found.times.forEach((t, k) => {
      const turn = Math.floor(k / firsts.length);
      expect(t).toBeCloseTo(firsts[k % firsts.length] + turn * Math.PI, 8);
      expect(found.states[2 * k]).toBeCloseTo(0.5, 13);
    });
  });

  it('leaves the transient out', () => {
    const found = section(oscillator, [-1, 0], 'x', { transient: 7, crossings: 1 });
    expect(found.times[0]).toBeCloseTo(Math.PI / 4 + 2 * Math.PI, 8);
  });

  it('says where crossings run out', () => {
    const damped = textbook(["x' = y", "y' = -x - 0.2*y"], {}, false);
    const found = section(damped, [1, 0], 'x', { value: 0.5, crossings: 50, maximumTime: 100 });
    expect(found.status).toBe('complete');
    expect(found.message).toMatch(/^Recorded 1 crossing of 50\. In 100 time units there were no more/);
    expect(found.times).toHaveLength(1);
  });

  it('crosses the cycle of van der Pol once a period', () => {
    const system = textbook(["x' = y", "y' = (1-x^2)*y - x"], {}, false);
    const found = section(system, [2, 0], 'x', { transient: 80, crossings: 5 });
    // Case D1.
    expect(found.times[4] - found.times[3]).toBeCloseTo(6.66328685932313, 8);
  });

  it('keeps its digits where densities are tiny', () => {
    // x = exp(-t) x0: falls through 1e-40 at t = log(1e40).
    const found = section(textbook(["x' = -x"]), [1], 'x', {
      value: 1e-40,
      direction: 'falling',
      crossings: 1,
    });
    expect(found.times[0]).toBeCloseTo(40 * Math.log(10), 7);
  });
});
