import { describe, expect, it } from 'vitest';

import { createPreset } from '@/engine/schema/create';
import type { PresetDocument } from '@/engine/schema/preset';
import { compileModel } from '@/engine/system/compile-model';
import { constantsOfMotionAt } from '@/engine/system/constants-of-motion';
import { checkDefinition } from '@/engine/system/diagnostics';
import { buildModelGraph } from '@/engine/system/model-graph';
import { splitPredator, splitPrey } from '../../support/example-models';

function classic(changes: { a?: number; given?: string[]; capacity?: number } = {}): PresetDocument {
  const { a = 1, given = [], capacity } = changes;
  const process = (id: string, rate: string, effects: { class: string; amount: string }[]) => ({
    id,
    name: id,
    rate,
    effects,
  });
  return createPreset({
    title: 'Classic predator-prey',
    populations: ['x', 'y'].map((symbol, k) => ({
      symbol,
      name: symbol,
      hue: k === 0 ? ('weld' as const) : ('woad' as const),
      classes: [{ symbol, name: symbol, start: 0.5 }],
    })),
    parameters: [{ symbol: 'a', name: 'attack', value: a, min: 0, max: 5 }],
    processes: [
      process('birth', 'x', [{ class: 'x', amount: '1' }]),
      process('meal', 'a*x*y', [
        { class: 'x', amount: '-1' },
        { class: 'y', amount: '1' },
      ]),
      process('death', 'y', [{ class: 'y', amount: '-1' }]),
      ...(capacity === undefined
        ? []
        : [process('crowding', `x^2/${capacity}`, [{ class: 'x', amount: '-1' }])]),
    ],
    constantsOfMotion: given,
  });
}

function found(document: PresetDocument, p?: Float64Array): string[] {
  const { model } = buildModelGraph(document);
  if (model === null) throw new Error('no model');
  return constantsOfMotionAt(model, p ?? model.defaults).map((one) => one.formula);
}

describe('constants of motion', () => {
  it('finds x - log x + y - log y for the classic predator-prey (checks, case A1)', () => {
    expect(found(classic())).toEqual(['x + y - log(x) - log(y)']);
    const { model } = buildModelGraph(classic());
    if (model === null) throw new Error('no model');
    const [constant] = constantsOfMotionAt(model, model.defaults);
    expect(constant?.value([0.5, 0.5])).toBeCloseTo(1 + 2 * Math.log(2), 14);
    const [slope, curve] = [new Float64Array(2), new Float64Array(4)];
    constant?.gradient([0.5, 2], slope);
    constant?.hessian([0.5, 2], curve);
    expect([...slope]).toEqual([1 - 1 / 0.5, 1 - 1 / 2]);
    expect([...curve]).toEqual([4, 0, 0, 0.25]);
  });

  it('follows the parameters: V = x + y - log(y)/a - log(x)/a at attack rate a', () => {
    expect(found(classic({ a: 2 }))).toEqual(['x + y - 0.5*log(x) - 0.5*log(y)']);
    expect(found(classic(), Float64Array.of(4, 1))).toEqual(['x + y - 0.25*log(x) - 0.25*log(y)']);
  });

  it('finds the constant in totals of a split predator with equal mortalities, and none with unequal ones', () => {
    expect(found(splitPredator(0))).toEqual(['x + Y - log(x) - log(Y)']);
    expect(found(splitPredator(0.3))).toEqual([]);
  });

  it('finds it for a split prey with equal attack rates', () => {
    expect(found(splitPrey(0))).toEqual(['X + y - log(X) - log(y)']);
    expect(found(splitPrey(0.1))).toEqual([]);
  });

  it('finds the constant of the pooled twin, where the split model has none', () => {
    const result = compileModel(splitPredator(0.3));
    const { twin, source } = result.ok ? result.model : { twin: null, source: null };
    if (!twin?.source || !source) throw new Error('no twin');
    expect(constantsOfMotionAt(source, source.defaults)).toEqual([]);
    expect(constantsOfMotionAt(twin.source, source.defaults).map((one) => one.formula)).toEqual([
      'x + Y - log(x) - log(Y)',
    ]);
    const given = compileModel(splitPredator(0.3, { constantsOfMotion: ['x + y1 + y2 - log(x*(y1 + y2))'] }));
    const constants =
      given.ok && given.model.twin.source
        ? constantsOfMotionAt(given.model.twin.source, source.defaults)
        : [];
    expect(constants.map((one) => one.origin)).toEqual(['given']);
    expect(constants[0]?.value([2, 3])).toBeCloseTo(5 - Math.log(6), 14);
  });

  it('can be asked as often as sliders move', () => {
    const { model } = buildModelGraph(classic());
    if (model === null) throw new Error('no model');
    const size = model.graph.size;
    for (let k = 1; k <= 50; k += 1) expect(constantsOfMotionAt(model, [k / 7])).toHaveLength(1);
    expect(model.graph.size).toBe(size);
  });

  it('finds none where the prey regulates itself, however weakly', () => {
    expect(found(classic({ capacity: 10 }))).toEqual([]);
    expect(found(classic({ capacity: 1e4 }))).toEqual([]);
  });

  it('keeps a given constant that holds, once, and marks one that does not', () => {
    expect(found(classic({ given: ['2*(x + y) - 2*log(x*y)'] }))).toEqual(['2*(x + y) - 2*log(x*y)']);
    const messages = checkDefinition(classic({ given: ['x + y'] })).map((one) => one.message);
    expect(messages).toContain(
      'This formula changes along trajectories, so it is no constant of motion here.',
    );
    expect(found(classic({ given: ['x + y'] }))).toEqual(['x + y - log(x) - log(y)']);
    const unread = checkDefinition(classic({ given: ['x + z'] })).find(
      (one) => one.path[0] === 'constantsOfMotion',
    );
    expect(unread?.severity).toBe('error');
  });
});
