import { describe, expect, it } from 'vitest';

import { createEmptyPreset } from '@/engine/schema/create';
import { LIMITS } from '@/engine/schema/limits';
import { migrateDocument, placeInWords, readPreset } from '@/engine/schema/migrate';
import { splitPredator } from '../../support/example-models';

function problems(json: unknown): { path: readonly (string | number)[]; message: string }[] {
  const result = readPreset(json);
  return result.ok ? [] : [...result.problems];
}

const copy = (): Record<string, unknown> =>
  JSON.parse(JSON.stringify(splitPredator(0.3))) as Record<string, unknown>;

describe('readPreset', () => {
  it('reads back what was written', () => {
    for (const document of [splitPredator(0.3), createEmptyPreset()]) {
      expect(readPreset(JSON.parse(JSON.stringify(document)))).toEqual({
        ok: true,
        document,
        migratedFrom: null,
      });
    }
  });

  it('refuses what is no preset document', () => {
    for (const json of [null, 3, 'text', [], undefined]) {
      expect(problems(json)[0]?.message).toBe(
        'A preset document is a JSON object; this file holds something else.',
      );
    }
    expect(problems({ format: 'other' })[0]).toEqual({
      path: ['format'],
      message:
        'This is not a preset document: its "format" should read "moiety-preset". Choose a file that ends in .moiety.json.',
    });
  });

  it('refuses versions it does not know', () => {
    expect(problems({ ...copy(), formatVersion: 99 })[0]?.message).toContain('update the program to open it');
    expect(problems({ ...copy(), formatVersion: 'one' })[0]?.path).toEqual(['formatVersion']);
    expect(problems({ ...copy(), formatVersion: 0 })[0]?.path).toEqual(['formatVersion']);
  });

  it('names places and reasons in plain words', () => {
    const wrong = copy();
    wrong['horizon'] = 'long';
    wrong['title'] = ' ';
    wrong['populations'] = [{ symbol: 't', name: 'N', hue: 'pink', classes: [] }];
    const messages = problems(wrong).map((one) => one.message);
    expect(messages).toContain('Horizon: a number is needed here.');
    expect(messages).toContain('Title: A title is needed.');
    expect(messages).toContain('Population 1, classes: at least 1 entry is needed.');
    expect(messages).toContain(
      'Population 1, hue: one of "weld", "woad", "madder", "lichen", "sloe", "slate" is needed here.',
    );
    expect(messages.find((one) => one.startsWith('Population 1, symbol'))).toContain('no reserved name');
  });

  it('refuses numbers that are none, and ranges that end before they begin', () => {
    const wrong = copy();
    wrong['spread'] = null;
    wrong['parameters'] = [{ symbol: 'k', name: '', value: 1, min: 2, max: 1 }];
    expect(problems(wrong).map((one) => one.message)).toEqual([
      'Spread: a number is needed here.',
      'Parameter 1, max: the range must end above its beginning.',
    ]);
  });

  it('refuses documents that are too large or too deep, whatever they hold', () => {
    expect(problems({ ...copy(), extra: 'x'.repeat(LIMITS.documentBytes + 1) })[0]?.message).toContain(
      'KiB are allowed',
    );
    let deep: unknown = 1;
    for (let k = 0; k < 50_000; k += 1) deep = [deep];
    expect(problems({ ...copy(), deep })[0]?.message).toContain('levels deep');
  });
});

describe('migrations', () => {
  const steps = {
    1: (document: Readonly<Record<string, unknown>>) => ({ ...document, second: true }),
    2: (document: Readonly<Record<string, unknown>>) => ({ ...document, third: document['second'] }),
  };

  it('go step by step to the present version', () => {
    const result = migrateDocument({ formatVersion: 1, title: 'T' }, steps, 3);
    expect(result).toEqual({
      ok: true,
      document: { formatVersion: 3, title: 'T', second: true, third: true },
    });
    const later = migrateDocument({ formatVersion: 2, title: 'T' }, steps, 3);
    expect(later.ok && later.document).toEqual({ formatVersion: 3, title: 'T', third: undefined });
  });

  it('say which version has no way on', () => {
    const result = migrateDocument({ formatVersion: 1 }, {}, 2);
    expect(result.ok ? '' : result.problems[0]?.message).toBe(
      'Documents in version 1 of the format can no longer be read.',
    );
  });
});

describe('placeInWords', () => {
  it('reads as a place', () => {
    expect(placeInWords(['processes', 2, 'effects', 0, 'amount'])).toBe('Process 3, effect 1, amount');
    expect(placeInWords(['knownFacts', 0])).toBe('Known fact 1');
    expect(placeInWords([])).toBe('The document');
  });
});
