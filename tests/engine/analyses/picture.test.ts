import { describe, expect, it } from 'vitest';

import type { AnalysisOptions, PictureResult, PictureRow } from '@/engine/analyses/contract';
import { runAnalysis } from '@/engine/analyses/run-analysis';
import type { Progress } from '@/engine/continuation/contract';
import { pictureTaskSchema } from '@/engine/schema/analysis-tasks';
import { documentFromEquations } from '@/engine/schema/equations';
import type { PresetDocument } from '@/engine/schema/preset';
import { compileModel } from '@/engine/system/compile-model';
import { STARTER_PRESETS } from '@/presets';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';

/**
 * x' = r x (1 - x/K) - a x y / (1 + a h x), y' = e a x y / (1 + a h x) - m y: with x* = m / (a (e - m h)) the
 * predator invades at K = x*, and cycles begin at K = 2 x* + 1/(a h), where x* lies under the top of the
 * prey's zero-growth line (Rosenzweig and MacArthur 1963; Hopf value derived here).
 */
const rosenzweig = (): PresetDocument => {
  const made = documentFromEquations({
    equations: ["x' = r*x*(1 - x/K) - a*x*y/(1 + a*h*x)", "y' = e*a*x*y/(1 + a*h*x) - m*y"],
    parameters: { r: 1, K: 2, a: 1, h: 1, e: 1, m: 0.4 },
    init: { x: 1, y: 1 },
    sign: 'nonnegative',
  });
  if (!made.ok) throw new Error(made.message);
  return made.document;
};
const INVASION = 0.4 / 0.6;
const ONSET = (2 * 0.4) / 0.6 + 1;

function picture(document: PresetDocument, task: object, options: AnalysisOptions = {}) {
  const compiled = compileModel(document);
  if (!compiled.ok) throw new Error('the model does not compile');
  const parsed = pictureTaskSchema.parse({ task: 'picture', parameter: 'K', from: 0.2, to: 4, ...task });
  const progress: Progress<PictureResult>[] = [];
  const run = runAnalysis(compiled.model, parsed, options);
  for (;;) {
    const next = run.next();
    if (next.done) return { result: next.value, progress };
    progress.push(next.value);
  }
}

const row = (rows: readonly PictureRow[], what: string, of: PictureRow['of'] = 'split') =>
  rows.filter((one) => one.what === what && one.of === of);

