import { freeSymbol } from '@/engine/schema/document-symbols';
import type { Parameter, PresetDocument } from '@/engine/schema/preset';

import { removeAt, replaceAt } from '../replace-at';

export function changeParameter(
  document: PresetDocument,
  index: number,
  patch: Partial<Omit<Parameter, 'symbol'>>,
): PresetDocument {
  return {
    ...document,
    parameters: replaceAt(document.parameters, index, (one) => ({ ...one, ...patch })),
  };
}

/** Sets a value and widens the range of its slider where the value lies outside. */
export function setParameterValue(document: PresetDocument, index: number, value: number): PresetDocument {
  const parameter = document.parameters[index];
  if (!parameter) return document;
  return changeParameter(document, index, {
    value,
    min: Math.min(parameter.min, value),
    max: Math.max(parameter.max, value),
  });
}

export function removeParameter(document: PresetDocument, index: number): PresetDocument {
  return { ...document, parameters: removeAt(document.parameters, index) };
}

/** A parameter of 1 with a range from 0 to 2 under a free symbol. */
export function addParameter(document: PresetDocument, wanted: string, name: string): PresetDocument {
  const parameter: Parameter = {
    symbol: freeSymbol(document, wanted),
    name,
    value: 1,
    min: 0,
    max: 2,
    unit: '',
    meaning: '',
    standardError: null,
    source: '',
  };
  return { ...document, parameters: [...document.parameters, parameter] };
}
