import type { Diagnostic, ModelReport } from '../engine/system/contract';

const NOTHING: Omit<ModelReport, 'diagnostics' | 'valid'> = {
  autonomous: true,
  smooth: true,
  deterministicOnly: false,
  harvested: false,
  parameters: [],
  twin: { kind: 'no-split', reason: 'There is no valid model yet.', pooledTraits: [], leftTraits: [] },
  spreadLimits: [],
  equations: [],
  intermediates: [],
  diagram: { nodes: [], arrows: [] },
  constantsOfMotion: [],
  backend: 'none',
};

/** Report of a document that could not be compiled: its errors, and the last valid model's everything else. */
export function invalidReport(diagnostics: readonly Diagnostic[], last: ModelReport | null): ModelReport {
  return { ...(last ?? NOTHING), diagnostics, valid: false };
}
