import { describe, expect, it } from 'vitest';

import type { KeptPoint } from '@/contract/kept-sweep';
import { candidatesFor, fillReference } from '@/features/assigned/set/set-view';
import { keptSweepSpec, type KeptLayer } from '@/features/assigned/plot/kept-sweep-spec';
import { PALETTES } from '@/graphics/palette';
import { saturatingTwoSexPredator } from '@/presets/saturating-two-sex-predator';

import { assignedBody, keptModel, keptSweep } from './support';

const document = saturatingTwoSexPredator;
const range = { parameter: 'K', from: 0.5, to: 2 };
const spec = (symbol: string) =>
  keptSweepSpec(
    document,
    range,
    [
      { id: 'reference', name: 'reference', model: keptModel([['Hopf', 1.3]]), tone: 'grey' },
      { id: 'theirs', name: 'theirs', model: keptModel([['fold', 1.7]]), tone: 'hue' },
    ],
    symbol,
    PALETTES.light,
  );

describe('kept sweeps in a plot', () => {
  it('lie over one another, in the hue of the class over grey', () => {
    const { lines, bands, legend } = spec('x');
    expect(lines.map(({ id }) => id.split(':')[0])).toEqual(['reference', 'reference', 'theirs', 'theirs']);
    expect(lines[0]?.colour).toBe(PALETTES.light.twin);
    expect(lines[2]?.colour).not.toBe(PALETTES.light.twin);
    expect(bands).toHaveLength(2);
    expect(legend.map(({ label }) => label)).toEqual(['reference', 'theirs']);
  });

  it('are solid where they attract and dashed where they repel, without a gap', () => {
    const [solid, dashed] = spec('x').lines;
    expect(solid?.dash).toBeUndefined();
    expect(dashed?.dash).toBeDefined();
    expect([...(solid?.x ?? [])]).toEqual([0.5, 1, 1.3]);
    expect([...(dashed?.x ?? [])]).toEqual([1.3, 2]);
  });

  it('mark and name their special points at the value of the class', () => {
    const [first] = spec('y1').points;
    expect(first).toMatchObject({ x: 1.3, y: 0.1, glyph: 'Hopf', named: true });
    expect(first?.description).toContain('reference: Hopf at K = 1.30000, period 17.00.');
  });

  it('place points of cycles at the highest value of the nearest cycle', () => {
    const model = keptModel([]);
    const torus: KeptPoint = { kind: 'torus', parameter: 1.65, state: {}, period: 9, meaning: '' };
    const layer: KeptLayer = { id: 'a', name: 'a', model: { ...model, points: [torus] }, tone: 'hue' };
    expect(keptSweepSpec(document, range, [layer], 'x', PALETTES.dark).points[0]).toMatchObject({
      x: 1.65,
      y: 1,
    });
  });

  it('say where there is nothing', () => {
    const model = { ...keptModel([]), branches: [] };
    const layer = { id: 'a', name: 'a', model, tone: 'hue' } as const;
    expect(keptSweepSpec(document, range, [layer], 'x', PALETTES.light).empty).toMatch(/No branch/);
  });
});

describe('a reference that a run fills', () => {
  const two = {
    ...keptSweep(),
    split: keptModel([
      ['Hopf', 0.9],
      ['fold', 1],
      ['Hopf', 1.4],
    ]),
  };

  it('takes the first point of the kind where nothing stood', () => {
    const { findings } = fillReference(assignedBody(), two);
    expect(findings).toEqual([{ id: 'w1', value: 0.9, text: '', confirmed: false }]);
  });

  it('takes the nearest to what stood there, which has to be confirmed anew', () => {
    const body = assignedBody({
      reference: { findings: [{ id: 'w1', value: 1.39, text: 'note', confirmed: true }], sweep: null },
    });
    expect(fillReference(body, two).findings[0]).toEqual({
      id: 'w1',
      value: 1.4,
      text: 'note',
      confirmed: false,
    });
  });

  it('stays confirmed where the run gives the same', () => {
    const body = assignedBody({
      reference: { findings: [{ id: 'w1', value: 1.4, text: '', confirmed: true }], sweep: null },
    });
    expect(fillReference(body, two).findings[0]?.confirmed).toBe(true);
  });

  it('is empty where there is no such point', () => {
    const none = { ...keptSweep(), split: keptModel([['fold', 1]]) };
    expect(fillReference(assignedBody(), none).findings[0]?.value).toBeNull();
    expect(
      candidatesFor(two, assignedBody().wanted[0] ?? { id: '', label: '', kind: 'reading' }),
    ).toHaveLength(2);
  });
});
