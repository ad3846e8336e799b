import { describe, expect, it } from 'vitest';

import { STARTER_PRESETS } from '@/presets';

import { onlyResult } from '../support/study';

interface LyapunovSide {
  readonly status: string;
  readonly exponents: readonly number[];
  readonly uncertainty: readonly number[];
  readonly traceError: number;
  readonly reading: string;
  readonly finalState: Record<string, number>;
  readonly running: { times: number[]; exponents: number[][] };
}

describe('Lyapunov exponents in batch', () => {
  it('are the eigenvalues where all is linear', () => {
    const { split, twin } = onlyResult<{ split: LyapunovSide; twin: LyapunovSide | null }>({
      preset: { equations: ["x' = 3 - x", "y' = x - 2*y"], init: { x: 1, y: 0 } },
      tasks: [{ task: 'lyapunov', horizon: 200, transient: 50 }],
    });
    expect(split.status).toBe('complete');
    [-1, -2].forEach((value, k) => expect(split.exponents[k]).toBeCloseTo(value, 2));
    expect(Math.abs(split.traceError)).toBeLessThan(1e-3);
    expect(split.reading).toMatch(/rest/);
    expect(split.finalState['x']).toBeCloseTo(3, 6);
    expect(split.finalState['y']).toBeCloseTo(1.5, 6);
    const last = split.running.exponents[split.running.exponents.length - 1];
    expect(split.running.exponents).toHaveLength(split.running.times.length);
    last.forEach((value, k) => expect(value).toBeCloseTo(split.exponents[k], 6));
    expect(twin).toBeNull();
  });

  it('answer for the pooled twin too', () => {
    const [preset] = STARTER_PRESETS.filter((one) => one.id === 'saturating-two-sex-predator');
    const { split, twin } = onlyResult<{ split: LyapunovSide; twin: LyapunovSide | null }>({
      preset: preset.document,
      tasks: [{ task: 'lyapunov', exponents: 1, parameters: { K: 1 } }],
    });
    // Before the onset of cycles the largest exponent is the leading eigenvalue, below zero.
    expect(split.exponents).toHaveLength(1);
    expect(split.exponents[0]).toBeLessThan(0);
    expect(twin?.exponents[0]).toBeLessThan(0);
  });
});

describe('sections in batch', () => {
  it('list the crossings with their times and states', () => {
    // x = sin t, y = cos t: x rises through 1/2 at t = pi/6 + 2 pi k, where y = cos(pi/6).
    const { split } = onlyResult<{
      split: { status: string; crossings: number; times: number[]; states: Record<string, number[]> };
    }>({
      preset: { equations: ["x' = y", "y' = -x"], init: { x: 0, y: 1 } },
      tasks: [{ task: 'section', quantity: 'x', value: 0.5, transient: 0, crossings: 4 }],
    });
    expect(split.crossings).toBe(4);
    split.times.forEach((t, k) => {
      expect(t).toBeCloseTo(Math.PI / 6 + 2 * Math.PI * k, 6);
      expect(split.states['x'][k]).toBeCloseTo(0.5, 6);
      expect(split.states['y'][k]).toBeCloseTo(Math.cos(Math.PI / 6), 6);
    });
  });
});

describe('long-run extremes in batch', () => {
  it('follow the cycle of a Hopf normal form in both directions', () => {
    // r' = mu r - r^3, so that x runs between -sqrt(mu) and sqrt(mu).
    const { split } = onlyResult<{
      split: {
        status: string;
        observed: string;
        sweeps: {
          direction: string;
          parameters: number[];
          highest: Record<string, number[]>;
          lowest: Record<string, number[]>;
          maxima: number[][];
        }[];
        hysteresis: unknown[];
      };
    }>({
      preset: {
        equations: ["x' = mu*x - y - x*(x^2 + y^2)", "y' = x + mu*y - y*(x^2 + y^2)"],
        parameters: { mu: 0.5 },
        init: { x: 0.5, y: 0 },
      },
      tasks: [
        {
          task: 'extremes',
          parameter: 'mu',
          from: 0.1,
          to: 0.5,
          values: 5,
          observe: 'x',
          transient: 100,
          observed: 50,
        },
      ],
    });
    expect(split).toMatchObject({ status: 'complete', observed: 'x' });
    expect(split.sweeps.map((one) => one.direction).sort()).toEqual(['downward', 'upward']);
    for (const sweep of split.sweeps) {
      expect(sweep.parameters).toHaveLength(5);
      sweep.parameters.forEach((mu, k) => {
        expect(sweep.highest['x'][k]).toBeCloseTo(Math.sqrt(mu), 4);
        expect(sweep.lowest['x'][k]).toBeCloseTo(-Math.sqrt(mu), 4);
        expect(sweep.maxima[k].length).toBeGreaterThan(3);
        sweep.maxima[k].forEach((value) => expect(value).toBeCloseTo(Math.sqrt(mu), 4));
      });
    }
    expect(split.hysteresis).toEqual([]);
  });
});
