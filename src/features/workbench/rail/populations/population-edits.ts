import type { Population, PopulationClass, PresetDocument } from '@/engine/schema/preset';

import { replaceAt } from '../replace-at';

export function changePopulation(
  document: PresetDocument,
  index: number,
  patch: Partial<Pick<Population, 'name' | 'hue' | 'sign'>>,
): PresetDocument {
  return {
    ...document,
    populations: replaceAt(document.populations, index, (one) => ({ ...one, ...patch })),
  };
}

export function changeClass(
  document: PresetDocument,
  population: number,
  index: number,
  patch: Partial<Pick<PopulationClass, 'name' | 'shade' | 'start'>>,
): PresetDocument {
  return {
    ...document,
    populations: replaceAt(document.populations, population, (one) => ({
      ...one,
      classes: replaceAt(one.classes, index, (entry) => ({ ...entry, ...patch })),
    })),
  };
}
