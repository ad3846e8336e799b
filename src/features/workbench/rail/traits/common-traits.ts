import { describeClass, freeSymbol, listClasses } from '@/engine/schema/document-symbols';
import type { PresetDocument, Trait, TraitEntry, TraitRole } from '@/engine/schema/preset';

export interface CommonTrait {
  readonly key: string;
  readonly name: string;
  readonly symbol: string;
  readonly role: TraitRole;
  readonly per: Trait['per'];
  readonly domain: Trait['domain'];
  /** In `time` and `density` of the document. */
  readonly unit: string;
  readonly meaning: string;
  readonly followsSpread: boolean;
  readonly start: number;
}

/** Traits that populations are commonly measured for. */
export const COMMON_TRAITS: readonly CommonTrait[] = [
  {
    key: 'mortality',
    name: 'Mortality',
    symbol: 'm',
    role: 'mortality',
    per: 'class',
    domain: 'rate',
    unit: '1/time',
    meaning: 'Deaths per individual and time, predation and harvest left out.',
    followsSpread: true,
    start: 0.1,
  },
  {
    key: 'attack',
    name: 'Attack rate',
    symbol: 'a',
    role: 'attack',
    per: 'pair',
    domain: 'rate',
    unit: '1/(density*time)',
    meaning: 'Area or volume searched per consumer and time, by class of consumer and of resource.',
    followsSpread: true,
    start: 1,
  },
  {
    key: 'handling',
    name: 'Handling time',
    symbol: 'h',
    role: 'handling',
    per: 'class',
    domain: 'rate',
    unit: 'time',
    meaning: 'Time that one captured individual keeps a consumer busy.',
    followsSpread: true,
    start: 0.1,
  },
  {
    key: 'share',
    name: 'Share of births',
    symbol: 'q',
    role: 'share-of-births',
    per: 'class',
    domain: 'share',
    unit: '',
    meaning: 'Share of the newborn that enter this class; the classes of a population sum to 1.',
    followsSpread: false,
    start: 0,
  },
  {
    key: 'birth',
    name: 'Birth rate',
    symbol: 'b',
    role: 'birth',
    per: 'class',
    domain: 'rate',
    unit: '1/time',
    meaning: 'Births per individual and time.',
    followsSpread: true,
    start: 1,
  },
  {
    key: 'maturation',
    name: 'Maturation',
    symbol: 'g',
    role: 'maturation',
    per: 'class',
    domain: 'rate',
    unit: '1/time',
    meaning: 'Rate at which individuals leave this class for the next.',
    followsSpread: false,
    start: 1,
  },
  {
    key: 'switching',
    name: 'Switching',
    symbol: 'w',
    role: 'switching',
    per: 'pair',
    domain: 'rate',
    unit: '1/time',
    meaning: 'Rate at which individuals of the first class become the second.',
    followsSpread: false,
    start: 0.1,
  },
  {
    key: 'harvest',
    name: 'Harvest vulnerability',
    symbol: 'v',
    role: 'harvest',
    per: 'class',
    domain: 'rate',
    unit: '',
    meaning: 'How readily this class is taken, relative to others.',
    followsSpread: true,
    start: 1,
  },
  {
    key: 'competition',
    name: 'Competition',
    symbol: 'c',
    role: 'competition',
    per: 'pair',
    domain: 'rate',
    unit: '1/density',
    meaning: 'Effect of one individual of the second class on one of the first.',
    followsSpread: true,
    start: 1,
  },
  {
    key: 'own',
    name: 'Own trait',
    symbol: 'x',
    role: 'other',
    per: 'class',
    domain: 'any',
    unit: '',
    meaning: '',
    followsSpread: true,
    start: 1,
  },
];

export function unitOf(document: PresetDocument, pattern: string): string {
  const density = document.densityUnit === '' ? '1' : document.densityUnit;
  const unit = pattern.replaceAll('time', document.timeUnit);
  if (density !== '1') return unit.replaceAll('density', /^\w+$/.test(density) ? density : `(${density})`);
  return unit.replaceAll('density*', '').replaceAll('1/density', '').replaceAll('density', '');
}

/** Populations by symbol: whose classes get a value, and for a trait of pairs, towards which. */
export interface TraitPlacement {
  readonly populations: readonly string[];
  readonly towards: readonly string[];
}

/** A trait of a common kind with a value for each class (or pair of classes) of some populations. */
export function addTrait(
  document: PresetDocument,
  common: CommonTrait,
  placement: TraitPlacement,
): PresetDocument {
  const placed = listClasses(document);
  const classesOf = (populations: readonly string[]) =>
    placed.filter((one) => populations.includes(one.population.symbol));
  const entry = (of: string[], value: number): TraitEntry => ({
    of,
    value,
    standardError: null,
    source: '',
    survival: null,
  });
  const entries =
    common.per === 'class'
      ? classesOf(placement.populations).map((one) =>
          entry(
            [one.class.symbol],
            common.key === 'share' ? 1 / one.population.classes.length : common.start,
          ),
        )
      : classesOf(placement.populations).flatMap((one) =>
          classesOf(placement.towards)
            .filter((other) => other.class.symbol !== one.class.symbol || common.key !== 'switching')
            .map((other) => entry([one.class.symbol, other.class.symbol], common.start)),
        );
  const trait: Trait = {
    symbol: freeSymbol(document, common.symbol),
    name: common.name,
    unit: unitOf(document, common.unit),
    meaning: common.meaning,
    role: common.role,
    per: common.per,
    domain: common.domain,
    mean: 'arithmetic',
    followsSpread: common.followsSpread,
    dial: 1,
    entries,
  };
  return { ...document, traits: [...document.traits, trait] };
}

/** Name of a class that stands inside a sentence. */
export function classInWords(document: PresetDocument, symbol: string): string {
  const placed = listClasses(document).find((one) => one.class.symbol === symbol);
  return placed ? describeClass(placed.population, placed.class) : symbol;
}
