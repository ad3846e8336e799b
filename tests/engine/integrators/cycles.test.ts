import { describe, expect, it } from 'vitest';

import { extremesOf, findEvents, levelSection } from '../../../src/engine/integrators/events';
import { longRunExtremes } from '../../../src/engine/integrators/long-run';
import { detectPeriod } from '../../../src/engine/integrators/period';
import { rootInStep } from '../../../src/engine/integrators/root-in-step';
import { BRUSSELATOR, CLASSIC_PREDATOR_PREY, compileProblem } from '../../problems/initial-value-problems';

const TIGHT = { relativeTolerance: 1e-11, absoluteTolerance: 1e-13 };

function finish<Result>(run: Generator<unknown, Result>): Result {
  for (;;) {
    const next = run.next();
    if (next.done) return next.value;
  }
}

describe('events', () => {
  it('of a linear oscillator lie half a turn apart, both directions of time', () => {
    const system = compileProblem({ equations: ["x' = y", "y' = -4*x"], parameters: {} });
    for (const end of [20, -20]) {
      // -cos 2t rises through zero at pi/4 + k pi, in both directions.
      const run = findEvents(system, Float64Array.of(-1, 0), [0, end], levelSection(0, 0, 1), TIGHT);
      expect(run.status).toBe('complete');
      expect(run.times).toHaveLength(7);
      run.times.forEach((t, k) => expect(Math.abs(t)).toBeCloseTo(Math.PI / 4 + k * Math.PI, 9));
      for (let k = 0; k < 7; k += 1) expect(run.states[2 * k]).toBeCloseTo(0, 10);
    }
  });

  it('stop at the wanted number', () => {
    const system = compileProblem({ equations: ["x' = y", "y' = -x"], parameters: {} });
    const run = findEvents(system, Float64Array.of(1, 0), [0, 100], levelSection(0, 0, 0), {
      maximumEvents: 3,
    });
    expect(run.status).toBe('event');
    expect(run.times).toHaveLength(3);
    expect(run.times[2]).toBeCloseTo(2.5 * Math.PI, 6);
  });

  it('report how far they came where the solution ends', () => {
    const system = compileProblem({ equations: ["x' = x^2"], parameters: {} });
    const run = findEvents(system, Float64Array.of(1), [0, 5], levelSection(0, 4, 1));
    expect(run.status).toBe('step-too-small');
    expect(run.times).toHaveLength(1);
    expect(run.times[0]).toBeCloseTo(0.75, 7);
    expect(run.endTime).toBeCloseTo(1, 6);
  });

  it('find roots of awkward functions within a step', () => {
    expect(rootInStep((x) => x ** 9 - 0.5 ** 9, -(0.5 ** 9), 1 - 0.5 ** 9)).toBeCloseTo(0.5, 14);
    expect(rootInStep((x) => Math.atan(1e6 * (x - 0.123)), -1, 1)).toBeCloseTo(0.123, 14);
    expect(rootInStep((x) => (x < 0.7 ? -1 : 1), -1, 1)).toBeCloseTo(0.7, 14);
  });
});

// Case A2: computed by Lambert-W quadrature, -W0(-exp(1-V)) and -W-1(-exp(1-V)).
describe.each([
  [0.5, 6.693929606576027, 0.3574029561813889, 2.15329236411035],
  [0.9, 6.294417353969118, 0.8606273352638498, 1.1536639686733876],
])('closed orbit of predator and prey through (%f, %f)', (through, period, lowest, highest) => {
  const system = compileProblem(CLASSIC_PREDATOR_PREY, true);
  const start = Float64Array.of(through, through);

  it('has the known period', () => {
    const run = findEvents(system, start, [0, 15], levelSection(0, 1, 1), TIGHT);
    expect(run.times[1] - run.times[0]).toBeCloseTo(period, 9);
    const found = finish(
      detectPeriod(system, start, { ...TIGHT, transient: 0, window: 10, maximumTime: 60 }),
    );
    expect(found.period).toBeCloseTo(period, 8);
    expect(found.crossings).toBe(1);
  });

  it('has the known extremes of both populations', () => {
    for (const state of [0, 1]) {
      const top = findEvents(system, start, [0, 8], extremesOf(system, state, -1), TIGHT);
      const bottom = findEvents(system, start, [0, 8], extremesOf(system, state, 1), TIGHT);
      expect(top.states[state]).toBeCloseTo(highest, 9);
      expect(bottom.states[state]).toBeCloseTo(lowest, 9);
    }
    const range = finish(
      longRunExtremes(system, start, { ...TIGHT, transient: 0, window: 20, maximumTime: 200 }),
    );
    expect(range).toMatchObject({ status: 'settled', kind: 'repeating range' });
    // States, then totals: here each population is one state.
    [0, 1, 2, 3].forEach((q) => {
      expect(range.lowest[q]).toBeCloseTo(lowest, 8);
      expect(range.highest[q]).toBeCloseTo(highest, 8);
    });
  });
});

