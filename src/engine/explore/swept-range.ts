import type { CompiledModel } from '../system/compile-model';

/** A range of one parameter, as the computations along it take it. */
export interface SweptRange {
  readonly parameterIndex: number;
  readonly from: number;
  readonly to: number;
  /** What the parameter is called in sentences. */
  readonly parameterLabel: string;
}

export function sweptRange(
  model: CompiledModel,
  { parameter, from, to }: { readonly parameter: string; readonly from: number; readonly to: number },
): SweptRange {
  const parameterIndex = model.parameterIndex(parameter);
  const key = model.system.parameterKeys[parameterIndex];
  const parameterLabel = model.report.parameters.find((one) => one.key === key)?.label ?? parameter;
  return { parameterIndex, from, to, parameterLabel };
}
