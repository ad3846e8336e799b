import { describe, expect, it } from 'vitest';

import { integrateTo } from '@/engine/integrators/driver';

import { textbook } from '../../support/equations';
import { cyclesOf } from './run-cycles';

/** A saturating predator in two sexes whose prey grows with the seasons; numbers of our own. */
const seasonal = (e: number) =>
  textbook(
    [
      "x' = r*x*(1+e*sin(w*t)-x/K) - x*(a*y1+a*y2)/(1+h*x)",
      "y1' = c*0.5*x*(a*y1+a*y2)/(1+h*x)-m1*y1",
      "y2' = c*0.5*x*(a*y1+a*y2)/(1+h*x)-m2*y2",
    ],
    { e, r: 1, w: (2 * Math.PI) / 26, K: 1.8, a: 1.6, h: 1, c: 0.6, m1: 0.4, m2: 0.2 },
  );
const START = Float64Array.of(0.5, 0.4, 0.4);

/** How far a run is from repeating itself after so many periods of the forcing, once settled. */
function misses(e: number, periods: number): number {
  const run = integrateTo(seasonal(e), START, Float64Array.of(0, 26 * 400, 26 * (400 + periods)), {
    relativeTolerance: 1e-10,
  });
  const n = 3;
  return Math.max(...[0, 1, 2].map((i) => Math.abs(Math.log(run.states[n + i]! / run.states[2 * n + i]!))));
}

describe('the period map of a seasonal model', () => {
  const single = cyclesOf(seasonal(0), 'e', [0, 0.9], { starts: [START] });
  const doubling = single.specialPoints.find((one) => one.kind === 'period doubling');

  it('has a fixed point that folds twice and doubles', () => {
    expect(single.forcingPeriod).toBeCloseTo(26, 10);
    expect(single.specialPoints.map((one) => one.kind)).toEqual([
      'fold of cycles',
      'fold of cycles',
      'period doubling',
    ]);
    expect(single.branches.map((one) => one.origin.kind)).toEqual([
      'period map',
      'period map',
      'period doubling',
    ]);
  });

  it('doubles where a long run begins to repeat itself only every second period', () => {
    const at = doubling!.parameter;
    expect(misses(at - 0.08, 1)).toBeLessThan(1e-5);
    expect(misses(at + 0.02, 1)).toBeGreaterThan(0.1);
    expect(misses(at + 0.02, 2)).toBeLessThan(1e-5);
  });

  it('shows the doubling as a branch point of the second iterate', () => {
    const twice = cyclesOf(seasonal(0), 'e', [0, 0.9], { starts: [START], forcingPeriods: 2 });
    const point = twice.specialPoints.find((one) => one.kind === 'branch point of cycles');
    expect(Math.abs(point!.parameter - doubling!.parameter)).toBeLessThan(1e-7);
    expect(twice.branches.filter((one) => one.origin.kind === 'branch point of cycles')).not.toHaveLength(0);
  });

  it('has the empty community as a fixed point that the prey can invade', () => {
    const empty = single.branches[1]!;
    expect(empty.highest.every((value) => value === 0)).toBe(true);
    // Mean growth r over one period: exp(26), whatever the amplitude.
    const [first] = empty.multipliers;
    expect(Math.log(first!)).toBeCloseTo(26, 6);
    expect(empty.attracts.every((one) => one === 0)).toBe(true);
  });
});
