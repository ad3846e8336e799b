import { describe, expect, it } from 'vitest';

import { createPreset } from '@/engine/schema/create';
import { addClass, addPopulation, removeClass, removePopulation } from '@/engine/schema/edit';
import { renameInFormula, renameSymbol } from '@/engine/schema/rename';
import type { PresetDocument } from '@/engine/schema/preset';
import { splitPredator, springtailsAndSpiders, withTemplates } from '../../support/example-models';

function renamed(document: PresetDocument, from: string, to: string): PresetDocument {
  const result = renameSymbol(document, from, to);
  if (!result.ok) throw new Error(result.message);
  return result.document;
}

const refusal = (document: PresetDocument, from: string, to: string): string => {
  const result = renameSymbol(document, from, to);
  return result.ok ? '' : result.message;
};

const spiders = withTemplates(
  springtailsAndSpiders(),
  ['predation', { consumer: 'Y', resources: ['x'], response: 'saturating' }],
  ['deaths', { population: 'Y' }],
);

describe('renameSymbol', () => {
  it('renames a class everywhere, the values of its traits included', () => {
    const document = renamed(
      {
        ...spiders,
        box: [{ class: 'y1', from: 0, to: 2 }],
        sweeps: [{ id: 's', name: '', parameter: 'm_y1', from: 0, to: 1 }],
        knownFacts: [
          {
            kind: 'equilibrium',
            at: { x: 1, y1: 2 },
            tolerance: 1,
            type: null,
            parameters: { m_y1: 3 },
            source: '',
          },
        ],
        view: {
          showTwin: true,
          panes: [{ view: 'plane', axes: [{ quantity: 'class', of: 'y1', logarithm: false }] }],
        },
      },
      'y1',
      'male',
    );
    // An intermediate formula has a name of its own, which stays.
    expect(JSON.stringify(document).replaceAll('sat_y1', '')).not.toMatch(/y1/);
    expect(document.processes.map((one) => one.rate)).toContain('a_male_x*x*male/sat_y1');
    expect(document.traits[0]?.entries[0]?.of).toEqual(['male', 'x']);
    expect(document.box[0]?.class).toBe('male');
    expect(document.sweeps[0]?.parameter).toBe('m_male');
    expect(document.knownFacts[0]).toMatchObject({ at: { x: 1, male: 2 }, parameters: { m_male: 3 } });
  });

  it('renames a trait with its dial, and leaves a parameter of the same name alone', () => {
    const document = renamed(
      {
        ...splitPredator(0.3, { parameters: [{ symbol: 'm', name: 'other', value: 1, min: 0, max: 2 }] }),
        sweeps: [{ id: 's', name: '', parameter: 'dial:share', from: 0, to: 1 }],
      },
      'share',
      'born',
    );
    expect(document.processes[1]?.effects.map((one) => one.amount)).toEqual(['-1', 'born_y1', 'born_y2']);
    expect(document.sweeps[0]?.parameter).toBe('dial:born');
    expect(document.parameters[0]?.symbol).toBe('m');
  });

  it('renames a population with its only class, and the settings of templates', () => {
    const document = renamed(spiders, 'x', 'prey');
    expect(document.populations[0]).toMatchObject({ symbol: 'prey', classes: [{ symbol: 'prey' }] });
    expect(document.processes[0]?.template?.settings['resources']).toEqual(['prey']);
    expect(document.traits[0]?.entries[0]?.of).toEqual(['y1', 'prey']);
  });

  it('replaces whole words only, and no word of our own settings', () => {
    expect(renameInFormula('a*aa + a_1 - exp(a)', new Map([['a', 'b']]))).toBe('b*aa + a_1 - exp(b)');
    expect(renameInFormula('a + "', new Map([['a', 'b']]))).toBe('a + "');
    const odd = renamed(renamed(spiders, 'x', 'saturating'), 'saturating', 'z');
    expect(odd.processes[0]?.template?.settings).toMatchObject({ response: 'saturating', resources: ['z'] });
  });

  it('refuses what would clash or could not be read', () => {
    expect(refusal(spiders, 'y1', 'y2')).toBe('y2 is taken by female spiders; choose another name.');
    expect(refusal(spiders, 'y1', 'exp')).toContain('exp cannot be a symbol');
    expect(refusal(spiders, 'y1', '')).toContain('An empty name cannot be a symbol');
    expect(refusal(spiders, 'nothing', 'z')).toBe('Nothing here is called nothing.');
    expect(refusal(spiders, 'm_y1', 'z')).toBe(
      'm_y1 is a value of a trait; rename the trait or the class instead.',
    );
    expect(refusal(spiders, 'm', 'a')).toBe('There is a trait called a already.');
    expect(refusal(spiders, 'y1', 'a'.repeat(30))).toContain('would be too long');
  });
});

describe('edits', () => {
  it('splits a population: the old symbol stays the total, the new class inherits trait values', () => {
    const before = withTemplates(springtailsAndSpiders(), ['deaths', { population: 'x' }]);
    const after = addClass(before, 'x', 'Dark morph');
    expect(after.populations[0]?.classes.map((one) => one.symbol)).toEqual(['x1', 'x2']);
    expect(after.populations[0]?.symbol).toBe('x');
    expect(after.traits[0]?.entries.map((one) => [one.of[0], one.value])).toEqual([
      ['x1', 0.5],
      ['x2', 0.5],
    ]);
    expect(after.processes[0]).toMatchObject({ rate: 'm_x1*x', effects: [{ class: 'x1' }] });
  });

  it('removes a class with its values and effects, and an emptied population with it', () => {
    const document = removeClass(spiders, 'y1');
    expect(document.traits.flatMap((one) => one.entries).some((one) => one.of.includes('y1'))).toBe(false);
    expect(document.processes.flatMap((one) => one.effects).some((one) => one.class === 'y1')).toBe(false);
    expect(removePopulation(document, 'Y').populations.map((one) => one.symbol)).toEqual(['x']);
    expect(removeClass(spiders, 'nobody')).toBe(spiders);
  });

  it('adds a population under a free symbol and hue', () => {
    const document = addPopulation(
      addPopulation(createPreset({ title: 'T', populations: [] }), 'Voles'),
      'Owls',
    );
    expect(document.populations.map((one) => [one.symbol, one.hue])).toEqual([
      ['N', 'weld'],
      ['N_2', 'woad'],
    ]);
  });
});
