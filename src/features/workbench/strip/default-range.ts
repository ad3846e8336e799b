import type { PresetDocument } from '@/engine/schema/preset';
import type { ParameterReport } from '@/engine/system/contract';

import { readParameterValue } from '../engine/parameter-values';

/** Range of a first sweep: one the document names, else the slider's. */
export function defaultRange(
  document: PresetDocument,
  parameter: ParameterReport,
): { readonly from: number; readonly to: number } {
  const named = document.sweeps.find((one) => one.parameter === parameter.key);
  if (named) return { from: named.from, to: named.to };
  if (parameter.min < parameter.max) return { from: parameter.min, to: parameter.max };
  const value = readParameterValue(document, parameter.key) ?? parameter.value;
  return value === 0 ? { from: 0, to: 1 } : { from: Math.min(0, 2 * value), to: Math.max(0, 2 * value) };
}
