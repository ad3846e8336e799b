import { describe, expect, it } from 'vitest';

import { createPreset } from '@/engine/schema/create';
import { presetSchema, TEMPLATE_NAMES, type PresetDocument, type TemplateName } from '@/engine/schema/preset';
import { applyTemplate, isFieldShown, TEMPLATES, templateNamed } from '@/engine/schema/templates';
import { evaluateNodes } from '@/engine/system/evaluate-graph';
import { buildModelGraph } from '@/engine/system/model-graph';
import { springtailsAndSpiders, withTemplates } from '../../support/example-models';

const base = springtailsAndSpiders();

/** Names, rates and effects of what a template writes into the base model. */
function written(name: TemplateName, settings: Record<string, unknown>, document = base) {
  const result = withTemplates(document, [name, settings]);
  return result.processes
    .slice(document.processes.length)
    .map((one) => [
      one.name,
      one.rate,
      Object.fromEntries(one.effects.map((effect) => [effect.class, effect.amount])),
    ]);
}

function refusals(name: TemplateName, settings: Record<string, unknown>, document = base): string[] {
  const outcome = applyTemplate(document, name, settings);
  return outcome.ok ? [] : outcome.problems.map((one) => `${one.field}: ${one.message}`);
}

describe('templates', () => {
  it('has one for every name, each with fields whose names its settings know', () => {
    expect(TEMPLATES.map((one) => one.name)).toEqual([...TEMPLATE_NAMES]);
    for (const template of TEMPLATES) {
      const known = Object.keys(template.defaults());
      for (const field of template.fields) expect(known, template.name).toContain(field.name);
      expect(templateNamed(template.name)).toBe(template);
    }
  });

  it('shows the fields that matter', () => {
    const { fields, defaults } = templateNamed('predation');
    const shown = (settings: Record<string, unknown>) =>
      fields
        .filter((field) => isFieldShown(field, fields, { ...defaults(), ...settings }, base))
        .map((one) => one.name);
    expect(shown({ consumer: 'Y' })).toEqual([
      'consumer',
      'eaters',
      'resources',
      'response',
      'attack',
      'attackTrait',
      'births',
      'conversion',
      'newborns',
      'shares',
      'seasonal',
    ]);
    expect(shown({ consumer: 'Y', births: false })).not.toContain('shares');
    expect(shown({ consumer: 'Y', response: 'sigmoid' })).toContain('handlingTime');
    expect(shown({ consumer: 'x' })).not.toContain('newborns');
  });

  it('keeps the place of processes that it writes again', () => {
    const two = withTemplates(base, ['deaths', { population: 'x' }], ['deaths', { population: 'Y' }]);
    const again = applyTemplate(two, 'deaths', { population: 'x', rate: 'one' }, 'deaths-1');
    expect(again.ok && again.document.processes.map((one) => one.rate)).toEqual([
      'm_x_2*x',
      'm_y1*y1',
      'm_y2*y2',
    ]);
    expect(again.ok && again.document.processes[0]?.template?.settings['rate']).toBe('one');
  });

  it('writes exponential births, pooled with shares', () => {
    expect(written('exponential-births', { population: 'Y' })).toEqual([
      ['Births of spiders', 'b_Y*Y', { y1: 'share_y1', y2: 'share_y2' }],
    ]);
    expect(written('exponential-births', { population: 'Y', rate: 'per class' })[0]?.[1]).toBe(
      '(b_y1*y1 + b_y2*y2)',
    );
    expect(written('exponential-births', { population: 'Y', newborns: 'own class' })).toEqual([
      ['Births of male spiders', 'b_Y*y1', { y1: '1' }],
      ['Births of female spiders', 'b_Y*y2', { y2: '1' }],
    ]);
    expect(written('exponential-births', { population: 'x' })).toEqual([
      ['Births of springtails', 'b_x*x', { x: '1' }],
    ]);
  });

  it('writes logistic growth as births and deaths that are never negative', () => {
    expect(written('logistic-births', { population: 'x' })).toEqual([
      ['Births of springtails', '(r_x + v_x)*x', { x: '1' }],
      ['Deaths by crowding of springtails', '(v_x + r_x*x/K_x)*x', { x: '-1' }],
    ]);
    expect(written('logistic-births', { population: 'Y' })[2]).toEqual([
      'Deaths by crowding of female spiders',
      '(v_Y + r_Y*Y/K_Y)*y2',
      { y2: '-1' },
    ]);
  });

  it('writes births by females and through mating', () => {
    expect(written('births-by-females', { population: 'Y', females: ['y2'] })).toEqual([
      ['Births of spiders, by females', 'b_Y*y2', { y1: 'share_y1', y2: 'share_y2' }],
    ]);
    const sexes = { population: 'Y', females: ['y2'], males: ['y1'] };
    expect(written('births-by-mating', sexes)[0]?.[1]).toBe('2*b_Y*y2*y1/(y2 + y1)');
    expect(written('births-by-mating', { ...sexes, mating: 'minimum' })[0]?.[1]).toBe('b_Y*min(y2, y1)');
  });

  it('writes linear predation per pair of classes, with young shared out', () => {
    const young = { x: '-1', y1: 'e_Y*share_y1', y2: 'e_Y*share_y2' };
    expect(written('predation', { consumer: 'Y', resources: ['x'] })).toEqual([
      ['Springtails eaten by male spiders', 'a_y1_x*x*y1', young],
      ['Springtails eaten by female spiders', 'a_y2_x*x*y2', young],
    ]);
  });

  it('gives a consumer class one saturation over all that it eats', () => {
    const two: PresetDocument = {
      ...base,
      populations: [
        ...base.populations,
        {
          symbol: 'Z',
          name: 'Mites',
          hue: 'madder',
          sign: 'nonnegative',
          classes: ['z1', 'z2'].map((symbol) => ({ symbol, name: symbol, shade: 0, start: 1 })),
        },
      ],
    };
    const settings = {
      consumer: 'Y',
      resources: ['x', 'Z'],
      response: 'saturating',
      handling: 'per consumer class',
    };
    const document = withTemplates(two, ['predation', settings]);
    expect(document.intermediates.map((one) => [one.symbol, one.formula])).toEqual([
      ['sat_y1', '1 + h_y1*(a_y1_x*x + a_y1_z1*z1 + a_y1_z2*z2)'],
      ['sat_y2', '1 + h_y2*(a_y2_x*x + a_y2_z1*z1 + a_y2_z2*z2)'],
    ]);
    expect(document.processes.map((one) => one.rate)).toEqual([
      'a_y1_x*x*y1/sat_y1', 'a_y1_z1*z1*y1/sat_y1', 'a_y1_z2*z2*y1/sat_y1',
      'a_y2_x*x*y2/sat_y2', 'a_y2_z1*z1*y2/sat_y2', 'a_y2_z2*z2*y2/sat_y2',
    ]); // prettier-ignore
    expect(refusals('predation', { consumer: 'Y', resources: ['x'] }, document)).toEqual([
      'consumer: This consumer eats already; add the resource to that predation instead, so that all its food shares one saturation.',
    ]);
    const sigmoid = withTemplates(two, ['predation', { ...settings, response: 'sigmoid', attack: 'one' }]);
    expect(sigmoid.intermediates[0]?.formula).toBe('1 + h_y1*(a_Y*x^2 + a_Y*z1^2 + a_Y*z2^2)');
    expect(sigmoid.processes[0]?.rate).toBe('a_Y*x^2*y1/sat_y1');
  });

  it('replaces what an earlier use wrote, orphaned saturations included', () => {
    const first = applyTemplate(base, 'predation', {
      consumer: 'Y',
      resources: ['x'],
      response: 'saturating',
    });
    if (!first.ok) throw new Error('refused');
    const again = applyTemplate(
      first.document,
      'predation',
      { consumer: 'Y', resources: ['x'] },
      first.group,
    );
    if (!again.ok) throw new Error('refused');
    expect(again.group).toBe(first.group);
    expect(again.document.intermediates).toEqual([]);
    expect(again.document.processes.map((one) => one.rate)).toEqual(['a_y1_x*x*y1', 'a_y2_x*x*y2']);
    expect(again.document.traits.map((one) => one.symbol)).toEqual(['a', 'share']);
  });

  it('writes deaths, competition, maturation, switching, harvests and immigration', () => {
    expect(written('deaths', { population: 'Y' })[1]).toEqual([
      'Deaths of female spiders',
      'm_y2*y2',
      { y2: '-1' },
    ]);
    expect(written('deaths', { population: 'Y', rate: 'one', classes: ['y1'] })).toEqual([
      ['Deaths of male spiders', 'm_Y*y1', { y1: '-1' }],
    ]);
    expect(
      written('competition', { population: 'Y', rivals: ['Y', 'x'] }).map((one) => one.slice(0, 2)),
    ).toEqual([
      ['Male spiders crowded out by their own kind', 'c_Y_Y*Y*y1'],
      ['Female spiders crowded out by their own kind', 'c_Y_Y*Y*y2'],
      ['Male spiders crowded out by springtails', 'c_Y_x*x*y1'],
      ['Female spiders crowded out by springtails', 'c_Y_x*x*y2'],
    ]);
    expect(written('competition', { population: 'x', rivals: ['Y'], strength: 'per pair' })[0]?.[1]).toBe(
      '(c_x_y1*y1 + c_x_y2*y2)*x',
    );
    expect(written('maturation', { population: 'Y', from: 'y1', to: 'y2' })).toEqual([
      ['Male spiders grow into female spiders', 'g_y1*y1', { y1: '-1', y2: '1' }],
    ]);
    expect(written('switching', { population: 'Y', from: 'y1', to: 'y2' }).map((one) => one[1])).toEqual([
      'w_y1*y1',
      'w_y2*y2',
    ]);
    expect(written('harvest-effort', { population: 'Y' })[0]).toEqual([
      'Harvest of male spiders',
      'q_y1*E*y1',
      { y1: '-1' },
    ]);
    expect(written('harvest-quota', { population: 'Y' })[0]?.[1]).toBe('Q_Y*y1/(Y + c_Y)');
    expect(written('harvest-quota', { population: 'x' })[0]?.[1]).toBe('Q_x*x/(x + c_x)');
    expect(written('immigration', { population: 'Y' })).toEqual([
      ['Immigration of spiders', 'I_Y', { y1: '1/2', y2: '1/2' }],
    ]);
  });

  it('multiplies by a season that two templates share', () => {
    const season = '*(1 + season_strength*cos(6.283185307179586*(t - season_peak)/season_period))';
    const document = withTemplates(
      base,
      ['exponential-births', { population: 'x', seasonal: true }],
      ['deaths', { population: 'x', seasonal: true }],
    );
    expect(document.processes.map((one) => one.rate)).toEqual([`b_x*x${season}`, `m_x*x${season}`]);
    expect(document.parameters.map((one) => one.symbol)).toEqual([
      'season_strength',
      'season_period',
      'season_peak',
      'b_x',
    ]);
  });

  it('adds traits and parameters with units, roles and ranges', () => {
    const document = withTemplates(
      base,
      ['predation', { consumer: 'Y', resources: ['x'], response: 'saturating' }],
      ['harvest-quota', { population: 'x' }],
    );
    const trait = document.traits[0];
    expect([trait?.symbol, trait?.role, trait?.per, trait?.domain, trait?.unit]).toEqual([
      'a',
      'attack',
      'pair',
      'rate',
      '1/(mg*year)',
    ]);
    expect(document.traits[1]?.followsSpread).toBe(false);
    expect(Object.fromEntries(document.parameters.map((one) => [one.symbol, one.unit]))).toEqual({
      h_Y: 'year', e_Y: '', Q_x: 'mg/year', c_x: 'mg',
    }); // prettier-ignore
    expect(presetSchema.safeParse(document).success).toBe(true);
  });

  it('uses symbols that it is given, and chooses free ones itself', () => {
    const given = withTemplates(base, ['exponential-births', { population: 'x', birthRate: 'beta' }]);
    expect(given.processes[0]?.rate).toBe('beta*x');
    const reused = withTemplates(given, ['exponential-births', { population: 'Y', birthRate: 'beta' }]);
    expect(reused.parameters.map((one) => one.symbol)).toEqual(['beta']);
    const taken = withTemplates(
      { ...base, parameters: given.parameters.map((one) => ({ ...one, symbol: 'b_x' })) },
      ['exponential-births', { population: 'x' }],
    );
    expect(taken.processes[0]?.rate).toBe('b_x_2*x');
    const clash = withTemplates(
      { ...base, parameters: given.parameters.map((one) => ({ ...one, symbol: 'm_y1' })) },
      ['deaths', { population: 'Y' }],
    );
    expect(clash.processes[0]?.rate).toBe('m2_y1*y1');
  });

  it('refuses in words, at the field', () => {
    expect(refusals('deaths', {})).toEqual(['population: Choose a population.']);
    expect(refusals('deaths', { population: 'W' })).toEqual(['population: There is no population called W.']);
    expect(refusals('deaths', { population: 'Y', rate: 'sometimes' })).toEqual([
      'rate: This setting cannot be read; choose one of the options.',
    ]);
    expect(refusals('deaths', { population: 'Y', rate: 'one', mortalityRate: 'y1' })).toEqual([
      'mortalityRate: y1 is taken by male spiders; choose another symbol.',
    ]);
    expect(refusals('deaths', { population: 'Y', rate: 'one', mortalityRate: '2x' })[0]).toContain(
      '2x cannot be a symbol',
    );
    expect(refusals('predation', { consumer: 'Y' })).toEqual([
      'resources: Choose at least one population that is eaten.',
    ]);
    expect(refusals('births-by-females', { population: 'Y' })).toEqual([
      'females: Choose the class that gives birth.',
    ]);
    expect(refusals('births-by-mating', { population: 'Y', females: ['y1'], males: ['y1'] })).toEqual([
      'males: y1 cannot be female and male at once.',
    ]);
    expect(refusals('maturation', { population: 'Y', from: 'y1', to: 'y1' })).toEqual([
      'to: A class cannot turn into itself; choose another.',
    ]);
    expect(
      refusals('exponential-births', { population: 'Y', newborns: 'one class', newbornClass: 'x' }),
    ).toEqual(['newbornClass: Choose the class of spiders that the young belong to.']);
  });

  it('writes rates that are never negative, over all ranges and at the edges of the state space', () => {
    const sexes = { population: 'Y', females: ['y2'], males: ['y1'] };
    const uses: readonly (readonly [TemplateName, Record<string, unknown>])[] = [
      ...(['shares', 'own class'] as const).map(
        (newborns) => ['logistic-births', { population: 'Y', newborns }] as const,
      ),
      ['exponential-births', { population: 'x', rate: 'per class' }],
      ['births-by-females', { population: 'Y', females: ['y2'] }],
      ['births-by-mating', sexes],
      ['births-by-mating', { ...sexes, mating: 'minimum' }],
      ['deaths', { population: 'Y' }],
      ...(['linear', 'saturating', 'sigmoid'] as const).flatMap((response) =>
        (['one', 'per consumer class', 'per resource class', 'per pair'] as const).map(
          (attack) => ['predation', { consumer: 'Y', resources: ['x'], response, attack }] as const,
        ),
      ),
      ...(['one', 'per class', 'per pair'] as const).map(
        (strength) => ['competition', { population: 'Y', rivals: ['x', 'Y'], strength }] as const,
      ),
      ['maturation', { population: 'Y', from: 'y1', to: 'y2' }],
      ['switching', { population: 'Y', from: 'y1', to: 'y2' }],
      ['harvest-effort', { population: 'Y' }],
      ['harvest-quota', { population: 'Y', classes: ['y1'] }],
      ['immigration', { population: 'Y' }],
      ['immigration', { population: 'Y', rate: 'per class' }],
    ];
    let checked = 0;
    for (const seasonal of [false, true]) {
      for (const [name, settings] of uses) {
        const document = withTemplates(base, [name, { ...settings, seasonal }]);
        const { model } = buildModelGraph(document);
        if (model === null) throw new Error(`${name} does not build`);
        const evaluate = evaluateNodes(
          model.graph,
          model.processes.map((one) => one.rate),
        );
        const out = new Float64Array(model.processes.length);
        for (let k = 0; k < 81; k += 1) {
          const u = [k % 3, Math.floor(k / 3) % 3, Math.floor(k / 9) % 3].map(
            (level) => [0, 0.7, 30][level] ?? 0,
          );
          const p = Float64Array.from(model.defaults);
          document.parameters.forEach((one, i) => (p[i] = [one.min, one.value, one.max][(k + i) % 3] ?? 0));
          evaluate(0.37 * k, u, p, out);
          const defined = name === 'births-by-mating' && u[1] === 0 && u[2] === 0 ? [] : [...out];
          for (const rate of defined)
            expect(rate, `${name} ${JSON.stringify(settings)}`).toBeGreaterThanOrEqual(0);
          checked += defined.length;
        }
      }
    }
    expect(checked).toBeGreaterThan(5_000);
  });

  it('takes no more from a class than is there: the quota fades with the stock', () => {
    const document = withTemplates(createPreset({ ...base, processes: [] }), [
      'harvest-quota',
      { population: 'x' },
    ]);
    const { model } = buildModelGraph(document);
    const rate = new Float64Array(1);
    const evaluate = evaluateNodes(
      model?.graph ?? (null as never),
      model?.processes.map((one) => one.rate) ?? [],
    );
    evaluate(0, [0, 0, 0], model?.defaults ?? [], rate);
    expect(rate[0]).toBe(0);
    evaluate(0, [0.1, 0, 0], model?.defaults ?? [], rate);
    expect(rate[0]).toBe(0.25);
  });
});
