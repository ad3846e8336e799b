import { describe, expect, it } from 'vitest';

import { createPreset } from '@/engine/schema/create';
import { addClass, addPopulation, removeClass, removePopulation } from '@/engine/schema/edit';
import { checkDefinition } from '@/engine/system/diagnostics';
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
  it('splits a population: the old symbol stays the total, templates take the new class in', () => {
    const before = withTemplates(
      springtailsAndSpiders(),
      ['exponential-births', { population: 'x' }],
      ['predation', { consumer: 'Y', resources: ['x'], response: 'saturating' }],
      ['deaths', { population: 'x' }],
    );
    const after = addClass(
      { ...before, sweeps: [{ id: 's', name: '', parameter: 'm_x', from: 0, to: 1 }] },
      'x',
      'Dark morph',
    );
    expect(after.populations[0]?.classes.map((one) => [one.symbol, one.start])).toEqual([
      ['x1', 0.25],
      ['x2', 0.25],
    ]);
    expect(after.populations[0]?.symbol).toBe('x');
    expect(after.sweeps[0]?.parameter).toBe('m_x1');
    expect(after.processes.map((one) => one.rate)).toEqual([
      'b_x*x', 'a_y1_x1*x1*y1/sat_y1', 'a_y1_x2*x2*y1/sat_y1',
      'a_y2_x1*x1*y2/sat_y2', 'a_y2_x2*x2*y2/sat_y2', 'm_x1*x1', 'm_x2*x2',
    ]); // prettier-ignore
    expect(after.intermediates[0]?.formula).toBe('1 + h_Y*(a_y1_x1*x1 + a_y1_x2*x2)');
    expect(
      checkDefinition(after).filter((one) => one.severity !== 'note' && one.path[0] !== 'populations'),
    ).toEqual([]);
    const shares = after.traits
      .find((one) => one.role === 'share-of-births')
      ?.entries.map((one) => [one.of[0], one.value]);
    expect(shares).toEqual([
      ['y1', 0.5],
      ['y2', 0.5],
      ['x1', 0.5],
      ['x2', 0.5],
    ]);
    const third = addClass(after, 'Y', 'Sterile');
    expect(
      third.traits
        .find((one) => one.role === 'share-of-births')
        ?.entries.filter((one) => one.of[0]?.startsWith('Y') || one.of[0]?.startsWith('y'))
        .map((one) => one.value),
    ).toEqual([0.5, 0.25, 0.25]);
    expect(checkDefinition(third).filter((one) => one.severity === 'error')).toEqual([]);
  });

  it('leaves what was written or changed by hand to its author', () => {
    const written = withTemplates(springtailsAndSpiders(), ['deaths', { population: 'x' }]);
    const changed = {
      ...written,
      processes: written.processes.map((one) => ({ ...one, rate: `2*${one.rate}` })),
    };
    expect(addClass(changed, 'x', 'Dark').processes.map((one) => [one.rate, one.effects[0]?.class])).toEqual([
      ['2*m_x1*x', 'x1'],
    ]);
  });

  it('takes a removed class out of templates, and scales the shares that stay', () => {
    const document = withTemplates(
      springtailsAndSpiders(),
      ['births-by-females', { population: 'Y', females: ['y2'] }],
      ['deaths', { population: 'Y' }],
    );
    const rest = removeClass(document, 'y1');
    expect(rest.processes.map((one) => one.rate)).toEqual(['b_Y*Y', 'm_y2*y2']);
    expect(rest.traits[0]?.entries.map((one) => [one.of[0], one.value])).toEqual([['y2', 1]]);
    expect(removeClass(document, 'y2').processes.map((one) => one.rate)).toEqual(['m_y1*y1']);
    expect(removePopulation(document, 'Y').processes).toEqual([]);
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
