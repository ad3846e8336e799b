import { describe, expect, it } from 'vitest';

import { createPreset } from '@/engine/schema/create';
import type { PresetDocument, Trait } from '@/engine/schema/preset';
import { compileModel } from '@/engine/system/compile-model';
import { effectiveTraitValues, meanValue, spreadGroups, spreadValue } from '@/engine/system/spread';
import { spreadLimits } from '@/engine/system/spread-limits';
import { splitPredator } from '../../support/example-models';

/** Two classes with the values 1 and 4 of one trait, born in the given shares. */
function pair(
  mean: Trait['mean'],
  shares: readonly [number, number] | null,
  changes: Partial<Trait> = {},
): PresetDocument {
  return createPreset({
    title: 'Pair',
    populations: [
      {
        symbol: 'N',
        name: 'Voles',
        hue: 'weld',
        classes: [
          { symbol: 'n1', name: 'Males', start: 1 },
          { symbol: 'n2', name: 'Females', start: 1 },
        ],
      },
    ],
    traits: [
      {
        symbol: 'm',
        name: 'Mortality',
        mean,
        ...changes,
        entries: [
          { of: ['n1'], value: 1 },
          { of: ['n2'], value: 4 },
        ],
      },
      ...(shares === null
        ? []
        : [
            {
              symbol: 'share',
              name: 'Share of births',
              role: 'share-of-births' as const,
              domain: 'share' as const,
              followsSpread: false,
              entries: shares.map((value, k) => ({ of: [`n${k + 1}`], value })),
            },
          ]),
    ],
    processes: ['n1', 'n2'].map((symbol) => ({
      id: symbol,
      name: symbol,
      rate: `m_${symbol}`,
      effects: [{ class: symbol, amount: '1' }],
    })),
  });
}

const inForce = (document: PresetDocument, values: Record<string, number> = {}): number[] =>
  effectiveTraitValues(document, values)
    .values.filter((one) => one.trait === 'm')
    .map((one) => one.effective);

describe('spread', () => {
  it('holds the arithmetic mean: 1 and 4 give 2.5, at spread 1/2 1.75 and 3.25', () => {
    const document = pair('arithmetic', null);
    expect(inForce(document, { 'dial:spread': 0 })).toEqual([2.5, 2.5]);
    expect(inForce(document, { 'dial:spread': 0.5 })).toEqual([1.75, 3.25]);
    expect(inForce(document, { 'dial:spread': 1 })).toEqual([1, 4]);
  });

  it('holds the geometric mean: 1 and 4 give 2, at spread 2 1/2 and 8', () => {
    const document = pair('geometric', null);
    inForce(document, { 'dial:spread': 0 }).forEach((value) => expect(value).toBeCloseTo(2, 14));
    const [low, high] = inForce(document, { 'dial:spread': 2 });
    expect(low).toBeCloseTo(0.5, 14);
    expect(high).toBeCloseTo(8, 13);
  });

  it('holds the harmonic mean: 1 and 4 give 8/5, at spread 1/2 16/13 and 16/7', () => {
    const document = pair('harmonic', null);
    inForce(document, { 'dial:spread': 0 }).forEach((value) => expect(value).toBeCloseTo(1.6, 14));
    const [low, high] = inForce(document, { 'dial:spread': 0.5 });
    expect(low).toBeCloseTo(16 / 13, 14);
    expect(high).toBeCloseTo(16 / 7, 14);
  });

  it('weighs by the shares at birth as entered, and keeps those weights when shares are dialled', () => {
    expect(inForce(pair('arithmetic', [0.75, 0.25]), { 'dial:spread': 0 })).toEqual([1.75, 1.75]);
    expect(inForce(pair('arithmetic', [0.75, 0.25]), { 'dial:spread': 0, 'dial:share': 0 })).toEqual([
      1.75, 1.75,
    ]);
    expect(inForce(pair('arithmetic', [0.75, 0.25]), { 'dial:spread': 0, share_n1: 0.1 })).toEqual([
      1.75, 1.75,
    ]);
  });

  it('leaves shares as entered under the common dial and pools them by equal weights under their own', () => {
    const shares = (values: Record<string, number>): number[] =>
      effectiveTraitValues(pair('arithmetic', [0.75, 0.25]), values)
        .values.filter((one) => one.trait === 'share')
        .map((one) => one.effective);
    expect(shares({ 'dial:spread': 0 })).toEqual([0.75, 0.25]);
    expect(shares({ 'dial:share': 0 })).toEqual([0.5, 0.5]);
    expect(shares({ 'dial:share': -1 })).toEqual([0.25, 0.75]);
  });

  it('multiplies own and common dial', () => {
    expect(inForce(pair('arithmetic', null), { 'dial:m': -1 })).toEqual([4, 1]);
    expect(inForce(pair('arithmetic', null), { 'dial:m': 2, 'dial:spread': 0.25 })).toEqual([1.75, 3.25]);
    const alone = pair('arithmetic', null, { followsSpread: false });
    expect(inForce(alone, { 'dial:spread': 0 })).toEqual([1, 4]);
  });

  it('agrees with the compiled expressions at any spread', () => {
    for (const mean of ['arithmetic', 'geometric', 'harmonic'] as const) {
      const document = pair(mean, [0.3, 0.7]);
      const result = compileModel(document);
      if (!result.ok) throw new Error('not compiled');
      const out = new Float64Array(2);
      for (const spread of [0, 0.3, 1, 1.2]) {
        result.model.system.setParameters(result.model.valuesToParameters({ spread }));
        result.model.system.rhs(0, result.model.starts, out);
        inForce(document, { 'dial:spread': spread }).forEach((value, k) =>
          expect(Math.abs((out[k] ?? NaN) / value - 1)).toBeLessThan(1e-14),
        );
      }
    }
  });

  it('gives the coefficient of variation: 1 and 4 at equal weights have 1.5/2.5', () => {
    const at = (spread: number) =>
      effectiveTraitValues(pair('arithmetic', null), { 'dial:spread': spread }).groups[0];
    expect(at(1)?.coefficientOfVariation).toBeCloseTo(0.6, 15);
    expect(at(0.5)?.coefficientOfVariation).toBeCloseTo(0.3, 15);
    expect(at(0)?.coefficientOfVariation).toBe(0);
  });

  it('pools a trait of pairs over both populations with the product of their weights', () => {
    const document = createPreset({
      title: 'Pairs',
      populations: (['x', 'y'] as const).map((letter, k) => ({
        symbol: letter.toUpperCase(),
        name: letter,
        hue: k === 0 ? ('weld' as const) : ('woad' as const),
        classes: [1, 2].map((i) => ({ symbol: `${letter}${i}`, name: `${i}`, start: 1 })),
      })),
      traits: [
        {
          symbol: 's',
          name: 'Share',
          role: 'share-of-births',
          domain: 'share',
          followsSpread: false,
          entries: [0.2, 0.8].map((value, i) => ({ of: [`y${i + 1}`], value })),
        },
        {
          symbol: 'a',
          name: 'Attack',
          per: 'pair',
          entries: [1, 2, 3, 4].map((value, k) => ({ of: [`y${1 + (k >> 1)}`, `x${1 + (k % 2)}`], value })),
        },
      ],
    });
    const group = spreadGroups(document).find((one) => one.trait === 1);
    expect(group?.populations).toEqual(['Y', 'X']);
    expect(group?.weights).toEqual([0.1, 0.1, 0.4, 0.4]);
    const mean = effectiveTraitValues(document).groups.find((one) => one.trait === 1)?.mean;
    expect(mean).toBeCloseTo(0.1 + 0.2 + 1.2 + 1.6, 14);
  });

  it('does not pool a trait that a class lacks', () => {
    const document = splitPredator(0.3);
    const lacking = {
      ...document,
      traits: document.traits.map((trait) =>
        trait.symbol === 'm' ? { ...trait, entries: trait.entries.slice(0, 1) } : trait,
      ),
    };
    expect(spreadGroups(lacking).map((one) => one.trait)).toEqual([1]);
    expect(effectiveTraitValues(lacking, { 'dial:spread': 0 }).values[0]?.effective).toBe(1.3);
  });

  it('has no geometric or harmonic mean with a value of zero', () => {
    expect(meanValue('geometric', [0, 1], [0.5, 0.5])).toBeNaN();
    expect(meanValue('harmonic', [0, 1], [0.5, 0.5])).toBeNaN();
    expect(spreadValue('harmonic', 1.6, 4, 3)).toBeNaN();
  });
});