describe('the full picture', () => {
  it('of a textbook model has its invasion, its Hopf point and the cycles from it', () => {
    const { result, progress } = picture(rosenzweig(), {});
    expect(result.status).toBe('complete');
    expect(result.sweep.twin).toBeNull();
    expect(result.cycles.twin).toBeNull();
    const { summary } = result;
    expect(summary.every((one) => one.of === 'split')).toBe(true);
    const [coexistence] = row(summary, 'coexistence equilibrium');
    expect(coexistence).toMatchObject({ parameter: 2, extent: null });
    // y* = r (1 - x*/K) (1 + a h x*) / a = 10/9 at K = 2.
    expect(coexistence.note).toMatch(/^Stable focus at x = 0.667, y = 1.11\./);
    expect(row(summary, 'equilibrium without y')[0].note).toMatch(/^Saddle.*Y can invade\./);
    expect(row(summary, 'empty equilibrium')).toHaveLength(1);
    const [branch] = row(summary, 'branch of the coexistence equilibrium');
    expect(branch.note).toMatch(/^Attracts from 0.667 to 2.33\./);
    expect(branch.extent?.[0]).toBeCloseTo(INVASION, 9);
    expect(row(summary, 'branch of the equilibrium without y')[0].note).toMatch(
      /^Attracts from 0.2 to 0.667/,
    );
    expect(row(summary, 'transcritical')[0].parameter).toBeCloseTo(INVASION, 9);
    expect(row(summary, 'Hopf')[0].parameter).toBeCloseTo(ONSET, 9);
    const [cycles] = row(summary, 'cycle branch from the Hopf point');
    expect(cycles.parameter).toBeCloseTo(ONSET, 9);
    expect(cycles.extent?.[0]).toBeCloseTo(ONSET, 6);
    expect(cycles.extent?.[1]).toBe(4);
    expect(cycles.note).toMatch(/^Attracts throughout\. Period .* Lowest density .* of x at 4\./);
    const fractions = progress.map((one) => one.fraction);
    expect([...fractions].sort((a, b) => a - b)).toEqual(fractions);
    expect(fractions[fractions.length - 1]).toBeLessThanOrEqual(1);
  });

  it('comes as it is found: branches first, then cycles of the split model, then those of its twin', () => {
    const { result, progress } = picture(saturatingTwoSexPredator, {});
    const partials = progress.flatMap(({ partial }) => (partial ? [partial] : []));
    const first = (test: (one: PictureResult) => boolean): number => partials.findIndex(test);
    const order = [
      first((one) => one.sweep.split.branches.length > 0),
      first((one) => one.sweep.twin !== null && one.sweep.twin.branches.length > 0),
      first((one) => one.cycles.split.branches.length > 0),
      first((one) => one.cycles.twin !== null && one.cycles.twin.branches.length > 0),
    ];
    expect(order[0]).toBeGreaterThanOrEqual(0);
    expect([...order].sort((a, b) => a - b)).toEqual(order);
    expect(new Set(order).size).toBe(4);
    partials.forEach((one) => expect(one.summary.length).toBeGreaterThan(0));
    // The pooled twin is the textbook model; its parameters are the preset's own.
    const hopf = row(result.summary, 'Hopf', 'twin');
    const cycles = row(result.summary, 'cycle branch from the Hopf point', 'twin');
    expect(hopf).toHaveLength(1);
    expect(cycles[0].extent?.[0]).toBeCloseTo(hopf[0].parameter ?? 0, 6);
    expect(row(result.summary, 'cycle branch from the Hopf point')).toHaveLength(1);
  });

  it('keeps what was found when it is cancelled, at every stage', () => {
    const cancelAt = (asked: number) => {
      let count = 0;
      const isCancelled = (): boolean => (count += 1) >= asked;
      return picture(rosenzweig(), {}, { isCancelled }).result;
    };
    const early = cancelAt(1);
    expect(early.status).toBe('cancelled');
    expect(early.equilibria.split.status).toBe('cancelled');
    const whole = picture(rosenzweig(), {}, { isCancelled: () => false }).progress.length;
    const late = cancelAt(whole - 4);
    expect(late.status).toBe('cancelled');
    expect(late.sweep.split.status).toBe('complete');
    expect(late.cycles.split.status).toBe('cancelled');
    expect(row(late.summary, 'Hopf')).toHaveLength(1);
  });

  it.each(STARTER_PRESETS.map((one) => [one.id, one.document] as const))(
    'of the starter preset %s is complete, and every row says something',
    (_id, document) => {
      const [{ parameter, from, to }] = [
        ...document.sweeps,
        { parameter: document.parameters[0]?.symbol ?? 'spread', from: 0.1, to: 1 },
      ];
      const { result } = picture(document, { parameter, from, to });
      expect(result.status).toBe('complete');
      expect(result.summary.length).toBeGreaterThan(0);
      for (const { note, parameter: at, extent } of result.summary) {
        expect(note).toMatch(/\.$/);
        expect(note).not.toMatch(/NaN|undefined|Infinity/);
        expect(at !== null || extent !== null).toBe(true);
      }
    },
  );

  it('leaves the twin out where it is not asked for', () => {
    const { result } = picture(saturatingTwoSexPredator, { twin: false, from: 0.2, to: 1 });
    expect(result.equilibria.twin).toBeNull();
    expect(result.sweep.twin).toBeNull();
    expect(result.cycles.twin).toBeNull();
    expect(row(result.summary, 'coexistence equilibrium', 'twin')).toEqual([]);
  });
});
