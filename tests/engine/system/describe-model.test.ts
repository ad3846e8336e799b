import { describe, expect, it } from 'vitest';

import type { PresetDocument } from '@/engine/schema/preset';
import { compileModel } from '@/engine/system/compile-model';
import type { ModelReport } from '@/engine/system/contract';
import { splitPredator, springtailsAndSpiders, withTemplates } from '../../support/example-models';

function reportOf(document: PresetDocument): ModelReport {
  const result = compileModel(document);
  if (!result.ok) throw new Error(result.diagnostics.map((one) => one.message).join(' '));
  return result.model.report;
}

describe('describeModel', () => {
  it('typesets the equations as the processes write them, with the totals that they read', () => {
    const report = reportOf(splitPredator(0.3));
    expect(report.equations.map((one) => one.tex)).toEqual([
      '\\dot{x} = x - x \\, Y',
      '\\dot{y}_{1} = \\mathrm{share}_{y1} \\, x \\, Y - m_{y1} \\, y_{1}',
      '\\dot{y}_{2} = \\mathrm{share}_{y2} \\, x \\, Y - m_{y2} \\, y_{2}',
    ]);
    expect(report.intermediates).toEqual([{ symbol: 'Y', tex: 'Y = y_{1} + y_{2}' }]);
  });

  it('typesets intermediate formulas and keeps sums in parentheses', () => {
    const report = reportOf(
      withTemplates(
        springtailsAndSpiders(),
        ['logistic-births', { population: 'x' }],
        ['predation', { consumer: 'Y', resources: ['x'], response: 'saturating', attack: 'one' }],
        ['deaths', { population: 'Y', rate: 'one' }],
      ),
    );
    expect(report.equations[0]?.tex).toBe(
      '\\dot{x} = \\left(r_{x} + v_{x}\\right) \\, x - \\left(v_{x} + \\frac{r_{x} \\, x}{K_{x}}\\right) \\, x - \\frac{a_{Y} \\, x \\, y_{1}}{\\mathrm{sat}_{y1}} - \\frac{a_{Y} \\, x \\, y_{2}}{\\mathrm{sat}_{y2}}',
    );
    expect(report.intermediates[0]?.tex).toBe('\\mathrm{sat}_{y1} = 1 + h_{Y} \\, a_{Y} \\, x');
  });

  it('draws each process from what it takes to what it adds', () => {
    const { diagram } = reportOf(splitPredator(0.3));
    expect(diagram.nodes.map((one) => [one.id, one.label, one.population])).toEqual([
      ['x', 'Prey', 'x'],
      ['y1', 'Male predators', 'Y'],
      ['y2', 'Female predators', 'Y'],
    ]);
    expect(diagram.arrows.map((one) => [one.process, one.from, one.to, one.influences.join(' ')])).toEqual([
      ['births', null, 'x', 'x'],
      ['meals', 'x', 'y1', 'x y1 y2'],
      ['meals', 'x', 'y2', 'x y1 y2'],
      ['d1', 'y1', null, 'y1'],
      ['d2', 'y2', null, 'y2'],
    ]);
  });

  it('lists what can be moved, with ranges from domains and from the ends of the dials', () => {
    const parameters = [{ symbol: 'k', name: 'Capacity', value: 2, min: 1, max: 3, unit: 'mg' }];
    const list = reportOf(splitPredator(0.25, { parameters })).parameters;
    expect(list.map((one) => [one.key, one.label, one.group, one.min, one.max])).toEqual([
      ['k', 'Capacity', 'parameter', 1, 3],
      ['m_y1', 'mortality of male predators', 'trait', 0, 3.75],
      ['m_y2', 'mortality of female predators', 'trait', 0, 2.25],
      ['share_y1', 'share of births of male predators', 'trait', 0, 1],
      ['share_y2', 'share of births of female predators', 'trait', 0, 1],
      ['dial:m', 'Spread of mortality', 'dial', -4, 4],
      ['dial:spread', 'Spread', 'dial', 0, 4],
    ]);
  });

  it('says what a model allows', () => {
    const report = reportOf(splitPredator(0));
    expect(report).toMatchObject({
      valid: true,
      autonomous: true,
      smooth: true,
      deterministicOnly: false,
      harvested: false,
    });
    expect(report.constantsOfMotion).toEqual(['x + Y - log(x) - log(Y)']);
    expect(report.twin.kind).toBe('lumped');
    const seasonal = reportOf(
      withTemplates(
        springtailsAndSpiders(),
        ['exponential-births', { population: 'x', seasonal: true }],
        ['births-by-mating', { population: 'Y', females: ['y1'], males: ['y2'], mating: 'minimum' }],
        ['harvest-quota', { population: 'x' }],
        ['deaths', { population: 'Y' }],
      ),
    );
    expect(seasonal).toMatchObject({
      autonomous: false,
      smooth: false,
      harvested: true,
      constantsOfMotion: [],
    });
  });
});
