import { describe, expect, it } from 'vitest';

import type { PresetDocument } from '@/engine/schema/preset';
import { compileModel } from '@/engine/system/compile-model';
import type { Diagnostic } from '@/engine/system/contract';
import { checkDefinition } from '@/engine/system/diagnostics';
import { splitPredator, springtailsAndSpiders, withTemplates } from '../../support/example-models';

type Process = PresetDocument['processes'][number];

const base = splitPredator(0.3);
const sound = withTemplates(
  springtailsAndSpiders(),
  ['logistic-births', { population: 'x' }],
  ['predation', { consumer: 'Y', resources: ['x'], response: 'saturating' }],
  ['deaths', { population: 'Y' }],
);

const withProcess = (changes: Partial<Process>, document = base): PresetDocument => ({
  ...document,
  processes: [
    ...document.processes,
    {
      id: 'new',
      name: 'New',
      kind: 'other',
      rate: '0',
      effects: [{ class: 'x', amount: '1' }],
      signed: false,
      template: null,
      ...changes,
    },
  ],
});
const parameter = (symbol: string, value = 1, unit = '') => ({
  symbol, name: symbol, value, min: 0, max: 4, unit, meaning: '', standardError: null, source: '',
}); // prettier-ignore

/** The only remark at a place, or a failure that lists what there is. */
function at(document: PresetDocument, path: Diagnostic['path']): Diagnostic {
  const all = checkDefinition(document);
  const found = all.filter((one) => one.path.join('/') === path.join('/'));
  expect(all.map((one) => `${one.path.join('/')}: ${one.message}`)).toContainEqual(
    expect.stringContaining(path.join('/')),
  );
  return found[0] as Diagnostic;
}

