import { describe, expect, it } from 'vitest';

import type { PresetDocument } from '@/engine/schema/preset';
import { harvestAndClosure } from '@/presets/harvest-and-closure';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';
import { scarceMates } from '@/presets/scarce-mates';
import { seasonalGrowth } from '@/presets/seasonal-growth';
import { twoMorphPrey } from '@/presets/two-morph-prey';
import { twoSexPredator } from '@/presets/two-sex-predator';

import { splitPredator } from '../../support/example-models';
import { onlyResult } from '../../support/study';

const verdictOf = (preset: PresetDocument, parameters = {}) =>
  onlyResult({ preset, tasks: [{ task: 'equilibria', parameters }] }).verdict;

describe('verdicts on models, from their equilibria', () => {
  it.each([twoSexPredator, twoMorphPrey])(
    'says that the split stabilises a neutral pair: $title',
    (preset) => {
      const verdict = verdictOf(preset);
      expect(verdict?.answer).toBe('stabilises');
      expect(verdict?.sentence).toMatch(/neutral when pooled, attracts/);
    },
  );

  it('quotes the decay rate of the two-class predator (closed form, leading real part)', () => {
    // Mortalities 1.3 and 0.7: the leading real part of L^3 + 1.09 L^2 + 0.91 L + 0.91 is -0.02036.
    expect(verdictOf(splitPredator(0.3))?.sentence).toMatch(/dying at 0\.0204 per year/);
  });

  it('refuses at spread 0, and where classes do not differ', () => {
    expect(verdictOf(splitPredator(0.3), { spread: 0 })).toMatchObject({
      answer: 'cannot say',
      sentence: expect.stringMatching(/at spread 0/),
    });
    expect(verdictOf(splitPredator(0))).toMatchObject({
      answer: 'cannot say',
      sentence: expect.stringMatching(/do not differ/),
    });
  });

  it('refuses without a split, and says so', () => {
    expect(verdictOf(harvestAndClosure)).toMatchObject({ answer: 'not comparable' });
    expect(verdictOf(seasonalGrowth)?.answer).not.toBe('stabilises');
  });

  it('depends on the mean where another one would turn the answer', () => {
    expect(verdictOf(scarceMates)).toMatchObject({
      answer: 'depends',
      sentence: expect.stringMatching(/which mean is held/),
    });
  });

  it('depends on the swept ceiling where the onset of cycles comes earlier with the split', () => {
    const { verdict, shifts } = onlyResult({
      preset: saturatingTwoSexPredator,
      tasks: [{ task: 'sweep', parameter: 'K', from: 0.2, to: 4, bands: false }],
    });
    expect(verdict?.answer).toBe('depends');
    expect(verdict?.sentence).toMatch(/between 1\.32 and 1\.38 coexistence attracts only when pooled/);
    const hopf = shifts.find((shift) => shift.kind === 'Hopf');
    expect(hopf?.pooled).toBeCloseTo(1.375, 7);
    expect(hopf?.split).toBeCloseTo(1.32477061323764, 7);
    expect(hopf?.moved).toBeCloseTo(-0.05022938676236, 7);
  });

  it('reports modes of composition apart at spread 0 (third eigenvalue -1 of the closed form)', () => {
    const { split } = onlyResult({
      preset: splitPredator(0.3),
      tasks: [{ task: 'equilibria', parameters: { spread: 0 } }],
    });
    const inner = split.equilibria.find((one) => one.absent.length === 0);
    expect(inner).toMatchObject({ type: 'neutral', compositionModes: [{ re: -1, im: 0 }] });
  });
});
