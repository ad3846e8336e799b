import fc from 'fast-check';
import { describe, expect, it } from 'vitest';

import { createPreset } from '@/engine/schema/create';
import { presetSchema, type PresetDocument } from '@/engine/schema/preset';
import { compileModel } from '@/engine/system/compile-model';
import { checkDefinition } from '@/engine/system/diagnostics';
import { splitPredator, withTemplates } from '../../support/example-models';

const word = fc.constantFrom(
  'x', 'y1', 'Y', 'm_y1', 'm', 'share_y2', 't', 'exp', 'log', 'min', 'abs', 'zz', '(', ')', ',', '+', '-', '*', '/', '^',
  '<', '==', '?', ':', '0', '1e308', '.5', "'", '**', ' ',
); // prettier-ignore
const formula = fc.oneof(
  fc.array(word, { maxLength: 14 }).map((words) => words.join('')),
  fc.string({ maxLength: 30 }),
);
const number = fc.oneof(
  fc.constantFrom(0, 1, -1, 1e-300, 1e300, -1e300, 0.5),
  fc.double({ noNaN: true, noDefaultInfinity: true }),
);

/** Five populations of six classes that all eat, compete with and are eaten by one another. */
function largestModel(): PresetDocument {
  const names = ['A', 'B', 'C', 'D', 'E'];
  const empty = createPreset({
    title: 'Large',
    populations: names.map((symbol) => ({
      symbol,
      name: symbol,
      hue: 'weld' as const,
      classes: Array.from({ length: 6 }, (_, k) => ({
        symbol: `${symbol}${k + 1}`,
        name: `${k + 1}`,
        start: 1,
      })),
    })),
  });
  return withTemplates(empty, ...names.map((population) => ['logistic-births', { population }] as const), [
    'predation',
    {
      consumer: 'E',
      resources: ['A', 'B', 'C'],
      response: 'saturating',
      attack: 'per consumer class',
      eaters: ['E1'],
    },
  ]);
}

describe('documents of any content', () => {
  it('are compiled or refused with remarks in words, never with an exception', () => {
    fc.assert(
      fc.property(
        formula,
        formula,
        formula,
        number,
        number,
        number,
        (rate, amount, intermediate, value, spread, start) => {
          const base = splitPredator(0.3);
          const document = presetSchema.safeParse({
            ...base,
            spread,
            traits: base.traits.map((one, k) => ({
              ...one,
              mean: k === 0 ? 'harmonic' : 'geometric',
              entries: one.entries.map((two) => ({ ...two, value })),
            })),
            populations: base.populations.map((one) => ({
              ...one,
              classes: one.classes.map((two) => ({ ...two, start })),
            })),
            intermediates: [{ symbol: 'w', formula: intermediate }],
            processes: [...base.processes, { id: 'p', name: 'p', rate, effects: [{ class: 'y1', amount }] }],
            constantsOfMotion: [intermediate],
          });
          if (!document.success) return;
          const result = compileModel(document.data);
          const remarks = result.ok ? result.model.report.diagnostics : result.diagnostics;
          expect(result.ok).toBe(!remarks.some((one) => one.severity === 'error'));
          for (const one of remarks) expect(one.message.length).toBeGreaterThan(10);
        },
      ),
      { numRuns: 400, seed: 7 },
    );
  });

  it('of the largest size are compiled in no time that one would notice, even on a busy machine', () => {
    const document = largestModel();
    expect(presetSchema.safeParse(document).success).toBe(true);
    const began = performance.now();
    const result = compileModel(document);
    if (!result.ok) throw new Error(result.diagnostics.map((one) => one.message).join(' '));
    expect(result.model.system.dimension).toBe(30);
    expect(result.model.report.equations).toHaveLength(30);
    expect(performance.now() - began).toBeLessThan(4_000);
  });

  it('with formulas that nearly fill the graph still run, with a twin or with the reason why not', () => {
    const base = splitPredator(0.3);
    const large = (count: number): PresetDocument => ({
      ...base,
      constantsOfMotion: ['x + Y'],
      processes: Array.from({ length: count }, (_, k) => ({
        ...(base.processes[2] as PresetDocument['processes'][number]),
        id: `p${k}`,
        rate: Array.from({ length: 65 }, (_unused, j) => `sin(exp(-m_y1*x*${k}.${j + 10}))*y1`).join(' + '),
      })),
    });
    const kinds = [20, 90, 110, 130, 170].map((count) => {
      const result = compileModel(large(count));
      if (!result.ok) return result.diagnostics[0]?.message;
      const { system, twin, starts } = result.model;
      const J = new Float64Array(9);
      system.jacobian(0, starts, J);
      expect(J.every(Number.isFinite)).toBe(true);
      twin.system?.jacobian(0, starts, J);
      expect(J.every(Number.isFinite)).toBe(true);
      return twin.report.kind;
    });
    expect(kinds[0]).toBe('unlumped');
    expect(kinds.at(-1)).toContain('make the model smaller');
    expect(kinds).toContain('not-comparable');
  });

  it('survive a reading and writing of the document without a change in the checks', () => {
    const document = largestModel();
    const again = presetSchema.parse(JSON.parse(JSON.stringify(document)));
    expect(checkDefinition(again)).toEqual(checkDefinition(document));
  });
});
