import { createEmptyPreset, createPreset } from '@/engine/schema/create';
import type { PresetDocument, PresetInput, TemplateName } from '@/engine/schema/preset';
import { applyTemplate } from '@/engine/schema/templates';

type Parts = Omit<PresetInput, 'format' | 'formatVersion'>;

const entry = (of: string | string[], value: number) => ({ of: typeof of === 'string' ? [of] : of, value });
const lose = (symbol: string) => ({ class: symbol, amount: '-1' });

/** x' = x - x (y1 + y2), yi' = x (y1 + y2)/2 - m_i yi, with mortalities 1 + eps and 1 - eps. */
export function splitPredator(eps: number, changes: Partial<Parts> = {}): PresetDocument {
  return createPreset({
    title: 'Two-class predator',
    populations: [
      { symbol: 'x', name: 'Prey', hue: 'weld', classes: [{ symbol: 'x', name: 'Prey', start: 0.5 }] },
      {
        symbol: 'Y',
        name: 'Predators',
        hue: 'woad',
        classes: [
          { symbol: 'y1', name: 'Males', start: 0.25 },
          { symbol: 'y2', name: 'Females', start: 0.25, shade: 1 },
        ],
      },
    ],
    traits: [
      {
        symbol: 'm',
        name: 'Mortality',
        unit: '1/year',
        role: 'mortality',
        entries: [entry('y1', 1 + eps), entry('y2', 1 - eps)],
      },
      {
        symbol: 'share',
        name: 'Share of births',
        role: 'share-of-births',
        domain: 'share',
        followsSpread: false,
        entries: [entry('y1', 0.5), entry('y2', 0.5)],
      },
    ],
    processes: [
      {
        id: 'births',
        name: 'Births of prey',
        kind: 'birth',
        rate: 'x',
        effects: [{ class: 'x', amount: '1' }],
      },
      {
        id: 'meals',
        name: 'Prey eaten by predators',
        kind: 'predation',
        rate: 'x*Y',
        effects: [lose('x'), { class: 'y1', amount: 'share_y1' }, { class: 'y2', amount: 'share_y2' }],
      },
      { id: 'd1', name: 'Deaths of males', kind: 'death', rate: 'm_y1*y1', effects: [lose('y1')] },
      { id: 'd2', name: 'Deaths of females', kind: 'death', rate: 'm_y2*y2', effects: [lose('y2')] },
    ],
    ...changes,
  });
}

/** xi' = (x1 + x2)/2 - q_i xi y, y' = y (q_1 x1 + q_2 x2) - y, with attack rates 1 + eps and 1 - eps. */
export function splitPrey(eps: number, changes: Partial<Parts> = {}): PresetDocument {
  return createPreset({
    title: 'Two-class prey',
    populations: [
      {
        symbol: 'X',
        name: 'Prey',
        hue: 'weld',
        classes: [
          { symbol: 'x1', name: 'Bold', start: 0.25 },
          { symbol: 'x2', name: 'Shy', start: 0.25, shade: 1 },
        ],
      },
      {
        symbol: 'y',
        name: 'Predators',
        hue: 'woad',
        classes: [{ symbol: 'y', name: 'Predators', start: 0.5 }],
      },
    ],
    traits: [
      {
        symbol: 'q',
        name: 'Attack rate',
        role: 'attack',
        entries: [entry('x1', 1 + eps), entry('x2', 1 - eps)],
      },
    ],
    processes: [
      {
        id: 'births',
        name: 'Births of prey',
        kind: 'birth',
        rate: 'X',
        effects: [
          { class: 'x1', amount: '1/2' },
          { class: 'x2', amount: '1/2' },
        ],
      },
      ...['x1', 'x2'].map((symbol) => ({
        id: `eat-${symbol}`,
        name: `${symbol} eaten`,
        kind: 'predation' as const,
        rate: `q_${symbol}*${symbol}*y`,
        effects: [lose(symbol), { class: 'y', amount: '1' }],
      })),
      { id: 'd', name: 'Deaths of predators', kind: 'death', rate: 'y', effects: [lose('y')] },
    ],
    ...changes,
  });
}

/** Prey x and a predator Y of males and females, without any process yet. */
export function springtailsAndSpiders(): PresetDocument {
  return {
    ...createEmptyPreset('Springtails and spiders'),
    densityUnit: 'mg',
    populations: splitPredator(0).populations.map((population, k) => ({
      ...population,
      name: k === 0 ? 'Springtails' : 'Spiders',
      classes: population.classes.map((one) => (k === 0 ? { ...one, name: 'Springtails' } : one)),
    })),
  };
}

/** Applies templates in turn; throws where one refuses, since a test that asks for it expects none. */
export function withTemplates(
  document: PresetDocument,
  ...uses: readonly (readonly [TemplateName, Record<string, unknown>])[]
): PresetDocument {
  return uses.reduce((before, [name, settings]) => {
    const outcome = applyTemplate(before, name, settings);
    if (!outcome.ok) throw new Error(outcome.problems.map((one) => `${one.field}: ${one.message}`).join(' '));
    return outcome.document;
  }, document);
}
