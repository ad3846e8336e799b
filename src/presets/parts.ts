/** Short ways to write the parts of a starter preset; everything left out takes the document's defaults. */
import type { Hue, PresetInput } from '@/engine/schema/preset';

type Parts = Required<{ [K in keyof PresetInput]: NonNullable<PresetInput[K]> }>;
type PopulationInput = Parts['populations'][number];
type TraitInput = Parts['traits'][number];
type ParameterInput = Parts['parameters'][number];
type ProcessInput = Parts['processes'][number];

const INVENTED = 'invented for this scenario';

export function population(
  symbol: string,
  name: string,
  hue: Hue,
  classes: PopulationInput['classes'],
): PopulationInput {
  return { symbol, name, hue, classes };
}

/** A population of one class, whose symbol serves both. */
export function single(symbol: string, name: string, hue: Hue, start: number): PopulationInput {
  return population(symbol, name, hue, [{ symbol, name, shade: 1, start }]);
}

export function parameter(
  symbol: string,
  name: string,
  value: number,
  [min, max]: readonly [number, number],
  unit: string,
  meaning = '',
): ParameterInput {
  return { symbol, name, value, min, max, unit, meaning, source: INVENTED };
}

/** A trait with one value a class. */
export function trait(
  symbol: string,
  name: string,
  role: TraitInput['role'],
  unit: string,
  values: Readonly<Record<string, number>>,
  more: Partial<TraitInput> = {},
): TraitInput {
  const entries = Object.entries(values).map(([of, value]) => ({ of: [of], value, source: INVENTED }));
  return { symbol, name, role, unit, entries, ...more };
}

/** Shares of births: they stay as entered when the common dial moves. */
export function shares(symbol: string, values: Readonly<Record<string, number>>): TraitInput {
  return trait(symbol, 'share of births', 'share-of-births', '1', values, {
    domain: 'share',
    followsSpread: false,
  });
}

export function process(
  id: string,
  name: string,
  kind: ProcessInput['kind'],
  rate: string,
  effects: Readonly<Record<string, string>>,
): ProcessInput {
  return {
    id,
    name,
    kind,
    rate,
    effects: Object.entries(effects).map(([affected, amount]) => ({ class: affected, amount })),
  };
}
