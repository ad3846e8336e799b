import { NEGATIVE_RATE } from './check-flows';
import { constantsOfMotionAt } from './constants-of-motion';
import type { CompiledSystem, Diagnostic, ModelReport, TwinReport } from './contract';
import type { ModelGraph } from './model-graph';
import { listParameters } from './parameter-reports';
import { drawProcesses } from './process-diagram';
import { spreadLimits } from './spread-limits';
import { typesetEquations, typesetIntermediates } from './typeset-equations';

/** Everything the workbench shows of a model besides its solutions. */
export function describeModel(
  model: ModelGraph,
  system: CompiledSystem,
  twin: TwinReport,
  diagnostics: readonly Diagnostic[],
): ModelReport {
  const { document } = model;
  const limits = spreadLimits(document);
  return {
    diagnostics,
    valid: true,
    autonomous: system.autonomous,
    smooth: system.smooth,
    deterministicOnly: isDeterministicOnly(document.processes, diagnostics),
    harvested: document.processes.some((process) => process.kind === 'harvest'),
    parameters: listParameters(document, limits),
    twin,
    spreadLimits: limits,
    equations: typesetEquations(document),
    intermediates: typesetIntermediates(document),
    diagram: drawProcesses(model),
    constantsOfMotion: constantsOfMotionAt(model, model.defaults).map((one) => one.formula),
    backend: system.backend,
  };
}

/** True where a rate is signed, or was found to become negative without being marked so. */
function isDeterministicOnly(
  processes: readonly { readonly signed: boolean }[],
  diagnostics: readonly Diagnostic[],
): boolean {
  if (processes.some((process) => process.signed)) return true;
  return diagnostics.some((one) => one.message.startsWith(NEGATIVE_RATE));
}
