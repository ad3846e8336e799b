import { describe, expect, it } from 'vitest';

import { nativeEigenvalues } from '@/engine/core/native-eigenvalues';
import { integrateInSlices, integrateTo } from '@/engine/integrators/driver';
import type { IntegrationOptions } from '@/engine/integrators/contract';
import { eigenvalues } from '@/engine/linalg/eigenvalues';
import { balanceMatrix } from '@/engine/linalg/balance';
import { reduceToHessenberg } from '@/engine/linalg/hessenberg';
import { hessenbergEigenvalues } from '@/engine/linalg/shifted-qr';
import { marginCells } from '@/engine/maps/margin-cells';
import { nativeMarginCells } from '@/engine/maps/native-margin-cells';
import type { CompiledSystem } from '@/engine/system/contract';
import { systemFromEquations } from '@/engine/system/from-equations';

const PAIR = {
  equations: ["x' = r*x*(1-x/K) - a*x*y/(1+h*x)", "y' = e*a*x*y/(1+h*x) - m*y"],
  parameters: { r: 1, K: 2, a: 1, h: 1, e: 1, m: 0.3 },
  nonnegative: true,
};

function compile(input: Parameters<typeof systemFromEquations>[0]): CompiledSystem {
  const result = systemFromEquations(input);
  if (!result.ok) throw new Error(result.message);
  return result.system;
}

/** The same system in the core, and in plain code as its oracle. */
const inCore = compile(PAIR);
const inPlain: CompiledSystem = compile({ ...PAIR, backend: 'closure' });

describe('steps in the compiled core', () => {
  it('are there with WebAssembly, and not with closures', () => {
    expect(inCore.native).toBeDefined();
    expect(inPlain.native).toBeUndefined();
  });

  it.each([
    ['dormand-prince-54', 1e-6],
    ['dormand-prince-54', 1e-9],
    ['dormand-prince-853', 1e-6],
    ['dormand-prince-853', 1e-11],
    ['auto', 1e-8],
  ] as const)('%s at %f are those of plain code, output and counts', (method, relativeTolerance) => {
    const options: IntegrationOptions = { method, relativeTolerance };
    const times = Float64Array.from({ length: 700 }, (_, k) => 0.37 * k);
    for (const span of [times, times.map((t) => -0.02 * t)]) {
      const a = integrateTo(inCore, Float64Array.of(0.5, 0.4), span, options);
      const b = integrateTo(inPlain, Float64Array.of(0.5, 0.4), span, options);
      expect(a.status).toBe(b.status);
      expect(a.steps).toBe(b.steps);
      expect(a.rejected).toBe(b.rejected);
      a.states.forEach((value, k) =>
        expect(Math.abs(value - b.states[k]!)).toBeLessThan(
          Math.max(1e-9, relativeTolerance) * Math.max(1, Math.abs(value)),
        ),
      );
    }
  });

  it('give every output that lies within one long step, however many', () => {
    const still = compile({ equations: ["x' = -k*x"], parameters: { k: 1e-9 } });
    const times = Float64Array.from({ length: 5_000 }, (_, k) => k / 100);
    const run = integrateTo(still, Float64Array.of(1), times);
    expect(run.status).toBe('complete');
    expect(run.steps).toBeLessThan(40);
    run.states.forEach((value, k) => expect(value).toBeCloseTo(Math.exp(-1e-9 * times[k]!), 13));
  });

  it('are not disturbed by another run on the same system in between', () => {
    const times = Float64Array.from({ length: 4_000 }, (_, k) => k / 3);
    const alone = integrateTo(inCore, Float64Array.of(0.5, 0.4), times);
    const run = integrateInSlices(inCore, Float64Array.of(0.5, 0.4), times);
    let step = run.next();
    let slices = 0;
    while (!step.done) {
      integrateTo(inCore, Float64Array.of(1.5, 0.1), Float64Array.of(0, 30), { relativeTolerance: 1e-5 });
      slices += 1;
      step = run.next();
    }
    expect(slices).toBeGreaterThan(3);
    expect(step.value.states).toEqual(alone.states);
  });

  it('hand over to the stiff method where the system proves stiff', () => {
    const stiff = compile({
      equations: ["x' = y", "y' = mu*(1-x^2)*y - x"],
      parameters: { mu: 1000 },
    });
    const run = integrateTo(stiff, Float64Array.of(2, 0), Float64Array.of(0, 500), {
      relativeTolerance: 1e-6,
    });
    expect(run.status).toBe('complete');
    expect(run.steps).toBeLessThan(3_000);
  });

  it('end with a reason where the solution blows up, and with the budget', () => {
    const grows = compile({ equations: ["x' = x^2"], parameters: {} });
    const run = integrateTo(grows, Float64Array.of(1), Float64Array.of(0, 0.5, 2));
    expect(['step-too-small', 'not-finite', 'steps-spent']).toContain(run.status);
    expect(run.states[1]).toBeCloseTo(2, 6);
    const short = integrateTo(inCore, Float64Array.of(0.5, 0.4), Float64Array.of(0, 1e6), {
      maximumSteps: 50,
      method: 'dormand-prince-54',
    });
    expect(short.status).toBe('steps-spent');
    expect(short.steps + short.rejected).toBe(50);
  });

  it('use no memory that grows', () => {
    const before = inCore.native!.view.buffer.byteLength;
    for (let k = 0; k < 200; k += 1) integrateTo(inCore, Float64Array.of(0.5, 0.4), Float64Array.of(0, 20));
    expect(inCore.native!.view.buffer.byteLength).toBe(before);
    expect(inCore.native!.view.length).toBeGreaterThan(0);
  });
});