// Case D1; mu = 1: Hairer, Norsett & Wanner I; others computed at 38 digits.
describe.each([
  [0.1, 6.287111272288727, 2.000103979872796, 2.011564649732844],
  [1, 6.66328685932313, 2.0086198608748433, 2.678441479606978],
  [5, 11.61223066771957, 2.0215080615623213, 7.637158827386026],
  [10, 19.078369566939013, 2.0142853609264053, 14.18014728705647],
])('cycle of the van der Pol oscillator, mu = %f', (mu, period, amplitude, fastest) => {
  const system = compileProblem({ equations: ["x' = y", "y' = mu*(1-x^2)*y - x"], parameters: { mu } });
  const transient = mu < 1 ? 300 : 60;

  it('has the known period', () => {
    const found = finish(
      detectPeriod(system, Float64Array.of(2, 0), { ...TIGHT, transient, window: 40, maximumTime: 900 }),
    );
    expect(found.message).toBe('A cycle.');
    expect(found.period).toBeCloseTo(period, 8);
  });

  it('has the known extremes', () => {
    const range = finish(
      longRunExtremes(system, Float64Array.of(2, 0), { ...TIGHT, transient, window: 40, maximumTime: 400 }),
    );
    expect(range.settled).toBe(true);
    expect(range.highest[0]).toBeCloseTo(amplitude, 8);
    expect(range.lowest[0]).toBeCloseTo(-amplitude, 8);
    expect(range.highest[1]).toBeCloseTo(fastest, 8);
  });
});

describe('cycle of the Brusselator', () => {
  const system = compileProblem(BRUSSELATOR, true);
  const start = Float64Array.from(BRUSSELATOR.start);

  // Case D2.
  it('has the known period and extremes', () => {
    const found = finish(
      detectPeriod(system, start, { ...TIGHT, transient: 60, window: 20, maximumTime: 200 }),
    );
    expect(found.period).toBeCloseTo(7.15691992117988, 8);
    const range = finish(
      longRunExtremes(system, start, { ...TIGHT, transient: 60, window: 20, maximumTime: 200 }),
    );
    [0.3705523898982563, 0.8523255020666852].forEach((low, i) => expect(range.lowest[i]).toBeCloseTo(low, 8));
    [3.7517739112336606, 4.7221246707372915].forEach((high, i) =>
      expect(range.highest[i]).toBeCloseTo(high, 8),
    );
  });

  it('is found within a thousandth at the default tolerance', () => {
    const range = finish(longRunExtremes(system, start, { transient: 60, window: 20, maximumTime: 200 }));
    expect(range.settled).toBe(true);
    expect(range.highest[0]).toBeCloseTo(3.7517739112336606, 6);
  });
});

describe('the long run', () => {
  it('tells an equilibrium from a cycle', () => {
    const system = compileProblem(
      { equations: ["x' = x*(1 - x/2) - x*y", "y' = y*(x - 1)"], parameters: {} },
      true,
    );
    const range = finish(
      longRunExtremes(system, Float64Array.of(0.5, 0.5), { transient: 100, window: 30, maximumTime: 2000 }),
    );
    expect(range).toMatchObject({ status: 'settled', kind: 'equilibrium' });
    expect(range.lowest[0]).toBeCloseTo(1, 6);
    expect(range.highest[1]).toBeCloseTo(0.5, 6);
  });

  it('does not take a slow passage by a saddle for rest', () => {
    // Prey alone rests at 1; a predator of 1e-12 invades at rate 0.5.
    const system = compileProblem(
      { equations: ["x' = x*(1 - x) - x*y", "y' = y*(2*x - 1.5)"], parameters: {} },
      true,
    );
    const range = finish(
      longRunExtremes(system, Float64Array.of(1, 1e-12), { transient: 0, window: 5, maximumTime: 4000 }),
    );
    expect(range.kind).toBe('equilibrium');
    expect(range.state[1]).toBeCloseTo(0.25, 5);
  });

  it('says where nothing had settled', () => {
    // Lorenz (1963) at the classic parameters.
    const system = compileProblem({
      equations: ["x' = 10*(y - x)", "y' = x*(28 - z) - y", "z' = x*y - 8/3*z"],
      parameters: {},
    });
    const request = { transient: 20, window: 10, maximumTime: 100, settledTolerance: 1e-6 };
    const range = finish(longRunExtremes(system, Float64Array.of(1, 1, 20), request));
    expect(range).toMatchObject({ status: 'not-settled', settled: false });
    expect(range.message).toMatch(/not settled/);
    expect(range.highest[2]).toBeGreaterThan(38);
    const period = finish(detectPeriod(system, Float64Array.of(1, 1, 20), request));
    expect(period.period).toBeNull();
    expect(period.message).toMatch(/not settled/);
  });

  it('says that it rests where there is no cycle, and stops where the solution does', () => {
    const decay = compileProblem({ equations: ["x' = -x"], parameters: {} });
    const request = { transient: 50, window: 10, maximumTime: 50 };
    expect(finish(detectPeriod(decay, Float64Array.of(1), request)).message).toBe('The trajectory rests.');
    const burst = compileProblem({ equations: ["x' = x^2"], parameters: {} });
    expect(finish(longRunExtremes(burst, Float64Array.of(1), request))).toMatchObject({
      status: 'stopped',
      settled: false,
    });
  });

  it('recognises a doubled period', () => {
    // Roessler (1976), a = b = 0.2: one turn at c = 2.5, two at c = 3.5.
    const turns = (c: number) => {
      const system = compileProblem({
        equations: ["x' = -y - z", "y' = x + 0.2*y", "z' = 0.2 + z*(x - c)"],
        parameters: { c },
      });
      return finish(
        detectPeriod(system, Float64Array.of(1, 1, 0), { transient: 1500, window: 30, maximumTime: 500 }),
      ).crossings;
    };
    expect(turns(2.5)).toBe(1);
    expect(turns(3.5)).toBe(2);
  });
});
