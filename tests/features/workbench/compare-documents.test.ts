import { describe, expect, it } from 'vitest';

import { addClass } from '@/engine/schema/edit';
import { compareDocuments } from '@/features/workbench/dialogs/compare-documents';
import { changeEntry, changeTrait } from '@/features/workbench/rail/traits/trait-edits';

import { twoSexes } from './support';

describe('compareDocuments', () => {
  it('finds nothing between a document and its copy', () => {
    expect(compareDocuments(twoSexes(), structuredClone(twoSexes()))).toEqual([]);
  });

  it('tells trait values class by class', () => {
    const before = twoSexes();
    const after = changeEntry(before, 0, ['y1'], { value: 0.35, standardError: 0.02 });
    expect(compareDocuments(before, after)).toEqual([
      { section: 'Traits', label: 'Mortality (m) of y1', before: '0.4', after: '0.35 ± 0.02' },
    ]);
  });

  it('tells settings of traits, parameters, processes and the model apart', () => {
    const before = twoSexes();
    const after = {
      ...changeTrait(before, 0, { mean: 'harmonic' }),
      spread: 0.5,
      parameters: before.parameters.map((one) => ({ ...one, value: -2, min: -3 })),
      processes: before.processes.map((one, at) => (at === 1 ? { ...one, rate: 'm_y1*y1*2' } : one)),
    };
    expect(
      compareDocuments(before, after).map((one) => [one.section, one.label, one.before, one.after]),
    ).toEqual([
      ['Model', 'Spread', '1', '0.5'],
      ['Traits', 'Mortality (m), mean held', 'arithmetic', 'harmonic'],
      ['Parameters', 'Carrying capacity (K)', '3 ha^-1', '−2 ha^-1'],
      ['Parameters', 'K, range', '0.5 to 6', '−3 to 6'],
      ['Processes', 'Deaths of males, rate', 'm_y1*y1', 'm_y1*y1*2'],
    ]);
  });

  it('says what is on one side only', () => {
    const before = twoSexes();
    const after = addClass(before, 'y', 'Juveniles');
    const found = compareDocuments(before, after);
    expect(found).toContainEqual({
      section: 'Populations',
      label: 'class y3, name',
      before: null,
      after: 'Juveniles',
    });
    expect(found).toContainEqual({
      section: 'Traits',
      label: 'Mortality (m) of y3',
      before: null,
      after: '0.2',
    });
    expect(compareDocuments(after, before)).toContainEqual({
      section: 'Traits',
      label: 'Mortality (m) of y3',
      before: '0.2',
      after: null,
    });
  });

  it('tells processes of one name apart', () => {
    const before = twoSexes();
    const [births, deaths] = before.processes;
    if (!births || !deaths) throw new Error('The example has two processes.');
    const doubled = { ...before, processes: [births, deaths, { ...deaths, id: 'deaths-2', rate: '0.1*y1' }] };
    const changed = {
      ...doubled,
      processes: [births, { ...deaths, rate: '0.2*y1' }, { ...deaths, id: 'deaths-2', rate: '0.1*y1' }],
    };
    expect(compareDocuments(doubled, changed).map((one) => one.after)).toEqual(['0.2*y1']);
  });
});