describe('checkDefinition', () => {
  it('has nothing to say of sound models', () => {
    expect(checkDefinition(base)).toEqual([]);
    expect(checkDefinition(sound)).toEqual([]);
  });

  it('names the nearest symbol to an unknown one, at its place in the formula', () => {
    expect(at(withProcess({ rate: 'x*share_z1' }), ['processes', 4, 'rate'])).toEqual({
      severity: 'error',
      path: ['processes', 4, 'rate'],
      range: { from: 2, to: 10 },
      message: 'The symbol share_z1 is unknown; share_y1 may be meant.',
      suggestion: 'share_y1',
    });
    expect(at(withProcess({ rate: 'q*x' }), ['processes', 4, 'rate']).message).toBe(
      'The symbol q is unknown; add a parameter or an intermediate formula of this name, or correct it.',
    );
    expect(at(withProcess({ rate: 'm*x' }), ['processes', 4, 'rate']).message).toContain('m is a trait');
    expect(at(withProcess({ rate: 'x*(' }), ['processes', 4, 'rate']).range).not.toBeNull();
  });

  it('tells every unknown symbol of every formula', () => {
    const unknown = checkDefinition(
      withProcess({ rate: 'foo*x + bar*x + foo', effects: [{ class: 'x', amount: 'baz' }] }),
    );
    expect(unknown.filter((one) => one.message.includes('is unknown')).map((one) => one.range?.from)).toEqual(
      [0, 8, 0],
    );
  });

  it('marks symbols that clash', () => {
    expect(at({ ...base, parameters: [parameter('m_y1')] }, ['parameters', 0, 'symbol']).message).toBe(
      'm_y1 stands for both mortality of male predators and m_y1; rename one of them.',
    );
    const twice = { ...base, traits: [...base.traits, ...base.traits.slice(0, 1)] };
    expect(at(twice, ['traits', 2, 'symbol']).message).toBe(
      'There is another trait called m; rename one of them.',
    );
    const total = {
      ...base,
      populations: base.populations.map((one) => (one.symbol === 'Y' ? { ...one, symbol: 'y1' } : one)),
    };
    expect(at(total, ['populations', 1, 'symbol']).severity).toBe('error');
  });

  it('marks shares that do not sum to 1, at each of them', () => {
    const uneven = {
      ...base,
      traits: base.traits.map((trait) =>
        trait.symbol === 'share'
          ? { ...trait, entries: trait.entries.map((one, k) => ({ ...one, value: k === 0 ? 0.5 : 0.4 })) }
          : trait,
      ),
    };
    for (const k of [0, 1]) {
      expect(at(uneven, ['traits', 1, 'entries', k, 'value']).message).toBe(
        'The shares at birth of predators sum to 0.9; they should sum to 1.',
      );
    }
  });

  it('marks values outside their domain, and means that need positive values', () => {
    expect(at(splitPredator(1.5), ['traits', 0, 'entries', 1, 'value']).message).toBe(
      'The mortality of female predators is -0.5 and may not be negative.',
    );
    const geometric = {
      ...splitPredator(1),
      traits: splitPredator(1).traits.map((one) => ({ ...one, mean: 'geometric' as const })),
    };
    expect(at(geometric, ['traits', 0, 'entries', 1, 'value']).message).toBe(
      'The geometric mean needs positive values; enter one or hold the arithmetic mean of mortality.',
    );
  });

  it('marks a dial beyond its end', () => {
    expect(at({ ...splitPredator(0.5), spread: 2.5 }, ['spread']).message).toBe(
      'The spread is 2.5 and ends at 2. Beyond it, mortality of female predators would become negative.',
    );
    const own = {
      ...splitPredator(0.5),
      traits: splitPredator(0.5).traits.map((one) => ({ ...one, dial: -3 })),
    };
    expect(at(own, ['traits', 0, 'dial']).message).toContain('The spread of mortality is -3 and ends at -2');
    expect(checkDefinition({ ...splitPredator(0.01), spread: 50 })).toEqual([]);
  });

  it('marks a rate that becomes negative, with an example, unless it is signed', () => {
    const rate = 'x*(1 - x)';
    const remark = at(withProcess({ rate }), ['processes', 4, 'rate']);
    expect(remark.severity).toBe('warning');
    expect(remark.message).toMatch(
      /^This rate becomes negative, for example -[\d.]+ at x = [\d.]+\. Write gains and losses/,
    );
    const ranged = { ...withProcess({ rate: 'x*(k - 0.5)' }), parameters: [parameter('k')] };
    const inRanges = at(ranged, ['processes', 4, 'rate']);
    expect(inRanges.severity).toBe('note');
    expect(inRanges.message).toMatch(
      /within the ranges of the parameters, for example -[\d.]+ at x = [\d.]+, k = 0\.\d+;/,
    );
    expect(at(withProcess({ rate, signed: true }), ['processes', 4, 'signed']).message).toBe(
      'New has a signed rate: the model is deterministic only, without events of chance.',
    );
    const result = compileModel(withProcess({ rate }));
    expect(result.ok && result.model.report.deterministicOnly).toBe(true);
    const events = compileModel(base);
    expect(events.ok && events.model.report.deterministicOnly).toBe(false);
  });

  it('marks a rate that is nowhere finite', () => {
    expect(at(withProcess({ rate: 'x/(y1 - y1)' }), ['processes', 4, 'rate']).message).toContain(
      'not a finite number',
    );
  });

  it('marks a population that nothing feeds, and classes that never gain or lose', () => {
    const starved = {
      ...base,
      processes: base.processes.map((one) =>
        one.id === 'meals' ? { ...one, effects: one.effects.slice(0, 1) } : one,
      ),
    };
    expect(at(starved, ['populations', 1]).message).toBe(
      'Nothing feeds predators: no process adds to this population, so it can only vanish.',
    );
    const uneven = {
      ...base,
      processes: base.processes.map((one) =>
        one.id === 'meals' ? { ...one, effects: one.effects.slice(0, 2) } : one,
      ),
    };
    expect(at(uneven, ['populations', 1, 'classes', 1]).message).toBe(
      'Nothing adds to female predators, so the class empties.',
    );
    const immortal = { ...base, processes: base.processes.filter((one) => one.id !== 'd2') };
    expect(at(immortal, ['populations', 1, 'classes', 1]).message).toBe(
      'Nothing removes female predators, so the class can only grow.',
    );
    const idle = { ...base, processes: base.processes.slice(0, 1) };
    expect(at(idle, ['populations', 1, 'classes', 0]).message).toBe('No process changes male predators.');
  });

  it('notes what nothing reads', () => {
    expect(at({ ...base, parameters: [parameter('k')] }, ['parameters', 0])).toMatchObject({
      severity: 'note',
      message: 'No formula reads k.',
    });
    const trait = { ...base, processes: base.processes.slice(0, 2) };
    expect(at(trait, ['traits', 0]).message).toBe('No formula reads Mortality.');
    const intermediate = { symbol: 'w', formula: 'x', unit: '', meaning: '' };
    expect(at({ ...base, intermediates: [intermediate] }, ['intermediates', 0]).message).toBe(
      'No formula reads w.',
    );
  });

  it('marks units that do not fit, in a formula and in the flow', () => {
    const units = {
      ...sound,
      parameters: [...sound.parameters, parameter('k', 1, '1/year'), parameter('w', 1, 'mg')],
    };
    const flow = at(withProcess({ rate: 'w*x', kind: 'other' }, units), [
      'processes',
      sound.processes.length,
      'rate',
    ]);
    expect(flow.severity).toBe('warning');
    expect(flow.message).toBe(
      'Rate times amount gives springtails a change in mg^2, where mg year^-1 is due.',
    );
    const sum = at(withProcess({ rate: 'k*x + x' }, units), ['processes', sound.processes.length, 'rate']);
    expect(sum.range).toEqual({ from: 0, to: 7 });
    expect(sum.message).toContain('adds');
    const weekly = {
      ...sound,
      parameters: sound.parameters.map((one) => (one.symbol === 'r_x' ? { ...one, unit: '1/week' } : one)),
    };
    expect(checkDefinition(weekly).some((one) => one.message.includes('convert one of them'))).toBe(true);
    expect(at({ ...sound, timeUnit: '//' }, ['timeUnit']).message).toContain('cannot be read');
    const declared = { ...sound, intermediates: sound.intermediates.map((one) => ({ ...one, unit: 'mg' })) };
    expect(at(declared, ['intermediates', 0, 'formula']).message).toContain('its unit is entered as mg');
  });

  it('marks formulas that need themselves', () => {
    const circular = ['a1', 'b1', 'c1'].map((symbol, k, all) => ({
      symbol,
      formula: `${all[(k + 1) % 3] ?? ''} + 1`,
      unit: '',
      meaning: '',
    }));
    const remarks = checkDefinition({ ...withProcess({ rate: 'a1' }), intermediates: circular }).filter(
      (one) => one.severity === 'error',
    );
    expect(remarks.map((one) => one.message)).toEqual([
      'This formula needs itself: a1 -> b1 -> c1 -> a1. Write one of them without the others.',
    ]);
  });

  it('marks effects on classes that are not there, and processes without any', () => {
    expect(
      at(withProcess({ effects: [{ class: 'y3', amount: '1' }] }), ['processes', 4, 'effects', 0, 'class']),
    ).toMatchObject({
      message: 'There is no class y3; y1 may be meant.',
      suggestion: 'y1',
    });
    expect(at(withProcess({ effects: [] }), ['processes', 4, 'effects']).message).toBe(
      'New changes no class; say what one event does.',
    );
  });

  it('notes explicit time, kinks and harvest', () => {
    expect(
      at({ ...withProcess({ rate: 'x*(1 + cos(w*t))' }), parameters: [parameter('w', 6, '1/year')] }, [
        'processes',
        4,
        'rate',
      ]),
    ).toMatchObject({
      severity: 'note',
      message: expect.stringContaining('contains the time t') as string,
    });
    expect(at(withProcess({ rate: 'min(x, y1)' }), ['processes', 4, 'rate'])).toMatchObject({
      severity: 'note',
      message: expect.stringContaining('has a kink') as string,
    });
    expect(
      at(withProcess({ kind: 'harvest', rate: 'x', effects: [{ class: 'x', amount: '-1' }] }), [
        'processes',
        4,
      ]).message,
    ).toContain('A model is no permit');
  });

  it('marks starts, box sides and sweeps that contradict the rest', () => {
    const negative = {
      ...base,
      populations: base.populations.map((one) => ({
        ...one,
        classes: one.classes.map((two) => ({ ...two, start: -1 })),
      })),
    };
    expect(at(negative, ['populations', 0, 'classes', 0, 'start']).message).toBe(
      'The start value of x is -1; a density may not be negative.',
    );
    expect(at({ ...base, box: [{ class: 'x', from: 2, to: 1 }] }, ['box', 0, 'to']).severity).toBe('error');
    expect(at({ ...base, box: [{ class: 'q', from: 0, to: 1 }] }, ['box', 0, 'class']).severity).toBe(
      'warning',
    );
    expect(
      at({ ...base, sweeps: [{ id: 's', name: '', parameter: 'm_y3', from: 0, to: 1 }] }, [
        'sweeps',
        0,
        'parameter',
      ]),
    ).toMatchObject({
      message: 'This sweep moves m_y3, which is no parameter; m_y1 may be meant.',
      suggestion: 'm_y1',
    });
    for (const parameter of ['spread', 'dial:spread', 'dial:m', 'm_y1']) {
      expect(
        checkDefinition({ ...base, sweeps: [{ id: 's', name: '', parameter, from: 0, to: 1 }] }),
      ).toEqual([]);
    }
  });

  it('marks trait values of classes that are gone, and models without a population', () => {
    const gone = {
      ...base,
      traits: base.traits.map((one) => ({
        ...one,
        entries: one.entries.map((two) => ({ ...two, of: ['z'] })),
      })),
    };
    expect(at(gone, ['traits', 0, 'entries', 0, 'of']).message).toBe(
      'There is no class z; remove this value or choose a class.',
    );
    expect(at({ ...base, populations: [], traits: [], processes: [] }, ['populations']).message).toBe(
      'The model has no population yet; add one to begin.',
    );
  });

  it('puts errors first, and keeps a model with one from being compiled', () => {
    const document = withProcess({ rate: 'q*x' }, { ...base, parameters: [parameter('k')] });
    const result = compileModel(document);
    expect(result.ok).toBe(false);
    expect(!result.ok && result.diagnostics.map((one) => one.severity)).toEqual(['error', 'note']);
  });
});
