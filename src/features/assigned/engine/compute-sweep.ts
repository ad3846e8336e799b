import type { PictureResult } from '@/engine/analyses/contract';
import type { Progress } from '@/engine/continuation/contract';
import type { PresetDocument } from '@/engine/schema/preset';
import type { KeptSweep, SweepRange } from '@/contract/kept-sweep';
import { keepSweep } from '@/workers/keep-sweep';
import type { EngineClient } from '@/workers/protocol';

export interface ComputedSweep {
  readonly kept: KeptSweep;
  readonly status: PictureResult['status'];
  readonly message: string;
}

/**
 * Runs a sweep with its cycles, split beside pooled, on a document at its own numbers.
 * Fails with words where the model does not compile.
 */
export async function computeSweep(
  engine: EngineClient,
  job: number,
  document: PresetDocument,
  range: SweepRange,
  onProgress: (progress: Progress) => void,
): Promise<ComputedSweep> {
  const report = await engine.setModel(document);
  if (!report.valid)
    throw new Error(
      `The model cannot be run: ${report.diagnostics.find((one) => one.severity === 'error')?.message ?? 'it has an error.'}`,
    );
  const result = await engine.analyse(
    job,
    { task: 'picture', ...range, twin: true, branches: true },
    onProgress,
  );
  return {
    kept: keepSweep(result.sweep, result.cycles),
    status: result.status,
    message: result.message,
  };
}