describe('eigenvalues in the compiled core', () => {
  it.each([1, 2, 3, 5, 12, 40])('are those of plain code, n = %i', (n) => {
    let seed = 11 + n;
    const random = (): number => {
      seed = (seed * 48271) % 2147483647;
      return seed / 2147483647 - 0.5;
    };
    const a = Float64Array.from({ length: n * n }, random);
    const [re, im] = [new Float64Array(n), new Float64Array(n)];
    expect(nativeEigenvalues(a, n, re, im)).toBe(true);
    const [pr, pi] = [new Float64Array(n), new Float64Array(n)];
    const copy = a.slice();
    if (n > 2) {
      balanceMatrix(copy, n);
      reduceToHessenberg(copy, n, new Float64Array(n));
      expect(hessenbergEigenvalues(copy, n, pr, pi)).toBe(n);
    } else {
      const own = eigenvalues(a, n);
      pr.set(own.re);
      pi.set(own.im);
    }
    const sorted = (x: Float64Array, y: Float64Array): [number, number][] =>
      Array.from(x, (value, k): [number, number] => [value, y[k]!]).sort(
        (p, q) => p[0] - q[0] || p[1] - q[1],
      );
    const [mine, theirs] = [sorted(re, im), sorted(pr, pi)];
    mine.forEach(([x, y], k) => {
      expect(x).toBeCloseTo(theirs[k]![0], 10);
      expect(y).toBeCloseTo(theirs[k]![1], 10);
    });
  });

  it('of a defective matrix and of one that is not finite', () => {
    const jordan = Float64Array.of(2, 1, 0, 0, 2, 1, 0, 0, 2);
    const [re, im] = [new Float64Array(3), new Float64Array(3)];
    expect(nativeEigenvalues(jordan, 3, re, im)).toBe(true);
    re.forEach((value) => expect(value).toBeCloseTo(2, 4));
    const wide = new Float64Array(400).fill(NaN);
    expect(eigenvalues(wide, 20).converged).toBe(false);
  });
});

describe('cells of a stability map in the compiled core', () => {
  it('are those of plain code, bit for bit or nearly, and NaN where Newton fails', () => {
    const columns = [1, 5] as const;
    const count = 300;
    const x = Float64Array.from({ length: count }, (_, k) => 0.5 + k / 100);
    const y = Float64Array.from({ length: count }, (_, k) => 0.2 + (k % 7) / 20);
    const starts = Float64Array.from({ length: 2 * count }, () => 0.8);
    starts[20] = NaN;
    const [a, b] = [starts.slice(), starts.slice()];
    const [ma, mb] = [new Float64Array(count), new Float64Array(count)];
    nativeMarginCells(inCore, inCore.native!, inCore.defaults.slice(), columns).solve(count, x, y, a, ma);
    marginCells(inPlain, inPlain.defaults.slice(), columns).solve(count, x, y, b, mb);
    expect(ma[10]).toBeNaN();
    ma.forEach((margin, k) => {
      expect(Number.isNaN(margin)).toBe(Number.isNaN(mb[k]!));
      if (!Number.isNaN(margin)) expect(margin).toBeCloseTo(mb[k]!, 10);
    });
    expect(ma.filter((one) => !Number.isNaN(one)).length).toBeGreaterThan(100);
  });
});
