import { describe, expect, it } from 'vitest';

import { createPreset } from '@/engine/schema/create';
import type { PresetDocument } from '@/engine/schema/preset';
import { compileModel, type CompiledModel } from '@/engine/system/compile-model';
import { splitPredator, splitPrey, springtailsAndSpiders, withTemplates } from '../../support/example-models';

function compiled(document: PresetDocument): CompiledModel {
  const result = compileModel(document);
  if (!result.ok) throw new Error(result.diagnostics.map((one) => one.message).join(' '));
  return result.model;
}

const withTrait = (
  document: PresetDocument,
  symbol: string,
  values: Record<string, number>,
): PresetDocument => ({
  ...document,
  traits: document.traits.map((trait) =>
    trait.symbol !== symbol
      ? trait
      : {
          ...trait,
          entries: trait.entries.map((entry) => ({
            ...entry,
            value: values[entry.of.join(' ')] ?? entry.value,
          })),
        },
  ),
});

/** Juveniles mature into adults that give birth; only juveniles have a maturation rate. */
const juvenilesAndAdults = withTemplates(
  createPreset({
    title: 'Stages',
    populations: [
      {
        symbol: 'N',
        name: 'Beetles',
        hue: 'weld',
        classes: [
          { symbol: 'j', name: 'Juveniles', start: 3 },
          { symbol: 'a', name: 'Adults', start: 1 },
        ],
      },
    ],
  }),
  ['exponential-births', { population: 'N', parents: ['a'], newborns: 'one class', newbornClass: 'j' }],
  ['maturation', { population: 'N', from: 'j', to: 'a' }],
  ['deaths', { population: 'N' }],
);

