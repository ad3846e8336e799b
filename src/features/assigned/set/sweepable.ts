import type { SweepRange } from '@/contract/kept-sweep';
import type { PresetDocument } from '@/engine/schema/preset';
import { SPREAD_KEY, traitDialKey, traitEntrySymbol } from '@/engine/schema/symbols';
import { parameterName } from '@/graphics/quantities';

export interface NumberKey {
  readonly key: string;
  readonly label: string;
  readonly value: number;
  readonly min: number;
  readonly max: number;
}

/** How far the range of a trait value reaches beyond its value. */
const REACH = 3;

/** Every number of a document that can be swept or left free: parameters, the spreads, trait values. */
export function numberKeys(document: PresetDocument): readonly NumberKey[] {
  const named = (key: string) => parameterName(document, key).name;
  const parameters = document.parameters.map(({ symbol, value, min, max }) => ({
    key: symbol,
    label: named(symbol),
    value,
    min,
    max,
  }));
  const spreading = document.traits.filter(
    ({ followsSpread, entries }) => followsSpread && entries.some((one) => one.value !== entries[0]?.value),
  );
  const dials = spreading.map(({ symbol, dial }) => ({
    key: traitDialKey(symbol),
    label: named(traitDialKey(symbol)),
    value: dial,
    min: 0,
    max: 1,
  }));
  const spread =
    spreading.length > 0
      ? [{ key: SPREAD_KEY, label: named(SPREAD_KEY), value: document.spread, min: 0, max: 1 }]
      : [];
  const traits = document.traits.flatMap(({ symbol, domain, entries }) =>
    entries.map(({ of, value }) => {
      const key = traitEntrySymbol(symbol, of);
      const reach = domain === 'share' ? 1 : REACH * (Math.abs(value) || 1);
      return { key, label: named(key), value, min: domain === 'any' ? -reach : 0, max: reach };
    }),
  );
  return [...parameters, ...spread, ...dials, ...traits];
}

/** Range to begin with: one that the document names, else that of the slider. */
export function firstRange(document: PresetDocument, { key, min, max }: NumberKey): SweepRange {
  const named = document.sweeps.find((one) => one.parameter === key && one.from < one.to);
  return { parameter: key, from: named?.from ?? min, to: named?.to ?? max };
}