describe('spread limits', () => {
  const limitOf = (document: PresetDocument, key: string) => {
    const limit = spreadLimits(document).find((one) => one.key === key);
    if (limit === undefined) throw new Error(`no limit of ${key}`);
    return limit;
  };

  it('ends where the first rate reaches zero, and says which', () => {
    const limit = limitOf(splitPredator(0.5), 'dial:spread');
    expect([limit.from, limit.to]).toEqual([0, 2]);
    expect(limit.toReason).toBe('Beyond it, mortality of female predators would become negative.');
    const own = limitOf(splitPredator(0.5), 'dial:m');
    expect([own.from, own.to]).toEqual([-2, 2]);
    expect(own.fromReason).toBe('Beyond it, mortality of male predators would become negative.');
  });

  it('takes the other dial into account', () => {
    expect(limitOf({ ...splitPredator(0.5), spread: 0.5 }, 'dial:m').to).toBe(4);
    const document = pair('arithmetic', null, { dial: -1 });
    expect(limitOf(document, 'dial:spread').to).toBeCloseTo(2.5 / 1.5, 14);
  });

  it('ends short of the pole of the harmonic mean', () => {
    // 1/v(s) = 5/8 + s (1/4 - 5/8) = 0 at s = 5/3.
    const limit = limitOf(pair('harmonic', null), 'dial:spread');
    expect(limit.to).toBeCloseTo((5 / 3) * 0.999, 10);
    expect(limit.toReason).toContain('would become infinite');
    expect(spreadValue('harmonic', 1.6, 4, limit.to)).toBeGreaterThan(0);
  });

  it('keeps shares between 0 and 1', () => {
    const limit = limitOf(pair('arithmetic', [0.75, 0.25]), 'dial:share');
    expect([limit.from, limit.to]).toEqual([-2, 2]);
  });

  it('stops at a round number where nothing ends', () => {
    const limit = limitOf(pair('geometric', null), 'dial:spread');
    expect(limit.to).toBe(3);
    expect(limit.toReason).toBe('No trait ends here; the dial stops at a round number.');
  });
});