describe('pooled twin', () => {
  it('lumps a predator whose births are pooled into one total (checks, case B1)', () => {
    const model = compiled(splitPredator(0.3));
    const { report, system } = model.twin;
    expect(report.kind).toBe('lumped');
    expect(report.pooledTraits).toEqual([
      { trait: 'm', mean: 'arithmetic', coefficientOfVariation: expect.closeTo(0.3, 14) as number },
    ]);
    expect(system?.stateSymbols).toEqual(['x', 'Y']);
    const [u, f, J] = [Float64Array.of(0.7, 1.3), new Float64Array(2), new Float64Array(4)];
    system?.rhs(0, u, f);
    expect(f[0]).toBeCloseTo(0.7 - 0.7 * 1.3, 14);
    expect(f[1]).toBeCloseTo(0.7 * 1.3 - 1.3, 14);
    system?.jacobian(0, Float64Array.of(1, 1), J);
    expect([...J]).toEqual([0, -1, 1, 0]);
    expect([...model.toTwinStarts([0.5, 0.1, 0.3])]).toEqual([0.5, 0.4]);
    expect([...model.fromTwinState([0.5, 0.4])]).toEqual([0.5, 0.2, 0.2]);
    expect(model.twin.states).toEqual([[0], [1, 2]]);
  });

  it('follows the split model at spread 0 for any composition', () => {
    const model = compiled(splitPrey(0.4));
    const u = [0.9, 0.2, 0.6];
    const [split, pooled] = [new Float64Array(3), new Float64Array(2)];
    model.system.setParameters(model.valuesToParameters({ spread: 0 }));
    model.system.rhs(0, Float64Array.from(u), split);
    model.twin.system?.rhs(0, model.toTwinStarts(u), pooled);
    expect(pooled[0]).toBeCloseTo((split[0] ?? NaN) + (split[1] ?? NaN), 14);
    expect(pooled[1]).toBeCloseTo(split[2] ?? NaN, 14);
  });

  it('stays put when the common dial turns, and follows the means when a trait value changes', () => {
    const model = compiled(splitPredator(0.3));
    const out = new Float64Array(2);
    const flowAt = (values: Record<string, number>): number[] => {
      model.twin.system?.setParameters(model.valuesToParameters(values));
      model.twin.system?.rhs(0, Float64Array.of(0.7, 1.3), out);
      return [...out];
    };
    expect(flowAt({ spread: 3 })).toEqual(flowAt({}));
    expect(flowAt({ m_y1: 1.5 })[1]).toBeCloseTo(0.7 * 1.3 - ((1.5 + 0.7) / 2) * 1.3, 14);
  });

  it('says that saturation with unequal sexes is lumpable once attack rates are pooled', () => {
    const document = withTemplates(
      springtailsAndSpiders(),
      ['logistic-births', { population: 'x' }],
      ['predation', { consumer: 'Y', resources: ['x'], response: 'saturating' }],
      ['deaths', { population: 'Y' }],
    );
    const model = compiled(withTrait(document, 'a', { 'y1 x': 0.2, 'y2 x': 0.8 }));
    expect(model.twin.report.kind).toBe('lumped');
    expect(model.twin.report.reason).toBe(
      'Pooled: attack rate (arithmetic mean); at spread 0 totals depend on totals alone, so the twin has one state a population.',
    );
  });

  it('keeps the split states, at spread 0, where births need both sexes', () => {
    const document = withTemplates(
      springtailsAndSpiders(),
      ['logistic-births', { population: 'x' }],
      ['births-by-mating', { population: 'Y', females: ['y2'], males: ['y1'] }],
      ['deaths', { population: 'Y' }],
    );
    const model = compiled(withTrait(document, 'm', { y1: 0.9, y2: 0.1 }));
    expect(model.twin.report.kind).toBe('unlumped');
    expect(model.twin.report.reason).toContain('not lumpable');
    expect(model.twin.system?.stateSymbols).toEqual(['x', 'y1', 'y2']);
    expect([...model.toTwinStarts([1, 0.6, 0.2])]).toEqual([1, 0.4, 0.4]);
    expect([...model.fromTwinState([1, 0.3, 0.5])]).toEqual([1, 0.3, 0.5]);
    const [u, f, g] = [Float64Array.of(1, 0.6, 0.2), new Float64Array(3), new Float64Array(3)];
    model.twin.system?.rhs(0, u, f);
    model.system.setParameters(model.valuesToParameters({ spread: 0 }));
    model.system.rhs(0, u, g);
    expect([...f]).toEqual([...g]);
    expect(f[1]).toBeCloseTo(((3 * 2 * 0.6 * 0.2) / 0.8) * 0.5 - 0.5 * 0.6, 14);
  });

  it('is not comparable where the classes differ only in a trait that some lack', () => {
    const { twin } = compiled(juvenilesAndAdults);
    expect(twin.report.kind).toBe('not-comparable');
    expect(twin.system).toBeNull();
    expect(twin.report.leftTraits).toEqual(['g']);
    expect(twin.report.reason).toBe(
      'Not comparable, because the classes of beetles differ only in traits that some of them lack (maturation rate), and a mean over those means nothing.',
    );
  });

  it('pools only the common traits of stages, and names what it leaves', () => {
    const { twin } = compiled(withTrait(juvenilesAndAdults, 'm', { j: 0.9, a: 0.3 }));
    expect(twin.report.kind).toBe('unlumped');
    expect(twin.report.pooledTraits.map((one) => one.trait)).toEqual(['m']);
    expect(twin.report.leftTraits).toEqual(['g']);
    expect(twin.report.reason).toContain(
      'left as entered, because only some classes have them: maturation rate',
    );
  });

  it('is not comparable where the difference is written into formulas', () => {
    const document = springtailsAndSpiders();
    const process = (id: string, rate: string, symbol: string, amount: string) => ({
      id,
      name: id,
      kind: 'other' as const,
      rate,
      effects: [{ class: symbol, amount }],
      signed: false,
      template: null,
    });
    const { twin } = compiled({
      ...document,
      processes: [
        process('p', '0.3*y1', 'y1', '-1'),
        process('q', '0.5*y2', 'y2', '-1'),
        process('r', 'Y', 'y1', '1'),
      ],
    });
    expect(twin.report.kind).toBe('not-comparable');
    expect(twin.report.reason).toContain('differ in their processes');
  });

  it('does not take an equality at the present values for a law', () => {
    // With g_y1 = g_y2 the births would lump today; they would not after the next touch of a slider.
    const document = splitPredator(0.3, {
      parameters: ['g_1', 'g_2'].map((symbol) => ({ symbol, name: symbol, value: 1, min: 0, max: 2 })),
    });
    const process = document.processes[0];
    if (process === undefined) throw new Error('no process');
    const births = { ...process, id: 'b', rate: 'g_1*y1 + g_2*y2', effects: [{ class: 'y1', amount: '1' }] };
    expect(compiled({ ...document, processes: [...document.processes, births] }).twin.report.kind).toBe(
      'unlumped',
    );
  });

  it('has nothing to pool without a split', () => {
    const document = springtailsAndSpiders();
    const whole = { ...document, populations: document.populations.slice(0, 1) };
    const { twin } = compiled(withTemplates(whole, ['logistic-births', { population: 'x' }]));
    expect(twin.report.kind).toBe('no-split');
    expect(twin.system).toBeNull();
  });
});
