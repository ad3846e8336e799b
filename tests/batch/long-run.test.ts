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
